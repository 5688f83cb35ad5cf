"""Pictures of the window after each step, pointer and open menus on them, and a page to look through them."""

from __future__ import annotations

import html
from pathlib import Path

from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtGui import QColor, QPainter, QPen, QPixmap
from PySide6.QtWidgets import QApplication, QWidget

from app.gui.window import Window
from tests.walk.hands import Hands

MARK = QColor("#D01070")  # no colour of the program
REACH = 9  # px of the pointer's cross


class Camera:
    """Numbers the pictures, and lists them in `index.html`."""

    def __init__(self, folder: Path, hands: Hands) -> None:
        self._folder = folder
        self._hands = hands
        self._lines: list[str] = []
        folder.mkdir(parents=True, exist_ok=True)

    def take(self, window: Window, number: int, name: str, words: str) -> None:
        """One picture."""
        picture = window.grab()
        painter = QPainter(picture)
        for other in QApplication.topLevelWidgets():
            if other is not window and other.isVisible():
                painter.drawPixmap(_place(window, other), other.grab())
        _mark_pointer(painter, window, self._hands.pointer.at)
        painter.end()
        self._save(picture, f"{number:02}-{name}.png", words)

    def _save(self, picture: QPixmap, name: str, words: str) -> None:
        picture.save(str(self._folder / name))
        said = html.escape(f"{name[:2]}. {words}")
        self._lines.append(f'<h2>{said}</h2><a href="{name}"><img src="{name}" alt="{said}"></a>')
        page = "<!doctype html><meta charset=utf-8><title>The walk</title><style>img{width:100%}</style>"
        (self._folder / "index.html").write_text(page + "\n".join(self._lines), "utf-8")


def _place(window: Window, other: QWidget) -> QPoint:
    return other.mapToGlobal(QPoint()) - window.mapToGlobal(QPoint())


def _mark_pointer(painter: QPainter, window: Window, at: QPointF) -> None:
    """A cross where the pointer was last on the sheet, and the name of its shape."""
    viewport = window.sheet.viewport()
    point = QPointF(viewport.mapTo(window, at.toPoint()))
    painter.setPen(QPen(MARK, 1.5))
    for step in (QPointF(REACH, 0), QPointF(0, REACH)):
        painter.drawLine(point - step, point + step)
    shape = viewport.cursor().shape()
    if shape != Qt.CursorShape.ArrowCursor:
        painter.drawText(point + QPointF(REACH, -REACH), shape.name.removesuffix("Cursor"))
