"""The open project: the last valid project plus the drafts, as one frozen snapshot; undo is a list of them.

What follows while a cell is being typed is a preview: it is solved and drawn, but it is no part of the
document until it is committed. A draft is a cell's text that is no valid entry; it stays as typed, with its
reason, and is part of undo steps and of the recovery copy. Lives in the GUI thread; knows no widget.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from types import MappingProxyType

from PySide6.QtCore import QObject, Signal

from app.gui.places import Place, follow
from app.project_file import dump
from solver.model import Project

UNDO_LIMIT = 500  # steps kept; a step is a few kB, since records are shared between snapshots


@dataclass(frozen=True, slots=True)
class Draft:
    """A cell's text as typed, why it was not taken in, and which cell it is in words."""

    text: str
    reason: str
    name: str = ""


NO_DRAFTS: Mapping[Place, Draft] = MappingProxyType({})


@dataclass(frozen=True, slots=True)
class Snapshot:
    """The document at one moment."""

    project: Project
    drafts: Mapping[Place, Draft] = field(default_factory=lambda: NO_DRAFTS)


def moved(drafts: Mapping[Place, Draft], old: Project, new: Project) -> dict[Place, Draft]:
    """The drafts at the places where their cells stand in `new`; those of rows that are gone are dropped."""
    places = ((follow(place, old, new), draft) for place, draft in drafts.items())
    return {place: draft for place, draft in places if place is not None}


def alike(one: Project, other: Project) -> bool:
    """Whether both are the same file: equal projects can still differ in it, such as by a written 0."""
    return one is other or (one == other and dump(one) == dump(other))


@dataclass(frozen=True, slots=True)
class Step:
    """A snapshot and the name of what led to it."""

    name: str
    snapshot: Snapshot


@dataclass(frozen=True, slots=True)
class Preview:
    """What an open editor holds: a valid project, or None with the reason why it is none yet."""

    project: Project | None
    reason: str = ""
    moving: bool = False  # under a hand that has not come to rest
    by_hand: bool = False  # of a hand on the drawing, so that no cell holds its text


class Document(QObject):
    """One open project. `path` is None until it has been saved or opened."""

    opened = Signal()  # another project, before `changed` says which
    changed = Signal(object)  # Snapshot; committed, undone, redone or opened
    preview_changed = Signal(object)  # Preview or None
    modified_changed = Signal(bool)
    path_changed = Signal(object)  # Path or None
    history_changed = Signal()

    def __init__(self, project: Project, path: Path | None = None, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._steps: list[Step] = [Step("", Snapshot(project))]
        self._index = 0
        self._saved: Project | None = project
        self._path = path
        self._preview: Preview | None = None
        self._was_modified = False
        self._gesture: object = None  # whose undo step may still be amended

    @property
    def snapshot(self) -> Snapshot:
        """The committed state."""
        return self._steps[self._index].snapshot

    @property
    def project(self) -> Project:
        """The last valid project that was committed."""
        return self.snapshot.project

    @property
    def path(self) -> Path | None:
        """The file, or None."""
        return self._path

    @property
    def preview(self) -> Preview | None:
        """What an open editor holds, or None while there is nothing to preview."""
        return self._preview

    @property
    def shown_project(self) -> Project:
        """The project whose results are wanted: the preview where it is valid, else the committed one."""
        valid = self._preview.project if self._preview else None
        return valid or self.project

    @property
    def has_drafts(self) -> bool:
        """Whether something typed is not in the project, so that its results are out of date."""
        typed = self._preview is not None and self._preview.project is None
        return typed or bool(self.snapshot.drafts)

    @property
    def modified(self) -> bool:
        """Whether saving would change the file, or something typed is not in it."""
        return bool(self.snapshot.drafts) or self._saved is None or not alike(self.project, self._saved)

    @property
    def undo_name(self) -> str | None:
        """What undo would take back; None where there is nothing."""
        return self._steps[self._index].name if self._index > 0 else None

    @property
    def redo_name(self) -> str | None:
        """What redo would do again; None where there is nothing."""
        following = self._steps[self._index + 1 : self._index + 2]
        return following[0].name if following else None

    def load(self, project: Project, path: Path | None, *, drafts: Mapping[Place, Draft] = NO_DRAFTS) -> None:
        """Make this the document, with a fresh history."""
        self._steps = [Step("", Snapshot(project, MappingProxyType(dict(drafts))))]
        self._index = 0
        self._saved = project
        self._gesture = None
        self._preview = None
        self._path = path
        self.path_changed.emit(path)
        self.opened.emit()
        self._announce()

    def mark_unsaved(self) -> None:
        """Say that no file holds this project (it was recovered)."""
        self._saved = None
        self._announce_modified()

    @property
    def file_holds_it(self) -> bool:
        """Whether the project, its entries that are not taken in aside, is what its file was saved with."""
        saved = self._saved
        return self.path is not None and saved is not None and alike(self.project, saved)

    def mark_saved(self, project: Project, path: Path) -> None:
        """Note that `path` now holds `project`."""
        self._saved = project
        if path != self._path:
            self._path = path
            self.path_changed.emit(path)
        self._announce_modified()

    def commit(self, project: Project, name: str, *, settled: tuple[Place, ...] = ()) -> None:
        """One undo step to `project`; drafts at `settled` places are done with, others follow their row."""
        old = self.snapshot
        unsettled = {place: draft for place, draft in old.drafts.items() if place not in settled}
        drafts = moved(unsettled, old.project, project)
        self.commit_snapshot(Snapshot(project, MappingProxyType(drafts)), name)

    def commit_gesture(self, project: Project, name: str, gesture: object) -> None:
        """One undo step for a whole gesture: its first commit makes it, and later ones amend it, as long as
        nothing else has been done. What comes back to where it began leaves no step.
        """
        if self._gesture is not None and self._gesture == gesture:
            self._index -= 1  # the amended step takes the place of the one there was
            if alike(project, self.project):
                del self._steps[self._index + 1 :]
                self._gesture = None
                self._announce()
                return
        self.commit(project, name)
        self._gesture = gesture if self.project is project else None

    def may_amend(self, gesture: object) -> bool:
        """Whether a gesture's undo step is the last thing that was done."""
        return self._gesture is not None and self._gesture == gesture

    def commit_draft(self, place: Place, draft: Draft, name: str) -> None:
        """One undo step that keeps a cell's text as typed."""
        drafts = dict(self.snapshot.drafts)
        drafts.pop(place, None)  # the newest stands last
        drafts[place] = draft
        self.commit_snapshot(Snapshot(self.project, MappingProxyType(drafts)), name)

    def commit_snapshot(self, snapshot: Snapshot, name: str) -> None:
        """One undo step to `snapshot`; none where nothing differs."""
        self._gesture = None
        old = self.snapshot
        if alike(snapshot.project, old.project):
            snapshot = Snapshot(old.project, snapshot.drafts)  # an entry that says the same changes nothing
        if snapshot.project is old.project and snapshot.drafts == old.drafts:
            self.drop_preview()
            return
        self._steps[self._index + 1 :] = [Step(name, snapshot)]
        del self._steps[: max(0, len(self._steps) - UNDO_LIMIT)]
        self._index = len(self._steps) - 1
        self._announce()

    def undo(self) -> None:
        """Back one step, if there is one."""
        self._go_to(self._index - 1)

    def redo(self) -> None:
        """Forward one step, if there is one."""
        self._go_to(self._index + 1)

    def set_preview(self, preview: Preview | None) -> None:
        """Show what an open editor holds; None ends it."""
        if preview != self._preview:
            self._preview = preview
            self.preview_changed.emit(preview)

    def drop_preview(self) -> None:
        """Back to what is committed."""
        self.set_preview(None)

    def _go_to(self, index: int) -> None:
        if 0 <= index < len(self._steps) and index != self._index:
            self._gesture = None
            self._index = index
            self._announce()

    def _announce(self) -> None:
        self._preview = None  # what is announced holds it, or has replaced it
        self.changed.emit(self.snapshot)
        self.history_changed.emit()
        self._announce_modified()

    def _announce_modified(self) -> None:
        if self.modified != self._was_modified:
            self._was_modified = self.modified
            self.modified_changed.emit(self.modified)
