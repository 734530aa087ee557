"""The usual cautions, for any page of field work."""

from collections.abc import Sequence
from typing import Any

from django import template

from network.queries.cautions import AT_THE_RIVER

register = template.Library()


@register.simple_tag
def cautions() -> Sequence[Any]:
    """Give the cautions of work in and over water."""
    return AT_THE_RIVER
