"""Typed readers of environment variables that fail aloud."""

import os
from pathlib import Path


class BadSetting(Exception):
    """An environment variable holds what cannot be used."""


def text(name: str, default: str = "") -> str:
    """Return a variable as text, or the default."""
    return os.environ.get(name, default)


def flag(name: str, default: bool) -> bool:
    """Return a variable as yes or no; raise BadSetting for anything else."""
    raw = os.environ.get(name, "").strip().lower()
    if raw == "":
        return default
    if raw in {"1", "true", "yes", "on"}:
        return True
    if raw in {"0", "false", "no", "off"}:
        return False
    raise BadSetting(f"{name} must be yes or no, not {raw!r}")


def number(name: str, default: int) -> int:
    """Return a variable as a whole number; raise BadSetting for anything else."""
    raw = os.environ.get(name, "").strip()
    try:
        return int(raw) if raw else default
    except ValueError:
        raise BadSetting(f"{name} must be a whole number, not {raw!r}") from None


def words(name: str) -> list[str]:
    """Return a comma-separated variable as a list."""
    return [word.strip() for word in os.environ.get(name, "").split(",") if word.strip()]


def secret(name: str, file: Path) -> str:
    """Return a secret from the environment, else from a file that setup makes, else empty."""
    value = os.environ.get(name, "")
    if not value and file.is_file():
        value = file.read_text().strip()
    return value
