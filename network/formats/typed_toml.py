"""Reads TOML tables into frozen dataclasses and says which key of which file is wrong."""

import tomllib
import types
import typing
from collections.abc import Mapping
from dataclasses import MISSING, fields, is_dataclass
from datetime import UTC, datetime, timezone
from pathlib import Path
from typing import Any, TypeVar

Row = TypeVar("Row")


class ScenarioError(ValueError):
    """A file of the demo network says something that cannot be; the text names file and key."""


def read_toml(path: Path) -> dict[str, Any]:
    """Return the content of one TOML file; ScenarioError where it is missing or not TOML."""
    try:
        return tomllib.loads(path.read_text(encoding="utf-8"))
    except (OSError, tomllib.TOMLDecodeError, UnicodeDecodeError) as error:
        raise ScenarioError(f"{path.name}: {error}") from error


def below(where: str, key: str) -> str:
    """Return the path of a key for messages: "file.toml: table.key"."""
    return f"{where} {key}" if where.endswith(":") else f"{where}.{key}"


def read_row(kind: type[Row], row: object, *, where: str, clock: timezone) -> Row:
    """Return one TOML table as a dataclass of that kind, nested tables and lists included.

    A time without an offset is on the record clock; all become UTC. `where` is the path so far
    for messages, "file.toml:" at the top. Raises ScenarioError for a key that is missing, unknown
    or of another type.
    """
    if not isinstance(row, Mapping):
        raise ScenarioError(f"{where}: a table is wanted")
    hints = typing.get_type_hints(kind)
    wanted = {field.name: field for field in fields(kind)}  # type: ignore[arg-type]
    if unknown := sorted(set(row) - set(wanted)):
        raise ScenarioError(f"{below(where, unknown[0])}: no such key")
    for name, field in wanted.items():
        if name not in row and field.default is MISSING and field.default_factory is MISSING:
            raise ScenarioError(f"{below(where, name)}: missing")
    return kind(
        **{
            name: _value(hints[name], value, where=below(where, name), clock=clock)
            for name, value in row.items()
        }
    )


def _value(hint: Any, value: Any, *, where: str, clock: timezone) -> Any:
    if isinstance(hint, types.UnionType):  # X | None: the key may be left out, never be null
        hint = typing.get_args(hint)[0]
    if typing.get_origin(hint) is tuple:
        return _values(typing.get_args(hint), value, where=where, clock=clock)
    if is_dataclass(hint):
        return read_row(typing.cast(type, hint), value, where=where, clock=clock)
    if hint is float and type(value) is int:
        return float(value)
    if type(value) is not hint:
        raise ScenarioError(f"{where}: {value!r} should be a {hint.__name__}")
    if isinstance(value, datetime):
        return (value if value.tzinfo else value.replace(tzinfo=clock)).astimezone(UTC)
    return value


def _values(hints: tuple[Any, ...], value: Any, *, where: str, clock: timezone) -> tuple[Any, ...]:
    if not isinstance(value, list):
        raise ScenarioError(f"{where}: a list is wanted")
    if hints[-1] is Ellipsis:
        hints = (hints[0],) * len(value)
    if len(hints) != len(value):
        raise ScenarioError(f"{where}: {len(hints)} values are wanted, not {len(value)}")
    return tuple(
        _value(hint, item, where=f"{where}[{n}]", clock=clock)
        for n, (hint, item) in enumerate(zip(hints, value, strict=True))
    )
