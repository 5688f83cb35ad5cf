"""The exact value of what is in hand: what is typed is a preview, Enter makes it the gesture's undo step."""

from __future__ import annotations

from PySide6.QtCore import QObject, Qt
from PySide6.QtWidgets import QWidget

from app.entry import EntryError, parse_entry
from app.gui.hand.entry import ExactEntry
from app.gui.hand.grasp import Grasp, Phase
from app.hand.grip import Outcome
from app.words import tr


class Exact(QObject):
    """Joins the field with the number in hand."""

    def __init__(self, grasp: Grasp, viewport: QWidget) -> None:
        super().__init__(grasp)
        self._grasp = grasp
        self.entry = ExactEntry(viewport)
        self.entry.typed.connect(self.on_typed)
        self.entry.taken.connect(self.on_taken)
        self.entry.given_up.connect(grasp.cancel)
        self.entry.left.connect(self.on_left)
        grasp.ended.connect(self.on_ended)

    def begin(self, text: str) -> None:
        """Open the field with what is typed first."""
        if self._grasp.pull is not None:
            self._grasp.phase = Phase.TYPING
            self._grasp.let_sheet_go()
            self._grasp.say("")
            self.entry.open_at(self._grasp.point, text)

    def on_typed(self, text: str) -> None:
        """What is typed so far, as a preview."""
        pull = self._grasp.pull
        if pull is None:
            return
        try:
            value = parse_entry(text, pull.grip.quantity, pull.grip.system)
        except EntryError as error:
            pull.outcome = Outcome(pull.grip.value, None, str(error))
        else:
            pull.go(value, total_stays=pull.total_stays)
        if pull.outcome.project is None:
            self._grasp.preview_reason(pull.outcome.reason)
        else:
            self._grasp.preview()
        self._grasp.say(tr("Enter takes it, Escape gives it up."))

    def on_taken(self) -> None:
        """Enter: commit what can be, else the reason stays beside the text."""
        if self._grasp.pull is not None and self._grasp.pull.outcome.project is not None:
            self._grasp.phase = Phase.AFTER
            self._close()
            self._grasp.commit()
            self._grasp.hush()

    def on_left(self) -> None:
        """The keyboard went elsewhere: what is valid is taken in, the rest is named and given up."""
        pull = self._grasp.pull
        if self._grasp.phase is not Phase.TYPING or pull is None:
            return
        reason, text = pull.outcome.reason, self.entry.text()
        self._grasp.phase = Phase.AFTER
        self.entry.hide()
        if pull.outcome.project is None:
            self._grasp.phase = Phase.TYPING
            self._grasp.cancel()
            self._grasp.told.emit(tr("{text} was not taken in: {reason}").format(text=text, reason=reason))
        else:
            self._grasp.commit()
            self._grasp.forget()

    def on_ended(self) -> None:
        """Nothing is in hand any more."""
        if self.entry.isVisible():
            self._close()

    def _close(self) -> None:
        """The keyboard goes back to the sheet."""
        self.entry.hide()
        self._grasp.sheet.setFocus(Qt.FocusReason.OtherFocusReason)
