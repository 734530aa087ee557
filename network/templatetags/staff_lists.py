"""Gives the cells of a list the name of their column, for screens too narrow for a table."""

from collections.abc import Iterable
from typing import Any

from django import template
from django.utils.html import format_html
from django.utils.safestring import SafeString, mark_safe
from django.utils.text import capfirst

register = template.Library()


@register.filter
def labelled(cells: Iterable[SafeString], headers: Iterable[dict[str, Any]]) -> list[SafeString]:
    """Write each cell with its column's name in `data-label`; cells come as finished HTML."""
    return [
        _with_label(cell, capfirst(str(header["text"])))
        for cell, header in zip(cells, headers, strict=True)
    ]


def _with_label(cell: SafeString, label: str) -> SafeString:
    tag = cell.lstrip()[:3]  # "<td" or "<th"
    return mark_safe(cell.replace(tag, format_html('{} data-label="{}"', mark_safe(tag), label), 1))
