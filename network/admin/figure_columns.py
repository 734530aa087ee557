"""Columns of figures in lists, written as the agency writes them."""

from collections.abc import Callable
from typing import Any

from network.queries.printed import Writer


def column(field: str, label: Any, write: Writer) -> Callable[[Any], str]:
    """Return a column of a list: the field's value as the writer puts it, sorted by the field."""

    def shown(row: Any) -> str:
        return write(getattr(row, field))

    shown.__name__ = field
    shown.short_description = label  # type: ignore[attr-defined]
    shown.admin_order_field = field  # type: ignore[attr-defined]
    return shown
