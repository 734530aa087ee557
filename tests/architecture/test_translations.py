"""Every catalogue is whole: nothing left out, nothing guessed, and compiled as it stands."""

import gettext
import shutil
import subprocess
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[2]
CATALOGUES = sorted(ROOT.glob("*/locale/*/LC_MESSAGES/django.po"))


def test_there_are_catalogues():
    assert CATALOGUES


@pytest.mark.skipif(shutil.which("msgfmt") is None, reason="needs the package gettext")
@pytest.mark.parametrize("path", CATALOGUES, ids=lambda path: path.relative_to(ROOT).parts[0])
def test_a_catalogue_is_whole_and_compiled_as_it_stands(path, tmp_path):
    compiled = tmp_path / "django.mo"
    done = subprocess.run(
        ["msgfmt", "--check-format", "--statistics", "-o", compiled, path],
        capture_output=True, text=True, check=True,
    )  # fmt: skip
    assert "untranslated" not in done.stderr, done.stderr
    assert "fuzzy" not in done.stderr, done.stderr
    with compiled.open("rb") as new, path.with_suffix(".mo").open("rb") as kept:
        assert gettext.GNUTranslations(new)._catalog == gettext.GNUTranslations(kept)._catalog
