"""Lines are broken where they must be and nowhere else, and what is measured is what the font says."""

from __future__ import annotations

import pytest
from PySide6.QtGui import QFont, QFontMetricsF

from app.gui.fonts import Fonts

TEXT = "18.9 of 140 MPa in compression, at 4339 mm, with-one-long-part-that-fits-nowhere, C0"


@pytest.mark.parametrize("width", [1.0, 60.0, 90.0, 140.0, 220.0, 400.0, 5000.0])
def test_lines_are_as_long_as_the_room_allows(qapp, width):
    fonts = Fonts(QFont())
    lines = fonts.wrapped(TEXT, "plain", width).split("\n")
    assert " ".join(lines) == TEXT
    for line, after in zip(lines, [*lines[1:], ""], strict=True):
        assert " " not in line or fonts.measure(line, "plain").width() <= width
        longer = f"{line} {after.split(' ')[0]}"
        assert not after or fonts.measure(longer, "plain").width() > width


def test_a_text_measures_as_its_font_says_also_when_asked_again(qapp):
    fonts, metrics = Fonts(QFont()), QFontMetricsF(QFont())
    for _ in range(2):
        size = fonts.measure("520 → 320\nkN/m", "plain")
        assert size.width() == pytest.approx(metrics.horizontalAdvance("520 → 320"))
        assert size.height() == pytest.approx(2 * metrics.height())
        size.setWidth(0.0)  # what one caller does to it is not what the next one gets
