"""The menu of what the drawing shows beside the member: colours, displaced shape, scale along."""

from __future__ import annotations

from msgspec.structs import replace
from PySide6.QtGui import QActionGroup
from PySide6.QtWidgets import QMenu, QWidget

from app.gui.view import View
from app.looks import COLOUR_WORDS, Colour, Looks
from app.words import tr


class DrawingMenu(QMenu):
    """Sets the looks of the view and says what they are."""

    def __init__(self, view: View, parent: QWidget) -> None:
        super().__init__(parent)
        self._view = view
        group = QActionGroup(self)
        self.colours = {colour: self.addAction(tr(words)) for colour, words in COLOUR_WORDS.items()}
        for colour, action in self.colours.items():
            action.setCheckable(True)
            action.triggered.connect(lambda _on=False, chosen=colour: self._colour(chosen))
            group.addAction(action)
        self.addSeparator()
        self.displaced = self.addAction(tr("&Displaced shape"))
        self.displaced.setCheckable(True)
        self.displaced.triggered.connect(lambda on: self._choose(replace(view.looks, displaced=on)))
        self.true = self.addAction(tr("&True to scale along"))
        self.true.setCheckable(True)
        self.true.triggered.connect(lambda on: self._choose(replace(view.looks, true=on)))
        view.looks_changed.connect(self.on_looks)
        self.on_looks(view.looks)

    def on_looks(self, looks: Looks) -> None:
        """The marks follow."""
        self.colours[looks.colour].setChecked(True)
        self.displaced.setChecked(looks.displaced)
        self.true.setChecked(looks.true)

    def _colour(self, colour: Colour) -> None:
        self._choose(replace(self._view.looks, colour=colour))

    def _choose(self, looks: Looks) -> None:
        self._view.set_looks(looks)
