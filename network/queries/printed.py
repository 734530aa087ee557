"""Numbers as the agency writes them, for lists that no template formats."""

from collections.abc import Callable

from network.models import Agency
from network.numerics.printing import figures_text, fixed_text

Writer = Callable[[float | None], str]


def flow_writer(agency: Agency) -> Writer:
    """Return what writes a flow with the agency's significant figures."""
    return lambda value: figures_text(
        value,
        decimal_sign=agency.decimal_sign,
        figures=agency.significant_figures,
        max_decimals=agency.max_decimals,
    )


def fixed_writer(agency: Agency, decimals: int, *, plus: bool = False) -> Writer:
    """Return what writes a number with so many decimals, and its sign where asked."""
    return lambda value: fixed_text(
        value, decimals=decimals, decimal_sign=agency.decimal_sign, plus=plus
    )
