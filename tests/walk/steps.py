"""What every step of the walk is held against, and its record."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

from PySide6.QtCore import QCoreApplication, QDeadlineTimer, QEventLoop

from app.gui.window import Window
from app.words import SOURCE, language

LONGEST_WAIT = 20_000  # ms for a solve; this member takes a few


class Camera(Protocol):
    """Takes a picture of the window after a step."""

    def take(self, window: Window, number: int, name: str, words: str) -> None:
        """One picture."""


@dataclass(frozen=True)
class Step:
    """What stood there after a step."""

    name: str
    undo: str | None
    current: bool
    news: str
    headline: str


class Steps:
    """Ends each step: results have come, what was promised has happened, a picture is taken."""

    def __init__(self, window: Window, camera: Camera | None = None) -> None:
        self.window = window
        self.done: list[Step] = []
        self._camera = camera

    def end(self, name: str, words: str, *, undo: str | None = "", stale: bool = False) -> Step:
        """The step called `name` (a slug) is done; `words` tell what was done.

        `undo` is what `Edit > Undo` must name now, where it is given and the window speaks English; `stale`
        where the results must be said to be out of date, as while something that cannot be read stands in a
        cell.
        """
        self._settle(stale=stale)
        step = self._seen(name)
        if undo != "" and language() == SOURCE:
            assert step.undo == undo, f"{name}: undo is {step.undo!r}, not {undo!r}"
        assert step.current is not stale, f"{name}: results are {'current' if step.current else 'stale'}"
        self.done.append(step)
        if self._camera is not None:
            self._camera.take(self.window, len(self.done), name, words)
        return step

    def _settle(self, *, stale: bool) -> None:
        """Let the window work until what it shows is current, or the solver rests."""
        showing, deadline = self.window.showing, QDeadlineTimer(LONGEST_WAIT)
        while not stale and not (showing.current and showing.complete):
            if deadline.hasExpired():
                raise TimeoutError(self.window.status.solver.text())
            QCoreApplication.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents)
        QCoreApplication.processEvents()

    def _seen(self, name: str) -> Step:
        window, outcome = self.window, self.window.showing.outcome
        findings = None if outcome is None else outcome.findings
        return Step(
            name,
            window.document.undo_name,
            window.showing.current,
            window.status.news.text(),
            findings.headline if findings else "",
        )
