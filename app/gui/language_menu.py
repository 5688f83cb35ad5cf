"""The menu of languages: the system's, or one by its own name; it holds from the next start on."""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtGui import QActionGroup
from PySide6.QtWidgets import QMenu, QWidget

from app.gui.settings import Settings
from app.words import LANGUAGES, tr


class LanguageMenu(QMenu):
    """Remembers the chosen language."""

    def __init__(self, store: Settings, tell: Callable[[str], None], parent: QWidget) -> None:
        super().__init__(parent)
        self._store = store
        self._tell = tell
        group = QActionGroup(self)
        for code, name in {"": tr("As the system"), **LANGUAGES}.items():
            action = self.addAction(name, lambda code=code: self.choose(code))
            action.setCheckable(True)
            action.setChecked(code == store.language)
            group.addAction(action)

    def choose(self, code: str) -> None:
        """Remember the language and say from when on it holds."""
        self._store.set_language(code)
        self._tell(tr("The language changes when Barwright is started again"))
