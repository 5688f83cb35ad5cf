"""New, open, save and the question about unsaved changes; the project file itself is `app.project_file`.

Everything that would lose the document goes through `when_safe`. A file with faults opens nothing: all its
faults are shown to read and copy.
"""

from __future__ import annotations

import hashlib
from collections.abc import Callable
from pathlib import Path

from PySide6.QtCore import QObject, Signal
from PySide6.QtWidgets import QFileDialog, QWidget

from app import project_file
from app.gui import dialogs
from app.gui.dialogs import Answer
from app.gui.document import Document, Snapshot
from app.gui.settings import Settings
from app.outcome import os_sentence
from app.phrases import fault_sentence
from app.project_file import ProjectFileError
from app.words import tr, trn
from solver.model import (
    FORMAT,
    VERSION,
    Display,
    FixedSupport,
    Joint,
    Material,
    Project,
    RoundSection,
    Segment,
    UnitSystemName,
)

SUFFIX = ".barwright.json"


def blank_project(system: UnitSystemName) -> Project:
    """A new project: one round bar of structural steel, held at its start (EN 1993-1-1:2005, 3.2.6)."""
    return Project(
        format=FORMAT,
        version=VERSION,
        display=Display(units=system),
        materials=(Material(tr("Steel"), 210e9, 12e-6, 7850.0),),
        joints=(Joint("0", FixedSupport()), Joint("1")),
        segments=(Segment("A", 1.0, tr("Steel"), RoundSection(diameter=0.05)),),
    )


def read_or_say(path: Path) -> tuple[Project | None, tuple[str, ...]]:
    """The project in a file, or None with the sentences on why there is none."""
    try:
        return project_file.read(path), ()
    except ProjectFileError as error:
        return None, tuple(fault_sentence(fault) for fault in error.faults)
    except OSError as error:
        return None, (os_sentence(error),)


class Files(QObject):
    """The document's way from and to files."""

    told = Signal(str)  # a line for the status
    recent_changed = Signal()

    def __init__(
        self, window: QWidget, document: Document, settings: Settings, commit_editor: Callable[[], None]
    ) -> None:
        super().__init__(window)
        self._window = window
        self._document = document
        self._settings = settings
        self._commit_editor = commit_editor
        self._asking = False
        self._known: dict[Path, str | None] = {}  # fingerprints of files as they were read or written

    @property
    def name(self) -> str:
        """The document's name for a person."""
        path = self._document.path
        return path.name if path else tr("new project")

    def when_safe(self, then: Callable[[], None]) -> None:
        """Go on once nothing would be lost: at once, or after the question about unsaved changes.

        While the question stands, whatever else would lose the document is not begun.
        """
        if self._asking:
            return
        self._commit_editor()
        if not self._document.modified:
            then()
            return

        def on_answer(answer: Answer) -> None:
            self._asking = False
            if answer == "discard":
                then()
            elif answer == "save":
                self.save(lambda: self._go_on_if_saved(then))

        self._asking = True
        dialogs.ask_unsaved(self._window, self.name, on_answer)

    def _go_on_if_saved(self, then: Callable[[], None]) -> None:
        """Cells left out of the file are not lost unasked."""
        if not self._document.modified:
            then()

    # Opening

    def new(self) -> None:
        """An empty project in the units chosen last."""
        self.when_safe(lambda: self._document.load(blank_project(self._settings.units), None))

    def open(self) -> None:
        """Ask for a file, then open it."""
        self.when_safe(self._ask_open)

    def _ask_open(self) -> None:
        dialog = QFileDialog(self._window, tr("Open"), str(self._settings.last_folder), _filter())
        dialog.setFileMode(QFileDialog.FileMode.ExistingFile)
        dialog.fileSelected.connect(lambda name: self.read(Path(name)))
        dialog.finished.connect(dialog.deleteLater)
        dialog.open()

    def open_path(self, path: Path) -> None:
        """Open a file that was named, dropped or is a recent one."""
        self.when_safe(lambda: self.read(path))

    def read(self, path: Path) -> bool:
        """Read a file into the document; its faults, all of them, are shown and change nothing."""
        project, faults = read_or_say(path)
        if project is None:
            self.show_faults(path, faults)
            return False
        self._document.load(project, path)
        self.remember(path)
        return True

    def show_faults(self, path: Path, sentences: tuple[str, ...]) -> None:
        """Say why a file was not opened, all of it."""
        headline = tr("{name} was not opened:").format(name=path.name)
        dialogs.show_text(self._window, tr("Not opened"), headline, "\n".join(sentences))

    def open_sample(self, project: Project) -> None:
        """Open a sample as a project of its own, without a file."""
        self.when_safe(lambda: self._document.load(project, None))

    def recover(self, snapshot: Snapshot, path: Path | None) -> None:
        """Open a recovery copy; the file, if any, does not hold it."""
        self._document.load(snapshot.project, path, drafts=snapshot.drafts)
        self._document.mark_unsaved()

    # Saving

    def save(self, then: Callable[[], None] = lambda: None) -> None:
        """Save where the document came from, or ask where to; ask too where that file is another by now."""
        self._commit_editor()
        path = self._document.path
        if path is None:
            self.save_as(then)
        elif self._changed_since(path):
            dialogs.ask_overwrite(self._window, path.name, lambda: self._write_then(path, then))
        else:
            self._write_then(path, then)

    def _changed_since(self, path: Path) -> bool:
        known, now = self._known.get(path), _fingerprint(path)
        return known is not None and now is not None and known != now

    def _write_then(self, path: Path, then: Callable[[], None]) -> None:
        if self.write(path):
            then()

    def save_as(self, then: Callable[[], None] = lambda: None) -> None:
        """Ask where to save, then save there."""
        self._commit_editor()
        start = (
            self._document.path
            or self._settings.last_folder / f"{_file_stem(self._document.project)}{SUFFIX}"
        )
        dialog = QFileDialog(self._window, tr("Save as"), str(start.parent), _filter())
        dialog.setAcceptMode(QFileDialog.AcceptMode.AcceptSave)
        dialog.setDefaultSuffix(SUFFIX.removeprefix("."))
        dialog.selectFile(start.name)

        dialog.fileSelected.connect(lambda name: self._write_then(Path(name), then))
        dialog.finished.connect(dialog.deleteLater)
        dialog.open()

    def write(self, path: Path) -> bool:
        """Write the last valid project; cells whose text is not in it are named, and it stays changed."""
        snapshot = self._document.snapshot
        try:
            project_file.write(snapshot.project, path)
        except OSError as error:
            headline = tr("{name} was not saved:").format(name=path.name)
            dialogs.show_text(self._window, tr("Not saved"), headline, os_sentence(error))
            return False
        self._document.mark_saved(snapshot.project, path)
        self.remember(path)
        self.told.emit(saved_line(snapshot))
        return True

    def remember(self, path: Path) -> None:
        """Note a file as a recent one, and what it holds now."""
        self._known[path] = _fingerprint(path)
        self._settings.add_recent(path.resolve())
        self._settings.set_last_folder(path.resolve().parent)
        self.recent_changed.emit()


def _fingerprint(path: Path) -> str | None:
    """Of what the file holds; None where it cannot be read."""
    try:
        return hashlib.sha256(path.read_bytes()).hexdigest()
    except OSError:
        return None


def saved_line(snapshot: Snapshot) -> str:
    """What the status says after saving: which cells were left out."""
    if not snapshot.drafts:
        return tr("Saved")
    cells = ", ".join(f"{draft.name} “{draft.text}”" for draft in snapshot.drafts.values())
    return trn("Saved without {count} cell: ", "Saved without {count} cells: ", len(snapshot.drafts)) + cells


def _filter() -> str:
    return tr("Barwright projects (*{suffix})").format(suffix=SUFFIX) + ";;" + tr("All files (*)")


def _file_stem(project: Project) -> str:
    """The project's title as far as a file's name can hold it."""
    kept = "".join(letter if letter.isalnum() or letter in " -_" else " " for letter in project.title)
    return " ".join(kept.split()) or tr("member")
