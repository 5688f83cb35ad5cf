"""The menu of typical materials: those that the project has not yet, each marked as one to verify."""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtWidgets import QMenu, QWidget

from app.gui.document import Document
from app.typical_materials import not_in
from app.words import tr
from solver.model import Material


class TypicalMenu(QMenu):
    """Adds the chosen one to the project."""

    def __init__(self, document: Document, add: Callable[[Material], None], parent: QWidget) -> None:
        super().__init__(parent)
        self._document = document
        self._add = add
        self.aboutToShow.connect(self.fill)

    def fill(self) -> None:
        """List them anew."""
        self.clear()
        for material in not_in(self._document.project):
            words = tr("{name} (typical, verify)").format(name=material.name)
            self.addAction(words.replace("&", "&&"), lambda material=material: self._add(material))
        if self.isEmpty():
            self.addAction(tr("all are in the project")).setEnabled(False)
