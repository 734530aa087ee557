# Django without types, but for what plain mypy would otherwise misread.
from typing import Any

def __getattr__(name: str) -> Any: ...
