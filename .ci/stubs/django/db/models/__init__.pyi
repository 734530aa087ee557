# Choices are enumerations of text: without this their members would be taken for pairs.
from enum import Enum
from typing import Any, ClassVar

class TextChoices(str, Enum):  # type: ignore[misc]
    choices: ClassVar[list[tuple[str, str]]]
    labels: ClassVar[list[str]]
    values: ClassVar[list[str]]
    @property
    def label(self) -> str: ...

def __getattr__(name: str) -> Any: ...
