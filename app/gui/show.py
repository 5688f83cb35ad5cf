"""From edit to screen: asks the solver for what the document shows, and shows what comes back.

A result of an earlier edit is shown while nothing newer is there, marked as such; only the newest result of a
project with no unfinished entry counts as current.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import TYPE_CHECKING, Protocol

from PySide6.QtCore import QObject, QTimer, Signal

from app.gui import log
from app.gui.document import Document, Draft
from app.gui.outcome import (
    Outcome,
    Wanted,
    answer,
    figures_of,
    first_shown,
    governing,
    largest_bound,
    narrow_of,
    still_shown,
)
from app.gui.status_line import StatusLine
from app.gui.tables.pane import TablesPane
from app.gui.view import Shown, View
from app.gui.worker import Delivery, LatestSolver
from app.numerals import fixed
from app.references import Reference
from app.words import tr, trn
from solver.model import Project
from solver.results import Results

if TYPE_CHECKING:
    from app.findings import Comparison, Findings

REST = 150  # ms without a move until the findings of what is pulled are worded
HURRY = 0.003  # s of wording from which it waits for that
GRACE = 40  # ms, two frames: results that come sooner replace the old ones without a flicker
GRACE_OF_A_PULL = 120  # ms: while a hand moves, every move is late by about a solve; a mark would flicker


class Sheet(Protocol):
    """The drawing and its strips."""

    def show_results(
        self, project: Project, results: Results | None, current: bool, waiting: bool = False
    ) -> None:
        """Show these."""

    def set_reference(self, reference: Reference | None) -> None:
        """Show its curves as well."""


class Panel(Protocol):
    """The findings."""

    def show_findings(
        self,
        findings: object,
        problems: tuple[str, ...],
        current: bool,
        compared: object = None,
        narrow: Callable[[str], Findings] | None = None,
    ) -> None:
        """Show these."""


class Showing(QObject):
    """Keeps the screens at the document's latest edit."""

    shown = Signal()  # after every change of what the screens show

    def __init__(
        self,
        document: Document,
        view: View,
        sheet: Sheet,
        panel: Panel,
        tables: TablesPane,
        status: StatusLine,
    ) -> None:
        super().__init__(document)
        self._document = document
        self._view = view
        self._sheet = sheet
        self._panel = panel
        self._tables = tables
        self._status = status
        self._outcome: Outcome | None = None
        self._reference: Reference | None = None
        self._fault = ""
        self._asked: Project | None = None
        self._wanted: Wanted | None = None  # what of it was asked for
        self._newest = False
        self._seen = document.project  # whose state the view shows
        self._own_choice = self._view.shown
        self._settled = False  # whether a person, or the first results, chose what is looked at
        self._late = QTimer(self)
        self._late.setSingleShot(True)
        self._late.setInterval(GRACE)
        self._late.timeout.connect(self.on_late)
        self._worded: Outcome | None = None  # the last that came with its findings
        self._dimmed = False  # whether those are shown as of an earlier member
        self._rest = QTimer(self)
        self._rest.setSingleShot(True)
        self._rest.setInterval(REST)
        self._rest.timeout.connect(self.on_rest)
        self.solver = LatestSolver(answer, self)
        self.solver.ready.connect(self.on_ready)
        self.solver.failed.connect(self.on_failed)
        document.opened.connect(self.on_opened)
        document.changed.connect(lambda _snapshot: self.follow())
        document.preview_changed.connect(lambda _preview: self.follow())
        view.shown_changed.connect(self.on_shown)

    @property
    def outcome(self) -> Outcome | None:
        """What is shown."""
        return self._outcome

    @property
    def current(self) -> bool:
        """Whether what is shown is of everything that has been typed."""
        return self._newest and not self._document.has_drafts

    @property
    def complete(self) -> bool:
        """Whether the findings too are of everything that has been typed or pulled."""
        return self.current and self._outcome is self._worded

    def follow(self) -> None:
        """The document or its preview changed: solve another project, and show what is known."""
        project = self._document.shown_project
        self._look_at(still_shown(self._view.shown, self._seen, project))
        self._seen = project
        if project == self._asked:
            self._show()
            self._word()
            return
        self._asked = project
        self._newest = False
        self._fault = ""
        if not self._late.isActive():  # a burst of edits does not put the mark off
            self._late.start(GRACE_OF_A_PULL if self._is_pulled() else GRACE)
        self._wanted = Wanted(project, worded=not self._hurries())
        self.solver.request(self._wanted)
        if self._document.has_drafts:  # nothing that comes will be current, so there is nothing to wait for
            self._show()

    def begin(self) -> None:
        """Draw the member at once; ask the solver once it is on the screen, as its libraries take a while."""
        self.on_opened()
        self._show()
        QTimer.singleShot(0, self, self.follow)

    def on_opened(self) -> None:
        """Another project: look at its first single state until its results say which governs."""
        self._seen, self._settled = self._document.project, False
        self._look_at(first_shown(self._seen))

    def _look_at(self, shown: Shown) -> None:
        self._own_choice = shown
        self._view.set_shown(shown)

    def _settle(self, results: Results | None) -> None:
        """With the first results, look at the state that governs, unless a person has chosen one by then."""
        if results is not None and not self._settled:
            self._settled = True
            self._look_at(governing(results))

    def on_ready(self, delivery: Delivery) -> None:
        """A result, in the order of the edits."""
        assert isinstance(delivery.value, Outcome)  # noqa: S101 - what `compute` gives
        self._outcome = delivery.value
        self._newest = delivery.newest
        if delivery.value.is_worded:
            self._worded = delivery.value
        if delivery.newest:
            self._late.stop()
            self._settle(delivery.value.results)
            if self._rest.isActive():  # rest begins once the hand can see where it is
                self._rest.start()
        self._show()

    def on_late(self) -> None:
        """The solver takes longer than a person would not notice: what is shown is of an earlier edit."""
        if not self._newest:
            self._show()

    def _is_pulled(self) -> bool:
        """Whether a number is moving under a hand."""
        preview = self._document.preview
        return preview is not None and preview.moving

    def _hurries(self) -> bool:
        """Whether a number is moving under a hand, so that findings which take long to word wait for rest."""
        worded = self._worded
        if self._is_pulled() and worded is not None and worded.wording > HURRY:
            self._rest.start()
            return True
        return False

    def on_rest(self) -> None:
        """The hand has come to rest; where only the program is behind, it may be on its way still."""
        if self._newest:
            self._word()
        else:
            self._rest.start()

    def _word(self) -> None:
        """Ask for the findings of what was only solved until now."""
        self._rest.stop()
        if self._wanted is not None and not self._wanted.worded:
            self._wanted = Wanted(self._wanted.project)
            self.solver.request(self._wanted)

    def close(self) -> None:
        """Stop solving; clean also while it runs."""
        self._late.stop()
        self._rest.stop()
        self.solver.close()

    def on_failed(self, delivery: Delivery) -> None:
        """A fault of ours in the solver: into the log and the status line; the next edit is solved again."""
        assert isinstance(delivery.value, BaseException)  # noqa: S101 - what a failure carries
        log.log_error("solver", delivery.value)
        self._fault = tr("A fault of the program stopped the solver, see the log: {error}").format(
            error=f"{type(delivery.value).__name__}: {delivery.value}"
        )
        self._show()

    def on_shown(self, shown: Shown) -> None:
        """Another state is looked at; from a person's choice on there is no other."""
        self._settled = self._settled or shown != self._own_choice
        self._tables.set_figures(self._figures())
        self._tell()

    def _figures(self) -> object:
        results = self._outcome.results if self._outcome else None
        return figures_of(results, self._view.shown, current=self.current)

    def _show(self) -> None:
        outcome = self._outcome
        results = outcome.results if outcome else None
        problems = (self._fault,) if self._fault else outcome.problems if outcome else ()
        waiting = outcome is None and not self._fault  # for the very first outcome
        self._sheet.show_results(self._document.shown_project, results, self.current, waiting)
        self._show_findings(problems)
        self._tables.set_figures(self._figures())
        self._tell()
        self.shown.emit()

    def _show_findings(self, problems: tuple[str, ...]) -> None:
        """The findings; while a hand is moving those of before stand there, marked as out of date."""
        worded = self._worded
        dimmed = self._outcome is not worded
        if dimmed and self._dimmed:
            return  # they stand there so already
        self._dimmed = dimmed
        self._panel.show_findings(
            worded.findings if worded else None,
            problems,
            self.current and not dimmed,
            self._compared(worded.results if worded else None),
            narrow_of(worded) if worded else None,
        )

    def set_reference(self, reference: Reference | None) -> None:
        """Hold what is shown against a reference, or against none."""
        if reference is not self._reference:
            self._reference = reference
            self._sheet.set_reference(reference)
            self._show()

    def _compared(self, results: Results | None) -> Comparison | None:
        if self._reference is None or results is None:
            return None
        from app.findings import comparison

        return comparison(self._reference, results, results.project.display.unit_system)

    def _tell(self) -> None:
        self._status.solver.setText(self._solver_line())

    def _solver_line(self) -> str:
        preview = self._document.preview
        if preview is not None and preview.project is None:
            return tr("Results are out of date: {reason}").format(reason=preview.reason)
        drafts = self._document.snapshot.drafts
        if drafts:
            return drafts_line(tuple(drafts.values()))
        if self._fault:
            return self._fault
        if self._outcome is None or not self._newest:
            return tr("Solving…")
        return outcome_line(self._outcome)


def drafts_line(drafts: Sequence[Draft]) -> str:
    """Why nothing is current: the reason of the text typed last, and how many more there are."""
    last, others = drafts[-1], len(drafts) - 1
    line = tr("Results are out of date: {cell}: {reason}").format(cell=last.name, reason=last.reason)
    if not others:
        return line
    return f"{line} ({trn('and {count} cell more', 'and {count} cells more', others)})"


def outcome_line(outcome: Outcome) -> str:
    """What a solve came to, in a line."""
    from app.phrases import numerical_error_sentence

    if outcome.results is None:
        return outcome.problems[0] if outcome.problems else tr("No results")
    solved = tr("Solved in {time} ms.").format(time=fixed(1000 * outcome.seconds, 1))
    return f"{solved} {numerical_error_sentence(largest_bound(outcome.results))}"
