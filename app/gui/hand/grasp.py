"""What is in the hand and what becomes of it: previews, the readout, one undo step, or all as it was.

Pointer, exact entry and nudging keys each take a number and move it; this is what they share. Whatever else
changes the document meanwhile ends the gesture, and nothing is left half done.
"""

from __future__ import annotations

from collections.abc import Callable
from enum import Enum, auto

from PySide6.QtCore import QObject, QPointF, QRectF, Signal

from app.drawing.handles import Handle
from app.gui.document import Document, Preview
from app.gui.hand.pull import Pull, taken
from app.gui.hand.reach import follow_end
from app.gui.sheet_view import SheetView
from app.gui.view import View
from app.hand.grip import Refusal
from app.hand.taking import part_of
from app.words import tr
from solver.model import Project


class Phase(Enum):
    """What the hand is doing."""

    IDLE = auto()
    PULLING = auto()
    AFTER = auto()  # let go, nudged or taken by a key: still in hand
    TYPING = auto()


class Grasp(QObject):
    """The number in the hand; `case` names the load case that is edited, `settle` takes in an open cell."""

    told = Signal(str)
    ended = Signal()

    def __init__(
        self,
        document: Document,
        view: View,
        sheet: SheetView,
        case: Callable[[], str | None],
        settle: Callable[[], None],
        parent: QObject | None = None,
    ) -> None:
        super().__init__(parent)
        self._document, self._view, self._sheet = document, view, sheet
        self._case, self._settle = case, settle
        self._own = False  # whether it is this hand that changes the document
        self.paper = sheet.paper
        self.phase = Phase.IDLE
        self.pull: Pull | None = None
        self.point = QPointF()  # where the readout stands
        document.changed.connect(self._on_changed)
        view.shown_changed.connect(lambda _shown: self.cancel())

    @property
    def sheet(self) -> SheetView:
        """The sheet it is over."""
        return self._sheet

    def take(self, handle: Handle, *, total_stays: bool = False) -> Pull | None:
        """Take a handle in hand; where that cannot be, the status line says why."""
        self._settle()
        self.paper.show_member(self._document.project)
        sketch = self._sheet.drawing.sketch
        if sketch is None:
            return None
        pull = taken(handle, sketch, self._view.shown, self._case(), total_stays=total_stays)
        if isinstance(pull, Refusal):
            self.told.emit(pull.reason)
            return None
        self.pull = pull
        return pull

    def hold_sheet(self) -> None:
        """Ruler, rows and proportions keep still, the old outlines stay."""
        self.paper.hold()
        self.paper.hand_marks.show_ghost(self._sheet.drawing.sketch)

    def let_sheet_go(self) -> None:
        """The sheet fits the member again."""
        self.paper.hand_marks.show_ghost(None)
        self.paper.let_go()

    def preview(self) -> None:
        """What has come of it so far, drawn at once; its results come as they are solved."""
        project = None if self.pull is None else self.pull.outcome.project
        if project is not None:
            self._document.set_preview(self._preview_of(project))
            self.paper.show_member(project)
            if self.phase is Phase.PULLING:
                self._sheet.one_picture.wait()

    def follow_end(self) -> bool:
        """Keep the end of the member on the sheet; whether the pull begins anew, by another ruler."""
        if self.pull is None or not self.pull.is_of_end:
            return False
        moved = follow_end(self.paper, self.pull.sketch.member)
        if moved:
            self.pull.go_on(self.paper.ruler)
        return moved

    def _preview_of(self, project: Project) -> Preview | None:
        """None where it is what is committed."""
        moving = self.phase is Phase.PULLING
        return None if project is self._document.project else Preview(project, moving=moving, by_hand=True)

    def preview_reason(self, reason: str) -> None:
        """What is typed makes no project: the results are not of it."""
        self._document.set_preview(Preview(None, reason))

    def light(self) -> None:
        """Mark the handle in hand."""
        if self.pull is not None:
            self.paper.hand_marks.light(self.pull.handle.key, total_stays=self.pull.total_stays)

    def say(self, hint: str) -> None:
        """At the pointer; once the sheet has been fitted again, where the handle went."""
        if self.pull is None:
            return
        lit = self.paper.hand_marks.lit
        if self.phase is not Phase.PULLING and lit is not None:
            self.point = QPointF(*lit.centre)
        room = QRectF(self._sheet.viewport().rect())
        clear = () if self.phase is Phase.PULLING else [h.centre for h in self.paper.hand_marks.quiet]
        self.paper.bubble.say(self.pull.lines(hint), self.point, room, self.paper.fonts, clear)

    def hush(self) -> None:
        """What was typed needs no readout any more; it stays in hand."""
        self.paper.bubble.hush()

    def keep(self) -> None:
        """It stays in hand, its handle marked, until something else is done; a load is meant by itself."""
        self.phase = Phase.AFTER
        self._view.set_thing(None if self.pull is None else part_of(self.pull.handle))
        self.light()
        self.say(tr("Type a number for the exact value."))

    def may_amend(self) -> bool:
        """Whether what is in hand is the last undo step, which may still be another number."""
        return self.pull is not None and self._document.may_amend(self.pull)

    def commit(self) -> None:
        """What is in the hand becomes the undo step of its gesture, and stays in hand."""
        pull = self.pull
        if pull is None:
            return
        if pull.outcome.project is None or not (pull.changed or self.may_amend()):
            self.told.emit(pull.outcome.reason)
            self._back()
            return
        self.let_sheet_go()
        self._own = True
        try:
            self._document.commit_gesture(pull.outcome.project, pull.grip.name, pull)
        finally:
            self._own = False
        self.keep()

    def cancel(self) -> bool:
        """Give up a pull or an entry: all is as it was. False where there was nothing to give up."""
        if self.phase not in (Phase.PULLING, Phase.TYPING):
            self.forget()
            return False
        self._back()
        return True

    def _back(self) -> None:
        self.reset()
        self._document.drop_preview()
        self.paper.show_member(self._document.project)

    def forget(self) -> None:
        """What was pulled is out of the hand."""
        if self.phase is Phase.AFTER:
            self.reset()

    def reset(self) -> None:
        """Nothing in hand."""
        self.phase, self.pull = Phase.IDLE, None
        self.let_sheet_go()
        self.paper.hand_marks.light(None)
        self.paper.bubble.hush()
        self.ended.emit()

    def _on_changed(self, _snapshot: object) -> None:
        """Another change of the document, such as an undo, ends the gesture without a trace."""
        if not self._own and self.phase is not Phase.IDLE:
            self.reset()
