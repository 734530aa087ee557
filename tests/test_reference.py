"""The finder of reference files skips on a desk and fails where CI is set."""

import pytest

from tests import reference


def test_an_absent_file_skips_with_a_sentence_that_names_it(monkeypatch):
    monkeypatch.delenv("CI", raising=False)
    with pytest.raises(pytest.skip.Exception, match="no_such_file"):
        reference.reference_file("data/no_such_file.csv")


def test_an_absent_file_fails_where_ci_is_set(monkeypatch):
    monkeypatch.setenv("CI", "1")
    with pytest.raises(pytest.fail.Exception, match="no_such_file"):
        reference.reference_file("data/no_such_file.csv")


def test_a_file_that_is_there_is_given(monkeypatch, tmp_path):
    monkeypatch.setattr(reference, "REFERENCE", tmp_path)
    (tmp_path / "figures.csv").write_text("1\n")
    assert reference.reference_file("figures.csv") == tmp_path / "figures.csv"
