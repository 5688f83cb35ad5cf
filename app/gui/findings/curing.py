"""Seeks the cures of what fails once the results have settled, and makes one of them on request.

A thread of its own, so that the main solve never waits; and only after a pause, so that nothing runs while a
person types or drags. An edit cancels the search between two stages of a solve. One finding at a time, the
worst first, so that each is shown as soon as it is known.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import QObject, QTimer, Signal

from app.cures import Cure, Cures, is_small
from app.cures import failing as failing_of
from app.findings import Findings
from app.findings.listing import listed
from app.findings.subjects import Subject
from app.gui import log
from app.gui.document import Document
from app.gui.findings.panel import FindingsPanel
from app.gui.show import Showing
from app.gui.worker import Delivery, LatestSolver
from app.phrases.cures import unsought_sentence
from app.words import tr
from solver.results import Results

PAUSE: Final = 250  # ms without a change before a search begins
MOST: Final = 20  # findings; where more fail, another section here and there is no cure

_Job = tuple[Results, Subject]


def compute_cures(job: _Job, cancelled: Callable[[], bool]) -> Cures:
    """In the thread: the cures of one finding. Raises Cancelled."""
    from app.cures import seek

    return seek(*job, cancelled)


class Curing(QObject):
    """Keeps the panel's cures at the results that are shown."""

    told = Signal(str)
    settled = Signal()  # all that was to be sought is shown

    def __init__(
        self,
        document: Document,
        showing: Showing,
        panel: FindingsPanel,
        commit_open_editor: Callable[[], None],
        parent: QObject | None = None,
    ) -> None:
        super().__init__(parent)
        self._document = document
        self._showing = showing
        self._panel = panel
        self._commit_open_editor = commit_open_editor
        self._results: Results | None = None
        self._queue: list[Subject] = []
        self._found: dict[Subject, Cures] = {}
        self._pause = QTimer(self)
        self._pause.setSingleShot(True)
        self._pause.setInterval(PAUSE)
        self._pause.timeout.connect(self.on_paused)
        self.solver = LatestSolver(compute_cures, self)
        self.solver.ready.connect(self.on_ready)
        self.solver.failed.connect(self.on_failed)
        showing.shown.connect(self.on_shown)
        document.changed.connect(
            lambda _snapshot: self.on_shown()
        )  # after `showing`, which asks for its results
        document.preview_changed.connect(lambda _preview: self.on_shown())
        panel.cure_wanted.connect(self.on_wanted)

    @property
    def is_settled(self) -> bool:
        """Whether nothing is sought any more."""
        return not (self._pause.isActive() or self._queue or self.solver.busy)

    def on_shown(self) -> None:
        """Other results, or none that are current: what was sought for the earlier ones is dropped."""
        results = self._to_cure()
        if results is self._results:
            return
        self._results, self._queue, self._found = results, [], {}
        self._pause.stop()
        self.solver.cancel()
        self._panel.show_cures({})
        self._panel.say_what_is_unsought(_unsought(results))
        if results is not None and results.verdict == "fail" and is_small(results):
            self._pause.start()

    def _to_cure(self) -> Results | None:
        """The results of the committed project; None while anything newer is on its way."""
        outcome = self._showing.outcome
        settled = self._showing.current and self._document.preview is None
        return outcome.results if outcome is not None and settled else None

    def on_paused(self) -> None:
        """Begin with the worst."""
        outcome = self._showing.outcome
        self._queue = failing(outcome.findings) if outcome is not None and outcome.findings else []
        self._next()

    def _next(self) -> None:
        if self._queue and self._results is not None:
            self.solver.request((self._results, self._queue[0]))
        else:
            self.settled.emit()

    def on_ready(self, delivery: Delivery) -> None:
        """One finding is done; what is of earlier results is none of ours any more."""
        if delivery.newest and self._queue:
            assert isinstance(delivery.value, Cures)  # noqa: S101 - what `compute_cures` gives
            self._found[self._queue.pop(0)] = delivery.value
            self._panel.show_cures(self._found)
            self._next()

    def on_failed(self, delivery: Delivery) -> None:
        """A fault of ours: into the log; the other findings may still have their cures."""
        assert isinstance(delivery.value, BaseException)  # noqa: S101 - what a failure carries
        log.log_error("cures", delivery.value)
        if self._queue:
            self._queue.pop(0)
            self._next()

    def on_wanted(self, cure: Cure) -> None:
        """Make the change, as one undo step, in the very project for which it was proved."""
        self._commit_open_editor()
        if not any(cure is known for cures in self._found.values() for known in cures.found):
            self.told.emit(tr("the member has changed since: a cure for it is being sought"))
            return
        name = tr("Section of {mark}") if cure.change.kind == "section" else tr("Spring at joint {mark}")
        project = cure.change.applied(self._document.project)
        self._document.commit(project, name.format(mark=listed(cure.change.marks)))

    def close(self) -> None:
        """End cleanly, also while it seeks."""
        self._pause.stop()
        self.solver.close()


def _unsought(results: Results | None) -> str:
    if results is None or results.verdict != "fail":
        return ""
    return unsought_sentence(len(failing_of(results)), MOST, small=is_small(results))


def failing(findings: Findings) -> list[Subject]:
    """What fails, the worst first."""
    found = [item for item in (*findings.segments, *findings.limits) if item.status == "fail"]
    found.sort(key=lambda item: -item.utilisation)
    return [item.subject for item in found[:MOST]]
