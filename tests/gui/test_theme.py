"""Contrast of everything that is read or looked at, computed; and the choice by the system's palette."""

from __future__ import annotations

import pytest
from PySide6.QtGui import QColor, QPalette

from app.gui.theme import DARK, LIGHT, Theme, contrast, greyed, luminance, mixed, theme_for

GROUNDS = ("paper", "panel", "card")
MARKS = ("joint", "tension", "compression", "displacement", "over", "select")
THEMES = pytest.mark.parametrize("theme", [LIGHT, DARK, greyed(LIGHT), greyed(DARK)])


def test_contrast_is_that_of_the_guideline():
    # WCAG 2.2, definition of contrast ratio: black on white is 21:1, equal colours 1:1.
    assert contrast("#000000", "#FFFFFF") == pytest.approx(21.0)
    assert contrast("#0072B2", "#0072B2") == 1.0
    # #767676 is the usual example of the lightest grey that passes 4.5:1 on white (value from memory).
    assert 4.5 < contrast("#767676", "#FFFFFF") < 4.6


@THEMES
@pytest.mark.parametrize("ground", GROUNDS)
def test_text_has_at_least_four_and_a_half_to_one(theme: Theme, ground: str):
    for text in ("ink", "quiet", "over"):
        assert contrast(getattr(theme, text), getattr(theme, ground)) >= 4.5, text


@THEMES
@pytest.mark.parametrize(
    "ground", ["paper", "panel", "card", "tension_fill", "compression_fill", "band_fill"]
)
def test_lines_and_marks_have_at_least_three_to_one(theme: Theme, ground: str):
    for mark in MARKS:
        assert contrast(getattr(theme, mark), getattr(theme, ground)) >= 3.0, mark


@THEMES
def test_labels_on_fills_of_the_strips_can_be_read(theme: Theme):
    for fill in ("tension_fill", "compression_fill", "over_fill", "band_fill"):
        assert contrast(theme.ink, getattr(theme, fill)) >= 4.5, fill
    assert contrast(theme.quiet, theme.band_fill) >= 4.5


@pytest.mark.parametrize("theme", [LIGHT, DARK])  # the drawing is never greyed: it shows the project
def test_labels_on_the_member_can_be_read(theme: Theme):
    for fill in ("body_fill", "select_fill", "load_fill"):
        assert contrast(theme.ink, getattr(theme, fill)) >= 4.5, fill


# Where else a colour stands on another: who paints it so, what, on which ground, and how much it needs.
PAIRS = {
    "cell of a chosen row": ("ink", "select_fill", 4.5),
    "figure or hint of a chosen row": ("quiet", "select_fill", 4.5),
    "entry not taken in, in a chosen row": ("over", "select_fill", 4.5),
    "the ! beside it": ("card", "over", 4.5),
    "name of the tab with the keyboard, link of help": ("select", "card", 4.5),
    "frame of the current cell, of a picker": ("select", "select_fill", 3.0),
    "frame in the top bar": ("select", "panel", 3.0),
    "bar of utilisation, tension": ("tension", "body_fill", 3.0),
    "bar of utilisation, compression": ("compression", "body_fill", 3.0),
    "bar of utilisation, over": ("over", "body_fill", 3.0),
    "bar of utilisation, out of date": ("quiet", "body_fill", 3.0),
    "bar of utilisation in a chosen row": ("compression", "select_fill", 3.0),
    "hatching over the limit": ("over", "over_fill", 3.0),
    "joint lines across the member": ("joint", "body_fill", 3.0),
}


@pytest.mark.parametrize("theme", [LIGHT, DARK])
@pytest.mark.parametrize("where", PAIRS)
def test_what_stands_on_other_grounds_can_be_seen(theme: Theme, where: str):
    mark, ground, least = PAIRS[where]
    assert contrast(getattr(theme, mark), getattr(theme, ground)) >= least


def test_the_palette_decides():
    dark = QPalette()
    dark.setColor(QPalette.ColorRole.Window, QColor("#202020"))
    dark.setColor(QPalette.ColorRole.WindowText, QColor("#EEEEEE"))
    light = QPalette()
    light.setColor(QPalette.ColorRole.Window, QColor("#F0F0F0"))
    light.setColor(QPalette.ColorRole.WindowText, QColor("#101010"))
    assert theme_for(dark) is DARK
    assert theme_for(light) is LIGHT
    assert DARK.is_dark
    assert not LIGHT.is_dark


def test_what_is_out_of_date_has_no_colour_left():
    grey = greyed(LIGHT)
    assert {grey.tension, grey.compression, grey.displacement, grey.over} == {LIGHT.quiet}
    assert grey.tension_fill == grey.compression_fill


def test_a_mixture_lies_between_its_parts():
    assert mixed("#000000", "#FFFFFF", 0.0) == "#FFFFFF"
    assert mixed("#000000", "#FFFFFF", 1.0) == "#000000"
    assert luminance("#000000") < luminance(mixed("#000000", "#FFFFFF", 0.5)) < 1.0
