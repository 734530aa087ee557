"""What the papers name exists, and what exists is named."""

import re
import tomllib
from pathlib import Path

import pytest
from django.core.management import get_commands

ROOT = Path(__file__).resolve().parents[2]
README = (ROOT / "README.md").read_text()
DEVELOPERS = (ROOT / "DEVELOPERS.md").read_text()
PAPERS = README + DEVELOPERS
OWN_COMMANDS = {name for name, app in get_commands().items() if app in {"network", "reports"}}
# Commands of Django's own that the papers may name.
DJANGO_COMMANDS = {"runserver", "check", "migrate"}


def test_every_setting_of_the_environment_stands_in_the_readme_and_the_reverse():
    settings = (ROOT / "network/config/settings.py").read_text()
    read = set(re.findall(r'env\.\w+\(\s*"([A-Z_]+)"', settings))
    told = set(re.findall(r"^\| `([A-Z_]+)` \|", README, re.M))
    assert read == told


def test_every_command_the_papers_name_exists():
    named = set(re.findall(r"manage\.py ([a-z_]+)", PAPERS))
    assert named <= OWN_COMMANDS | DJANGO_COMMANDS


@pytest.mark.parametrize("command", sorted(OWN_COMMANDS))
def test_every_command_of_ours_stands_in_the_papers(command):
    assert re.search(rf"\b{command}\b", PAPERS)


@pytest.mark.parametrize(
    "path", sorted(set(re.findall(r"`((?:network|reports|tests|fixtures_demo)/[\w/.]+)`", PAPERS)))
)
def test_every_file_the_papers_name_exists(path):
    assert (ROOT / path).exists()


def test_every_dependency_has_its_reason_beside_it():
    text = (ROOT / "pyproject.toml").read_text()
    project = tomllib.loads(text)["project"]
    packages = [*project["dependencies"], *project["optional-dependencies"]["test"]]
    without = [p for p in packages if not re.search(rf'"{re.escape(p)}",\s+# \w', text)]
    assert without == []


def test_the_readme_opens_with_one_paragraph_that_states_the_job():
    title, paragraph, *_rest = README.split("\n\n")
    assert title == "# Gaugewright"
    assert paragraph.startswith("Gaugewright keeps the books of")
