"""The calc sheet from the window: asks for a file, writes the PDF in a thread of its own."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path

from PySide6.QtCore import QObject, Signal
from PySide6.QtWidgets import QFileDialog, QWidget

from app.gui import log
from app.gui.document import Document
from app.gui.settings import Settings
from app.gui.worker import Delivery, LatestSolver
from app.title_fields import TITLE_FIELDS
from app.words import tr
from solver.errors import InputError
from solver.model import Project


@dataclass(frozen=True, slots=True)
class SheetRequest:
    """What to print, of which file, to where."""

    project: Project
    file_name: str
    target: Path
    changed: bool  # whether the file does not hold it


def write_sheet(request: SheetRequest, _cancelled: Callable[[], bool]) -> Path:
    """In the background: solve and write the PDF, also while the window is being closed.

    Raises what the solver and the disk raise.
    """
    from app.atomic import write_bytes
    from app.sheet import build_sheet
    from solver.solve import solve

    results = solve(request.project, cases=False)
    name, changed = request.file_name, request.changed
    write_bytes(request.target, build_sheet(request.project, results, file_name=name, changed=changed))
    return request.target


class Printing(QObject):
    """Writes calc sheets of the document."""

    told = Signal(str)

    def __init__(
        self, window: QWidget, document: Document, settings: Settings, commit_editor: Callable[[], None]
    ) -> None:
        super().__init__(window)
        self._window = window
        self._document = document
        self._settings = settings
        self._commit_editor = commit_editor
        self._nameless = False  # whether nobody stands in the title block of what is being written
        self._worker = LatestSolver(write_sheet, self)
        self._worker.ready.connect(self.on_written)
        self._worker.failed.connect(self.on_failed)

    def ask(self) -> None:
        """Ask where to, with the file's own name suggested, then write."""
        self._commit_editor()
        path = self._document.path
        folder = path.parent if path else self._settings.last_folder
        stem = path.name.removesuffix(".json").removesuffix(".barwright") if path else tr("calc sheet")
        dialog = QFileDialog(self._window, tr("Write calc sheet"), str(folder), tr("PDF (*.pdf)"))
        dialog.setAcceptMode(QFileDialog.AcceptMode.AcceptSave)
        dialog.setDefaultSuffix("pdf")
        dialog.selectFile(f"{stem}.pdf")
        dialog.fileSelected.connect(lambda name: self.write(Path(name)))
        dialog.finished.connect(dialog.deleteLater)
        dialog.open()

    def write(self, target: Path) -> None:
        """Write the sheet of the last valid project, unless one is still being written."""
        if self._worker.busy:
            self.told.emit(tr("another calc sheet is still being written: try again when it is done"))
            return
        path = self._document.path
        self.told.emit(tr("writing {name} …").format(name=target.name))
        name, changed = path.name if path else "", not self._document.file_holds_it
        sheet = self._document.project.sheet
        self._nameless = not any(getattr(sheet, key).strip() for key, _words in TITLE_FIELDS)
        self._worker.request(SheetRequest(self._document.project, name, target, changed))

    def on_written(self, delivery: Delivery) -> None:
        """Done; says so, and what is not in it."""
        line = tr("{name} written").format(name=getattr(delivery.value, "name", ""))
        left_out = ", ".join(draft.name for draft in self._document.snapshot.drafts.values())
        if left_out:
            line = tr("{line}, without: {cells}").format(line=line, cells=left_out)
        if self._nameless:
            line = tr("{line}; its title block is empty: File > Title block…").format(line=line)
        self.told.emit(line)

    def on_failed(self, delivery: Delivery) -> None:
        """Not done; says why. A fault of ours is logged."""
        from app.phrases import error_sentences

        error = delivery.value
        if isinstance(error, InputError):
            reason = "; ".join(error_sentences(error))
        elif isinstance(error, OSError):
            reason = error.strerror or str(error)
        else:
            assert isinstance(error, BaseException)  # noqa: S101 - what a failure carries
            log.log_error("calc sheet", error)
            reason = tr("a fault of the program, see the log: {error}").format(error=error)
        self.told.emit(tr("No calc sheet written: {reason}").format(reason=reason))

    def close(self) -> None:
        """Wait for what is being written."""
        self._worker.close()
