"""Commands that shape the member by hand: repeat, mirror, split at the cursor, join all equal neighbours.

Each is one undo step; what cannot be done, or did more than it seems to, is said in the status line.
"""

from __future__ import annotations

import bisect
from collections.abc import Callable

from PySide6.QtCore import QObject, Qt, Signal

from app import edits
from app.drawing.shapes import Part
from app.edits import EditError
from app.edits.repeating import MOST
from app.gui.document import Document, Preview
from app.gui.hand.count_popup import CountPopup
from app.gui.sheet_view import SheetView
from app.gui.tables.pane import TablesPane
from app.gui.tables.reasons import reason_of
from app.gui.view import Selection, View
from app.hand.rounding import rounded_position
from app.words import tr, trn
from solver.model import Project


class Shaping(QObject):
    """The commands; they work on what is selected on the sheet or in the tables."""

    told = Signal(str)

    def __init__(
        self, document: Document, view: View, sheet: SheetView, tables: TablesPane, parent: QObject
    ) -> None:
        super().__init__(parent)
        self._document = document
        self._view = view
        self._sheet = sheet
        self._tables = tables
        self.popup: CountPopup | None = None
        document.changed.connect(lambda _snapshot: self.cancel())
        tables.committing.connect(self.cancel)

    def _do(self, name: str, edit: Callable[[Project], Project]) -> bool:
        """Whether it could be done."""
        try:
            project = edit(self._document.project)
        except EditError as error:
            self.told.emit(reason_of(error, self._document.project.display.unit_system))
            return False
        self._document.commit(project, name)
        return True

    def _chosen(self) -> tuple[int, ...]:
        self._tables.commit_open_editor()
        return self._tables.views["segments"].chosen_records()

    # Repeat

    def repeat(self) -> None:
        """Ask beside the sheet how often, and show what that gives meanwhile."""
        chosen = self._chosen()
        if not chosen or chosen[-1] - chosen[0] >= len(chosen):
            self.told.emit(tr("choose one segment, or several side by side, to repeat"))
            return
        first, last = chosen[0], chosen[-1]

        def preview(times: int) -> None:
            self._document.set_preview(self._repeated(first, last, times))

        def done(times: int | None) -> None:
            self.popup = None
            self._sheet.setFocus(Qt.FocusReason.OtherFocusReason)
            if times is None:
                self._document.drop_preview()
            else:
                self._repeat(first, last, times)

        words = trn("Repeat the segment, times", "Repeat {count} segments, times", len(chosen))
        self.popup = CountPopup(self._sheet.viewport(), words.format(count=len(chosen)), MOST, preview, done)
        self.popup.open_at(self._sheet.box_of(Part("segment", last)))
        preview(1)

    def cancel(self) -> bool:
        """Give up what is being asked for; False where nothing is."""
        asking = self.popup is not None
        if self.popup is not None:
            self.popup.give_up()
        return asking

    def _repeat(self, first: int, last: int, times: int) -> None:
        if self._do(tr("Repeat segments"), lambda p: edits.repeat_segments(p, first, last, times)):
            count = times * (last - first + 1)
            fresh = frozenset(range(last + 1, last + 1 + count))
            self._view.set_selection(Selection(segments=fresh))
            words = trn(
                "{count} segment added with its loads; the joints between copies are free",
                "{count} segments added with their loads; the joints between copies are free",
                count,
            )
            self.told.emit(words.format(count=count))

    def _repeated(self, first: int, last: int, times: int) -> Preview:
        try:
            return Preview(edits.repeat_segments(self._document.project, first, last, times))
        except EditError as error:
            return Preview(None, reason_of(error, self._document.project.display.unit_system))

    # Mirror, join

    def mirror(self) -> None:
        """The member becomes symmetrical about its far end."""
        self._tables.commit_open_editor()
        before = self._document.project
        if self._do(tr("Mirror the half"), edits.mirror_member):
            self.told.emit(mirror_news(before, self._document.project))

    def join_equal(self) -> None:
        """All neighbours that differ in nothing but length and mark become one."""
        self._tables.commit_open_editor()
        before = len(self._document.project.segments)
        if self._do(tr("Join equal neighbours"), edits.join_equal_neighbours):
            gone = before - len(self._document.project.segments)
            words = trn("{count} joint taken out", "{count} joints taken out", gone)
            none = tr("no neighbours are alike in all but length, with a bare joint between them")
            self.told.emit(words.format(count=gone) if gone else none)

    # Split

    def split_at_cursor(self) -> None:
        """A joint where the cursor is."""
        if self._view.cursor is None:
            self.told.emit(tr("put the cursor where the joint should be: click there, or use the arrow keys"))
        else:
            self.split_at(self._view.cursor.x)

    def split_at(self, x: float) -> None:
        """A joint at a position, on a round number that a pixel can tell apart."""
        self._tables.commit_open_editor()
        project = self._document.project
        step = 1.0 / self._sheet.ruler.pixels_per_metre
        positions = self._sheet.positions
        x = x if x in positions else rounded_position(x, step, project.display.unit_system)
        index = min(max(bisect.bisect_right(positions, x) - 1, 0), len(positions) - 2)
        at = x - positions[index]
        if not 0.0 < at < project.segments[index].length:
            self.told.emit(tr("there is a joint already"))
            return
        at = rounded_position(at, 1e-6, project.display.unit_system)
        if self._do(tr("Insert joint"), lambda p: edits.split_segment(p, index, at)):
            self._view.set_selection(Selection(joints=frozenset((index + 1,))))


def mirror_news(before: Project, after: Project) -> str:
    """What mirroring did beside the segments, in words."""
    middle = before.joints[-1].mark
    gone = sum(load.joint == middle for case in before.load_cases for load in case.joint_loads)
    limits = _limits(after) - _limits(before)
    lines = [tr("joint {mark} is the middle now").format(mark=middle)]
    if gone:
        words = trn("{count} load of it taken off", "{count} loads of it taken off", gone)
        lines.append(words.format(count=gone))
    if limits:
        words = trn("{count} limit mirrored too", "{count} limits mirrored too", limits)
        lines.append(words.format(count=limits))
    if any(case.gravity for case in before.load_cases):
        lines.append(tr("gravity stays along x on both halves"))
    return "; ".join(lines)


def _limits(project: Project) -> int:
    limits = project.limits
    return len(limits.displacement) + len(limits.relative) + len(limits.reaction)
