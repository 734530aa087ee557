# Choices are enumerations of text: without this their members would be taken for pairs.
from enum import StrEnum
from typing import Any, ClassVar

class TextChoices(StrEnum):  # type: ignore[misc]
    choices: ClassVar[list[tuple[str, str]]]
    labels: ClassVar[list[str]]
    values: ClassVar[list[str]]
    @property
    def label(self) -> str: ...

def __getattr__(name: str) -> Any: ...
