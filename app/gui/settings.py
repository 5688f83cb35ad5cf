"""What the program remembers between starts, never in the project: window, splitters, files, last folder."""

from __future__ import annotations

import os
from pathlib import Path
from typing import Final, cast, get_args

from PySide6.QtCore import QByteArray, QSettings, QStandardPaths

from app.looks import Looks
from app.strip_choice import StripChoice
from app.words import LANGUAGES
from solver.model import DEFAULT_UNITS, UnitSystemName

MOST_RECENT: Final = 10


def default_file() -> Path:
    """Where the settings lie for this user."""
    return folder() / "settings.ini"


def folder() -> Path:
    """The program's own folder for settings, log and recovery copies."""
    base = QStandardPaths.writableLocation(QStandardPaths.StandardLocation.AppDataLocation)
    return Path(base)


class Settings:
    """Typed access to the settings file."""

    def __init__(self, path: Path | None = None) -> None:
        self._store = QSettings(str(path or default_file()), QSettings.Format.IniFormat)

    def bytes_of(self, key: str) -> QByteArray:
        """A window's or splitter's state; empty where there is none."""
        value = self._store.value(key)
        return value if isinstance(value, QByteArray) else QByteArray()

    def set_bytes(self, key: str, value: QByteArray) -> None:
        """Remember a window's or splitter's state."""
        self._store.setValue(key, value)

    @property
    def recent(self) -> tuple[Path, ...]:
        """The files used last, newest first, those that still exist."""
        stored = self._store.value("recent", [])
        texts = stored if isinstance(stored, list) else [stored]
        return tuple(Path(text) for text in texts if text and os.path.isfile(text))  # noqa: PTH113 - never raises

    def add_recent(self, path: Path) -> None:
        """Put a file at the front of the recent ones."""
        kept = [path, *(other for other in self.recent if other != path)][:MOST_RECENT]
        self._store.setValue("recent", [str(other) for other in kept])

    def clear_recent(self) -> None:
        """Forget the recent files."""
        self._store.setValue("recent", [])

    @property
    def last_folder(self) -> Path:
        """Where the last file was opened or saved."""
        stored = self._store.value("last_folder", "")
        documents = QStandardPaths.writableLocation(QStandardPaths.StandardLocation.DocumentsLocation)
        return Path(str(stored)) if os.path.isdir(str(stored)) else Path(documents)  # noqa: PTH112 - never raises

    def set_last_folder(self, path: Path) -> None:
        """Remember a folder."""
        self._store.setValue("last_folder", str(path))

    @property
    def units(self) -> UnitSystemName:
        """The display units of a new project: those chosen last."""
        stored = self._store.value("units", DEFAULT_UNITS)
        return cast(UnitSystemName, stored) if stored in get_args(UnitSystemName) else DEFAULT_UNITS

    def set_units(self, system: UnitSystemName) -> None:
        """Remember the display units."""
        self._store.setValue("units", system)

    def columns(self, table: str) -> tuple[str, ...]:
        """The columns of a table that are shown or hidden other than at first."""
        stored = self._store.value(f"columns/{table}", [])
        return tuple(map(str, stored if isinstance(stored, list) else [stored]))

    def set_columns(self, table: str, keys: tuple[str, ...]) -> None:
        """Remember them."""
        self._store.setValue(f"columns/{table}", list(keys))

    @property
    def language(self) -> str:
        """The language chosen for the window; empty where it is the system's."""
        stored = str(self._store.value("language", ""))
        return stored if stored in LANGUAGES else ""

    def set_language(self, language: str) -> None:
        """Remember a language, empty for the system's."""
        self._store.setValue("language", language)

    @property
    def strips(self) -> StripChoice:
        """The strips chosen last, in their order."""
        return StripChoice.of_text(str(self._store.value("strips", "")))

    def set_strips(self, strips: StripChoice) -> None:
        """Remember the strips."""
        self._store.setValue("strips", strips.text)

    @property
    def together(self) -> bool:
        """Whether single states and envelope were drawn together last."""
        return str(self._store.value("together", "")) == "yes"

    def set_together(self, together: bool) -> None:
        """Remember whether they are."""
        self._store.setValue("together", "yes" if together else "no")

    @property
    def looks(self) -> Looks:
        """What was last shown of the results on the drawing."""
        return Looks.of_text(str(self._store.value("looks", "")))

    def set_looks(self, looks: Looks) -> None:
        """Remember it."""
        self._store.setValue("looks", looks.text)

    def sync(self) -> None:
        """Write what has changed to the file."""
        self._store.sync()
