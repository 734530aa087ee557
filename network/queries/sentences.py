"""Sentences of the kernel in the user's language."""

from django.utils.translation import gettext as _

from network.numerics.sentences import Sentence


def said(sentence: Sentence) -> str:
    """Return a sentence of the kernel, translated, with its values filled in."""
    return _(sentence.text).format(**sentence.values)
