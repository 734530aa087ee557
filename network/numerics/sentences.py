"""Sentences of the kernel: a text to be translated, the values that go into it, a refusal."""

from collections.abc import Mapping
from dataclasses import dataclass, field


def gettext_noop(text: str) -> str:
    """Mark a text for the translators and return it unchanged.

    makemessages collects by this name; the kernel itself knows no Django and translates nothing.
    """
    return text


@dataclass(frozen=True)
class Sentence:
    """Hold what is to be said in English and the values of its named places.

    The upper floors translate with `gettext(sentence.text).format(**sentence.values)`.
    """

    text: str
    values: Mapping[str, float | str] = field(default_factory=dict)

    def __str__(self) -> str:
        return self.text.format(**self.values)


def sentence(text: str, **values: float | str) -> Sentence:
    """Return the sentence of a marked text and its values."""
    return Sentence(text, values)


class Refused(ValueError):
    """Say why an input cannot be computed, and which row (from 1) and field is meant."""

    def __init__(
        self, reason: Sentence, *, row: int | None = None, field_name: str | None = None
    ) -> None:
        super().__init__(str(reason))
        self.sentence = reason
        self.row = row
        self.field_name = field_name
