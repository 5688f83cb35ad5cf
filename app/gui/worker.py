"""The background solver: a request is a frozen snapshot with a number; the latest edit wins.

One thread, one request running, at most one waiting. For a newer edit the running solve is given up once it
is older than `PATIENCE`: cancelling at once would starve a member that takes longer than the pause between
two keystrokes, so that nothing would ever be shown. Every result newer than the last one shown is delivered;
whether it is of the newest request is told with it. A ThreadPoolExecutor rather than a QThread: a forgotten
shutdown waits instead of aborting, and the solver stays free of Qt.
"""

from __future__ import annotations

import threading
import time
from collections.abc import Callable
from concurrent.futures import ThreadPoolExecutor
from dataclasses import dataclass
from typing import Any

from PySide6.QtCore import QObject, Qt, QTimer, Signal, Slot

PATIENCE = 0.2  # s, the age from which a running solve is given up for a newer edit

Compute = Callable[[Any, Callable[[], bool]], object]


@dataclass(frozen=True, slots=True)
class Delivery:
    """What came of request `number`; `newest` says whether no later one has been made."""

    number: int
    newest: bool
    value: object


class LatestSolver(QObject):
    """Runs `compute(snapshot, cancelled)` in one thread of its own; all methods belong to the GUI thread."""

    ready = Signal(object)  # Delivery of a result
    failed = Signal(object)  # Delivery of an exception, only for the newest request
    busy_changed = Signal(bool)
    _back = Signal(object, object, object)

    def __init__(
        self,
        compute: Compute,
        parent: QObject | None = None,
        *,
        clock: Callable[[], float] = time.monotonic,
    ) -> None:
        super().__init__(parent)
        self._compute = compute
        self._clock = clock
        self._executor = ThreadPoolExecutor(1, "solver")
        self._newest = 0
        self._running: int | None = None
        self._waiting: tuple[int, object] | None = None
        self._stop = threading.Event()
        self._started = 0.0
        self._closed = False
        self._impatient = QTimer(self)
        self._impatient.setSingleShot(True)
        self._impatient.timeout.connect(self.on_impatient)
        self._back.connect(self._on_done, Qt.ConnectionType.QueuedConnection)

    @property
    def busy(self) -> bool:
        """Whether a request is running or waiting."""
        return self._running is not None

    def request(self, snapshot: object) -> int:
        """Ask for the results of a frozen snapshot; returns the request's number."""
        self._newest += 1
        if self._closed:
            return self._newest
        job = (self._newest, snapshot)
        if self._running is None:
            self._start(job)
        else:
            self._waiting = job
            left = PATIENCE - (self._clock() - self._started)
            self._impatient.start(max(0, round(1000 * left)))
        return self._newest

    def cancel(self) -> None:
        """Give up what runs and what waits; what still comes of it is not of the newest request."""
        self._newest += 1
        self._waiting = None
        self._impatient.stop()
        self._stop.set()

    def close(self) -> None:
        """Give up what runs and wait for the thread to end; nothing is delivered afterwards."""
        self._closed = True
        self._impatient.stop()
        self._waiting = None
        self._stop.set()
        self._executor.shutdown(wait=True, cancel_futures=True)
        self._running = None

    def on_impatient(self) -> None:
        """The running solve has had its time, and a newer edit waits."""
        self._stop.set()

    def _start(self, job: tuple[int, object]) -> None:
        self._running = job[0]
        self._impatient.stop()
        self._stop = threading.Event()
        self._started = self._clock()
        self.busy_changed.emit(True)
        self._executor.submit(self._work, *job, self._stop)

    def _work(self, number: int, snapshot: object, stop: threading.Event) -> None:
        """In the solver's thread: touches nothing but its arguments."""
        value: object = None
        error: BaseException | None = None
        try:
            value = self._compute(snapshot, stop.is_set)
        except BaseException as escaped:
            error = escaped
        try:
            self._back.emit(number, value, error)
        except RuntimeError:  # the receiver is gone: the window was closed
            return

    @Slot(object, object, object)
    def _on_done(self, number: int, value: object, error: BaseException | None) -> None:
        if self._closed:
            return
        self._running = None
        waiting, self._waiting = self._waiting, None
        if waiting is not None:
            self._start(waiting)
        newest = number == self._newest
        if error is None:
            self.ready.emit(Delivery(number, newest, value))
        elif newest:  # what was cancelled is never the newest
            self.failed.emit(Delivery(number, newest, error))
        if waiting is None:
            self.busy_changed.emit(False)
