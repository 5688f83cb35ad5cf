"""The command that takes pictures of the window: the file asked for, in the size asked for, and not blank."""

from __future__ import annotations

from pathlib import Path

from PySide6.QtGui import QImage
from PySide6.QtWidgets import QApplication

from tests import screenshots


def test_a_picture_shows_the_window_in_the_size_asked_for(qapp: QApplication, tmp_path: Path) -> None:
    asked = ["--sample", "tie_rod", "--units", "in-lbf-psi", "--size", "1280x800", "--show", "Storm surge"]
    assert screenshots.main([str(tmp_path), *asked]) == 0
    image = QImage(str(tmp_path / "tie_rod-in-lbf-psi-1280x800.png"))
    assert (image.width(), image.height()) == (1280, 800)
    colours = {image.pixel(x, y) for x in range(0, 1280, 7) for y in range(0, 800, 7)}
    assert len(colours) > 20
