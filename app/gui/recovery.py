"""The recovery copy: the document with its drafts, half a minute after a change, not beside the project.

One copy a window, beside it a lock that a living program holds; a copy whose lock is free was left behind by
one that ended badly, and is offered at the next start. A clean end removes both.
"""

from __future__ import annotations

import uuid
from dataclasses import dataclass
from pathlib import Path

import msgspec
from PySide6.QtCore import QLockFile, QObject, QTimer, Signal

from app import project_file
from app.atomic import write_bytes
from app.gui import log
from app.gui.document import Document, Draft, Snapshot
from app.gui.places import Place
from app.project_file import ProjectFileError
from app.words import tr

DELAY = 30_000  # ms from a change to the copy
SUFFIX = ".recovery.json"


@dataclass(frozen=True, slots=True)
class Recovered:
    """A copy left behind: the document and the file it belonged to (None: never saved)."""

    snapshot: Snapshot
    path: Path | None
    copy: Path

    def discard(self) -> None:
        """Remove the copy."""
        remove(self.copy)


def remove(copy: Path) -> None:
    """Remove a copy; one that cannot be removed is logged, and offered again."""
    try:
        copy.unlink(missing_ok=True)
    except OSError as error:
        log.log_error("recovery copy not removed", error)


class StoredDraft(msgspec.Struct, frozen=True):
    """A draft with its place."""

    place: Place
    text: str
    reason: str
    name: str


class Copy(msgspec.Struct, frozen=True, tag_field="format", tag="barwright-recovery"):
    """What a copy holds; the project as the text of its own file."""

    project: str
    drafts: tuple[StoredDraft, ...]
    path: str | None
    version: int = 1


def encode(snapshot: Snapshot, path: Path | None) -> bytes:
    """The copy's bytes."""
    drafts = tuple(
        StoredDraft(place, draft.text, draft.reason, draft.name) for place, draft in snapshot.drafts.items()
    )
    project = project_file.dump(snapshot.project).decode()
    return msgspec.json.encode(Copy(project, drafts, None if path is None else str(path)))


def decode(data: bytes, copy: Path) -> Recovered:
    """The copy's document. ValueError or ProjectFileError where it is none."""
    stored = msgspec.json.decode(data, type=Copy)
    project = project_file.parse(stored.project.encode())
    drafts = {draft.place: Draft(draft.text, draft.reason, draft.name) for draft in stored.drafts}
    return Recovered(Snapshot(project, drafts), None if stored.path is None else Path(stored.path), copy)


def left_behind(folder: Path) -> tuple[Recovered, ...]:
    """The copies in `folder` that no living program holds; unreadable ones are logged and left alone."""
    found = []
    for copy in sorted(folder.glob(f"*{SUFFIX}")):
        lock = QLockFile(str(_lock_path(copy)))
        lock.setStaleLockTime(0)
        if not lock.tryLock(0):
            continue
        lock.unlock()
        try:
            found.append(decode(copy.read_bytes(), copy))
        except (OSError, ValueError, RecursionError, ProjectFileError) as error:
            log.log_error(f"unreadable recovery copy {copy}", error)
    return tuple(found)


def _lock_path(copy: Path) -> Path:
    return copy.with_name(copy.name.removesuffix(SUFFIX) + ".lock")


class Recovery(QObject):
    """Keeps the copy of one document while the window lives."""

    told = Signal(str)

    def __init__(self, document: Document, folder: Path, parent: QObject | None = None) -> None:
        super().__init__(parent)
        try:
            folder.mkdir(parents=True, exist_ok=True)
        except OSError as error:  # work goes on; each copy that fails says so
            log.log_error("no folder for recovery copies", error)
        self._document = document
        self.copy = folder / f"{uuid.uuid4().hex}{SUFFIX}"
        self._lock = QLockFile(str(_lock_path(self.copy)))
        self._lock.setStaleLockTime(0)
        self._lock.lock()
        self._timer = QTimer(self)
        self._timer.setSingleShot(True)
        self._timer.setInterval(DELAY)
        self._timer.timeout.connect(self.write)
        document.changed.connect(self.on_changed)
        document.modified_changed.connect(self.on_modified)

    def on_changed(self, _snapshot: Snapshot) -> None:
        """A change: write in half a minute, unless that is already due."""
        if self._document.modified and not self._timer.isActive():
            self._timer.start()

    def on_modified(self, modified: bool) -> None:
        """Saved or opened: the file itself is the copy."""
        if not modified:
            self._timer.stop()
            remove(self.copy)

    def write(self) -> bool:
        """Write the copy now; whether it is there. A full disk is told, and does not disturb the work."""
        try:
            write_bytes(self.copy, encode(self._document.snapshot, self._document.path))
        except OSError as error:
            log.log_error("recovery copy not written", error)
            reason = error.strerror or str(error)
            self.told.emit(tr("no recovery copy could be written: {reason}").format(reason=reason))
            return False
        return True

    def close(self) -> None:
        """A clean end: no copy is left."""
        self._timer.stop()
        remove(self.copy)
        self._lock.unlock()
