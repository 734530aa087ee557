"""Finds the published figures and open data that lie beside the project, not in it."""

import os
from pathlib import Path

import pytest

REFERENCE = Path(__file__).resolve().parents[2] / "shared" / "reference"


def reference_file(name: str) -> Path:
    """Give the path of a reference file, such as "data/nist_DanWood.dat".

    Works in a test, in a fixture and at module level. Where the folder is absent the test is
    skipped with a sentence; where the environment variable CI is set it fails instead.
    """
    path = REFERENCE / name
    if path.exists():
        return path
    sentence = f"{name} is absent: the folder ../shared/reference is needed beside the project."
    if os.environ.get("CI"):
        pytest.fail(sentence, pytrace=False)
    pytest.skip(sentence, allow_module_level=True)
