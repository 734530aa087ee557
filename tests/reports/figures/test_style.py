"""The figures wear the tokens of screen and print."""

import re
from pathlib import Path

import pytest
from django.contrib.staticfiles import finders

from reports.figures import style
from reports.figures.style import FONT_FILES


def tokens() -> dict[str, str]:
    """Return the colours of tokens.css by name."""
    text = Path(finders.find("network/css/tokens.css")).read_text(encoding="utf-8")
    return dict(re.findall(r"--([a-z-]+): (#[0-9a-f]{6});", text))


COLOURS = {
    name: value
    for name, value in vars(style).items()
    if isinstance(value, str) and re.fullmatch("#[0-9a-f]{6}", value)
}


@pytest.mark.parametrize("name", COLOURS)
def test_colour_of_the_figures_equals_the_token_of_its_name(name):
    assert COLOURS[name] == tokens()[name.lower().replace("_", "-")]


def luminance(colour: str) -> float:
    """Return the relative luminance of "#rrggbb" (WCAG 2.2, definition of relative luminance)."""
    parts = [int(colour[i : i + 2], 16) / 255 for i in (1, 3, 5)]
    linear = [p / 12.92 if p <= 0.04045 else ((p + 0.055) / 1.055) ** 2.4 for p in parts]
    return sum(weight * p for weight, p in zip((0.2126, 0.7152, 0.0722), linear, strict=True))


@pytest.mark.parametrize(
    "name", ["ink", "ink-soft", "water", "clay", "moss", "good", "warn", "bad"]
)
@pytest.mark.parametrize("ground", ["paper", "paper-tint"])
def test_text_colours_stand_out_by_at_least_4_5_to_1(name, ground):
    """WCAG 2.2, success criterion 1.4.3."""
    light, dark = luminance(tokens()[ground]), luminance(tokens()[name])
    assert (light + 0.05) / (dark + 0.05) >= 4.5


def test_fonts_are_whole_files_of_the_installed_package():
    assert set(FONT_FILES) == {400, 600}
    assert all(path.stat().st_size > 50_000 for path in FONT_FILES.values())
