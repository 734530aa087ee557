"""What can be wrong with a file: sentences that a higher floor can translate."""

from collections.abc import Mapping
from dataclasses import dataclass


class Sentence(str):
    """Text in English that keeps its template and values, so that it can be translated later.

    Formats know no Django: a page shows ``gettext(s.template) % s.values``.
    """

    __slots__ = ("template", "values")
    template: str
    values: Mapping[str, object]

    def __new__(cls, template: str, values: Mapping[str, object]) -> "Sentence":
        """Fill the template with the values and remember both."""
        text = super().__new__(cls, template % values)
        text.template, text.values = template, values
        return text


def sentence(template: str, **values: object) -> Sentence:
    """Give a sentence; imported as ``_`` so that makemessages finds the template."""
    return Sentence(template, values)


class FileFault(ValueError):
    """A file, or the profile it is read by, is refused as a whole; `sentence` says why."""

    def __init__(self, sentence: Sentence) -> None:
        """Keep the sentence."""
        super().__init__(sentence)
        self.sentence = sentence


@dataclass(frozen=True, slots=True)
class RowFault:
    """One row that could not be used, or was used (`kept`) but is odd."""

    line: int
    text: str
    reason: str
    kept: bool = False

    def __str__(self) -> str:
        """Say it as one line of a list."""
        return f"line {self.line}: {self.reason}"
