"""The background solver, driven by locks instead of sleeps: order, cancelling, failure, closing."""

import threading
import time

import pytest

from app.gui.worker import PATIENCE, LatestSolver
from solver.errors import Cancelled


class Slow:
    """A solve that runs until it is let go, or cancelled."""

    def __init__(self):
        self.started = threading.Event()
        self.go = threading.Event()
        self.seen = []

    def __call__(self, snapshot, cancelled):
        self.seen.append(snapshot)
        self.started.set()
        if snapshot == "fail":
            raise ZeroDivisionError("a fault of ours")
        if snapshot.startswith("slow"):
            while not self.go.wait(0.001):
                if cancelled():
                    raise Cancelled
        if snapshot == "slow fail":
            raise ZeroDivisionError("a fault of ours")
        return snapshot.upper()


class Clock:
    def __init__(self):
        self.now = 0.0

    def __call__(self):
        return self.now


@pytest.fixture
def slow():
    return Slow()


@pytest.fixture
def clock():
    return Clock()


@pytest.fixture
def solver(qtbot, slow, clock):
    made = LatestSolver(slow, clock=clock)
    made.deliveries, made.failures = [], []
    made.ready.connect(made.deliveries.append)
    made.failed.connect(made.failures.append)
    yield made
    slow.go.set()
    made.close()


def test_a_result_comes_back_with_its_number(qtbot, solver):
    with qtbot.waitSignal(solver.ready, timeout=2000):
        number = solver.request("a")
    (delivery,) = solver.deliveries
    assert (delivery.number, delivery.newest, delivery.value) == (number, True, "A")


def test_the_latest_edit_wins_and_those_between_are_never_solved(qtbot, solver, slow):
    solver.request("slow")
    assert slow.started.wait(2)
    for text in ("b", "c", "d"):
        solver.request(text)
    slow.go.set()
    qtbot.waitUntil(lambda: len(solver.deliveries) == 2, timeout=2000)
    assert slow.seen == ["slow", "d"]
    assert [(d.value, d.newest) for d in solver.deliveries] == [("SLOW", False), ("D", True)]


def test_a_young_solve_is_let_finish_and_an_old_one_is_given_up(qtbot, solver, slow, clock):
    solver.request("slow")
    assert slow.started.wait(2)
    solver.request("b")
    assert not solver._stop.is_set()
    clock.now += PATIENCE * 1.01
    solver.request("c")
    qtbot.waitUntil(lambda: bool(solver.deliveries), timeout=2000)
    assert [(d.value, d.newest) for d in solver.deliveries] == [("C", True)]
    assert not solver.failures, "a cancelled solve is no failure"


def test_the_last_edit_waits_no_longer_than_patience_for_the_one_before(qtbot, solver, slow):
    solver.request("slow")
    assert slow.started.wait(2)
    solver.request("b")  # and no other, which could look at the clock again
    qtbot.waitUntil(lambda: bool(solver.deliveries), timeout=2000)
    assert [(d.value, d.newest) for d in solver.deliveries] == [("B", True)]


def test_an_exception_is_told_and_the_next_edit_works(qtbot, solver):
    with qtbot.waitSignal(solver.failed, timeout=2000):
        solver.request("fail")
    assert isinstance(solver.failures[0].value, ZeroDivisionError)
    with qtbot.waitSignal(solver.ready, timeout=2000):
        solver.request("a")
    assert not solver.busy


def test_an_exception_of_an_earlier_edit_is_not_told(qtbot, solver, slow):
    solver.request("slow fail")
    assert slow.started.wait(2)
    solver.request("a")
    slow.go.set()
    qtbot.waitUntil(lambda: bool(solver.deliveries) and solver.deliveries[-1].newest, timeout=2000)
    assert not solver.failures


def test_closing_while_it_runs_waits_and_delivers_nothing(qtbot, solver, slow):
    solver.request("slow")
    assert slow.started.wait(2)
    start = time.monotonic()
    solver.close()
    assert time.monotonic() - start < 1.0  # the solve saw that it was cancelled
    with qtbot.assertNotEmitted(solver.ready, wait=20):
        solver.request("b")
    assert slow.seen == ["slow"]


def test_a_solver_that_is_gone_before_its_result_is_no_error(qtbot, slow):
    gone = LatestSolver(slow)
    gone.request("slow")
    assert slow.started.wait(2)
    executor = gone._executor
    gone.deleteLater()
    qtbot.waitSignal(gone.destroyed).wait()
    slow.go.set()
    executor.shutdown(wait=True)
