"""The menus that are filled when they open: recent files and packaged samples."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from PySide6.QtWidgets import QMenu, QWidget

from app import samples
from app.gui.settings import Settings
from app.words import tr
from solver.model import Project


class RecentMenu(QMenu):
    """The files used last, those that still exist."""

    def __init__(self, store: Settings, open_path: Callable[[Path], None], parent: QWidget) -> None:
        super().__init__(parent)
        self._store = store
        self._open_path = open_path
        self.aboutToShow.connect(self.fill)

    def fill(self) -> None:
        """List them anew."""
        self.clear()
        for path in self._store.recent:
            self.addAction(str(path).replace("&", "&&"), lambda path=path: self._open_path(path))
        if self.isEmpty():
            self.addAction(tr("none yet")).setEnabled(False)
            return
        self.addSeparator()
        self.addAction(tr("Forget these"), self._store.clear_recent)


class SamplesMenu(QMenu):
    """The packaged samples; each opens as a new project."""

    def __init__(self, open_sample: Callable[[Project], None], parent: QWidget) -> None:
        super().__init__(parent)
        self._open_sample = open_sample
        self.aboutToShow.connect(self.fill)

    def fill(self) -> None:
        """List them anew."""
        self.clear()
        for name in samples.names():
            words = name.replace("_", " ").capitalize()
            self.addAction(words, lambda name=name: self._open_sample(samples.read_sample(name)))
