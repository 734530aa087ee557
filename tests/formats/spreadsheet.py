"""A tiny evaluator of a workbook's formulas: just the functions a gauging sheet uses."""

import math
import re

from openpyxl.formula import Tokenizer
from openpyxl.utils import range_boundaries


def _number(value):
    return 0.0 if value is None else value


def _is_number(value):
    return isinstance(value, int | float) and not isinstance(value, bool)


def _match(value, cells, kind):
    if kind() == 0:
        return cells().index(value()) + 1
    return sum(_is_number(cell) and cell <= value() for cell in cells())


FUNCTIONS = {
    "IF": lambda test, yes, no: yes() if test() else no(),
    "AND": lambda *tests: all(test() for test in tests),
    "OR": lambda *tests: any(test() for test in tests),
    "ISNUMBER": lambda value: _is_number(value()),
    "ABS": lambda value: abs(value()),
    "COS": lambda value: math.cos(value()),
    "RADIANS": lambda value: math.radians(_number(value())),
    "MOD": lambda value, by: value() % by(),
    "MIN": lambda *values: min(value() for value in values),
    "MAX": lambda *values: max(value() for value in values),
    "SUM": lambda cells: sum(cell for cell in cells() if _is_number(cell)),
    "COUNTIF": lambda cells, value: cells().count(value()),
    "INDEX": lambda cells, at: cells()[at() - 1],
    "MATCH": _match,
}


class Sheets:
    """The values of a workbook, formulas evaluated when asked."""

    def __init__(self, workbook):
        self.workbook, self.known = workbook, {}

    def value(self, page, cell):
        key = (page, cell.replace("$", ""))
        if key not in self.known:
            raw = self.workbook[page][key[1]].value
            is_formula = isinstance(raw, str) and raw.startswith("=")
            self.known[key] = self._evaluate(page, raw) if is_formula else raw
        return self.known[key]

    def cells(self, page, span):
        left, top, right, bottom = range_boundaries(span.replace("$", ""))
        rows = self.workbook[page].iter_rows(top, bottom, left, right)
        return [self.value(page, cell.coordinate) for row in rows for cell in row]

    def _evaluate(self, page, formula):
        names = {"at": self._at(page), "cells": self._cells(page), "F": FUNCTIONS}
        return eval(_python(formula), names)

    def _at(self, here):
        return lambda page, cell: _or_blank(self.value(page or here, cell))

    def _cells(self, here):
        return lambda page, span: self.cells(page or here, span)


def _or_blank(value):
    return Blank() if value is None else value


class Blank:
    """An empty cell: zero in a sum, empty beside text, no number."""

    def __add__(self, other):
        return other

    __radd__ = __add__

    def __mul__(self, other):
        return 0.0

    __rmul__ = __mul__

    def __eq__(self, other):
        return other in ("", 0)

    def __float__(self):
        return 0.0

    def __sub__(self, other):
        return -other

    def __rsub__(self, other):
        return other


def _python(formula):
    """Turn a formula into Python; arguments become functions, so that IF looks at one side only."""
    parts = []
    for token in Tokenizer(formula).items:
        if token.type == "FUNC" and token.subtype == "OPEN":
            parts.append(f"F[{token.value[:-1]!r}](lambda: (")
        elif token.type == "FUNC":
            parts.append("))")
        elif token.type == "SEP":
            parts.append("), lambda: (")
        elif token.type == "OPERAND" and token.subtype == "RANGE":
            page, _bang, cell = token.value.rpartition("!")
            kind = "cells" if ":" in cell else "at"
            parts.append(f"{kind}({page.strip(chr(39))!r}, {cell!r})")
        elif token.type == "OPERAND" and token.subtype == "TEXT":
            parts.append(repr(token.value[1:-1]))
        elif token.type == "OPERATOR-INFIX":
            parts.append({"=": "==", "<>": "!=", "&": "+", "^": "**"}.get(token.value, token.value))
        else:
            parts.append(re.sub(r"^0+(?=\d)", "", token.value))
    return "".join(parts)
