"""The recovery copy: the document with its drafts, half a minute after a change, not beside the project.

One copy a window, beside it a lock that a living program holds; a copy whose lock is free was left behind by
one that ended badly, and is offered at the next start. A clean end removes both.
"""

from __future__ import annotations

import json
import uuid
from collections.abc import Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from PySide6.QtCore import QLockFile, QObject, QTimer

from app import project_file
from app.atomic import write_bytes
from app.gui import log
from app.gui.document import Document, Draft, Snapshot
from app.gui.places import Place
from app.project_file import ProjectFileError

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
        self.copy.unlink(missing_ok=True)


def encode(snapshot: Snapshot, path: Path | None) -> bytes:
    """The copy's bytes."""
    drafts = [
        {"place": list(place), "text": draft.text, "reason": draft.reason, "name": draft.name}
        for place, draft in snapshot.drafts.items()
    ]
    copy = {
        "format": "barwright-recovery",
        "version": 1,
        "path": None if path is None else str(path),
        "drafts": drafts,
        "project": project_file.dump(snapshot.project).decode(),
    }
    return json.dumps(copy, ensure_ascii=False, indent=1).encode()


def decode(data: bytes, copy: Path) -> Recovered:
    """The copy's document. ValueError, KeyError or ProjectFileError where it is none."""
    stored = json.loads(data)
    project = project_file.parse(stored["project"].encode())
    drafts = dict(_draft(entry) for entry in stored["drafts"])
    path = stored["path"]
    return Recovered(Snapshot(project, drafts), None if path is None else Path(path), copy)


def _draft(entry: Mapping[str, Any]) -> tuple[Place, Draft]:
    return tuple(entry["place"]), Draft(entry["text"], entry["reason"], entry["name"])


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
        except (OSError, ValueError, KeyError, TypeError, ProjectFileError) as error:
            log.log_error(f"unreadable recovery copy {copy}", error)
    return tuple(found)


def _lock_path(copy: Path) -> Path:
    return copy.with_name(copy.name.removesuffix(SUFFIX) + ".lock")


class Recovery(QObject):
    """Keeps the copy of one document while the window lives."""

    def __init__(self, document: Document, folder: Path, parent: QObject | None = None) -> None:
        super().__init__(parent)
        folder.mkdir(parents=True, exist_ok=True)
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
            self.copy.unlink(missing_ok=True)

    def write(self) -> None:
        """Write the copy now; a full disk is logged, and does not disturb the work."""
        try:
            write_bytes(self.copy, encode(self._document.snapshot, self._document.path))
        except OSError as error:
            log.log_error("recovery copy not written", error)

    def close(self) -> None:
        """A clean end: no copy is left."""
        self._timer.stop()
        self.copy.unlink(missing_ok=True)
        self._lock.unlock()
