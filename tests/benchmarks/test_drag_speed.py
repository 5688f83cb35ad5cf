"""How fast a drag on the drawing is: real events on the real window until the preview is solved and painted.

Against repainting the same scene bare, within one run, so that a busy machine slows both; four plain plots of
the plotting library stand beside it to say how fast the machine is. An update is a move of the pointer, the
preview's solve, and everything that shows it painted anew. What both threads worked is counted apart from the
time that passed, which others on the machine lengthen.
"""

from __future__ import annotations

import statistics
import sys
import time

import pytest
from msgspec.structs import replace
from PySide6.QtCore import QEventLoop, Qt
from PySide6.QtWidgets import QApplication

from app.gui.hand.grasp import Phase
from app.gui.main import open_window
from app.gui.settings import Settings
from app.gui.view import Selection
from app.project_file import write
from tests.benchmarks.test_window_speed import bare_plots, long_shaft, plots_repaint
from tests.gui.pointer import Pointer

UPDATES = 40
STRIDE = 12.0  # pixels of a move, so that each is another step
LEAST_RATE = 30.0  # updates a second
LONG = 500


@pytest.fixture
def window_on(qtbot, tmp_path):
    """A window on a project, ended afterwards."""
    made = []

    def open_on(project):
        path = tmp_path / "long.barwright.json"
        write(project, path)
        window = open_window(path, Settings(tmp_path / "s.ini"), tmp_path / "recovery")
        made.append(window)
        window.resize(1280, 800)
        with qtbot.waitActive(window):
            window.activateWindow()
        qtbot.waitUntil(lambda: window.showing.current, timeout=30000)
        return window

    yield open_on
    for window in made:
        window._closing = True
        with qtbot.waitSignal(window.destroyed, timeout=5000):
            window.close()


def until_shown(window):
    """Wait in the event loop, as the program does, until the results of the preview are on the screen."""
    while not window.showing.current:
        QApplication.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents)
    QApplication.processEvents()


def seconds_of_updates(window, kind, index, where):
    """What each update of a drag takes, back and forth, every one on another value."""
    pointer = Pointer(window)
    pointer.grab(kind, index, where)
    pointer.pull(24.0)
    assert window.hand.phase is Phase.PULLING
    until_shown(window)
    times, work = [], []
    for number in range(UPDATES):
        before = window.document.shown_project
        start, worked = time.perf_counter(), time.process_time()
        pointer.move(STRIDE if number % 10 < 5 else -STRIDE)
        until_shown(window)
        times.append(time.perf_counter() - start)
        work.append(time.process_time() - worked)
        assert window.document.shown_project is not before
    sys.stdout.write(f"work of both threads: {1e3 * middle(work):.1f} ms an update\n")
    pointer.let_go()
    until_shown(window)
    return times


def seconds_of_repaints(window):
    """What painting the whole window anew takes, with nothing changed."""
    times = []
    for _ in range(UPDATES // 2):
        start = time.perf_counter()
        window.sheet.drawing.update()
        window.sheet.viewport().update()
        QApplication.processEvents()
        times.append(time.perf_counter() - start)
    return times


def seconds_of_plots(results):
    """What four plain plots of the same curves take to set and paint: how fast the machine is."""
    plots, drawn = bare_plots(results)
    plots.setAttribute(Qt.WidgetAttribute.WA_ShowWithoutActivating)
    plots.resize(880, 480)
    plots.show()
    QApplication.processEvents()
    times = [plots_repaint(drawn) for _ in range(UPDATES // 2)]
    plots.hide()
    plots.deleteLater()  # not closed: closing a view of the plotting library tears its scene down
    return times


def middle(times):
    return statistics.median(times)


def say(what, times, bare, plots):
    worst = sorted(times)[int(0.95 * len(times))]
    sys.stdout.write(
        f"{what}: {1 / middle(times):.0f} updates a second (95 %: {1 / worst:.0f}), "
        f"{1e3 * middle(times):.1f} ms each, {middle(times) / middle(bare):.1f} of a bare repaint "
        f"({1e3 * middle(bare):.1f} ms), {middle(times) / middle(plots):.1f} of four plain plots "
        f"({1e3 * middle(plots):.1f} ms)\n"
    )


DRAGS = [("joint", 20, "end"), ("edge", 20, "both")]


@pytest.mark.benchmark(group="window: a drag, 40 segments, 10 combinations")
@pytest.mark.parametrize(("kind", "index", "where"), DRAGS, ids=["joint", "edge"])
def test_a_drag_follows_the_hand(benchmark, window_on, kind, index, where):
    window = window_on(long_shaft())
    window.view.set_selection(Selection(segments=frozenset((index,))))
    plots, bare = seconds_of_plots(window.showing.outcome.results), seconds_of_repaints(window)
    times = seconds_of_updates(window, kind, index, where)
    say(f"40 segments, 10 combinations, {kind}", times, bare, plots)
    benchmark.pedantic(seconds_of_repaints, (window,), rounds=1)
    benchmark.extra_info.update(ms=1e3 * middle(times), ratio=middle(times) / middle(bare))
    assert 1 / middle(times) >= LEAST_RATE


def longest_shaft():
    """The long shaft's segments over and over, under the first three of its combinations."""
    short = long_shaft()
    rounds = range(LONG // len(short.segments) + 1)
    segments = [
        replace(segment, mark=f"{segment.mark}.{turn}") for turn in rounds for segment in short.segments
    ][:LONG]
    inner = [replace(short.joints[1], mark=f"j{number}") for number in range(1, LONG)]
    loads = [
        replace(
            case, segment_loads=[replace(load, segment=f"{load.segment}.0") for load in case.segment_loads]
        )
        for case in short.load_cases
    ]
    return replace(
        short,
        segments=tuple(segments),
        joints=(short.joints[0], *inner, short.joints[-1]),
        load_cases=tuple(replace(case, segment_loads=tuple(case.segment_loads)) for case in loads),
        combinations=short.combinations[:3],
    )


@pytest.mark.benchmark(group="window: a drag, 500 segments, 3 combinations")
def test_five_hundred_segments_stay_usable(benchmark, window_on):
    window = window_on(longest_shaft())
    plots, bare = seconds_of_plots(window.showing.outcome.results), seconds_of_repaints(window)
    times = seconds_of_updates(window, "joint", 250, "end")
    say("500 segments, 3 combinations, joint", times, bare, plots)
    benchmark.pedantic(seconds_of_repaints, (window,), rounds=1)
    benchmark.extra_info.update(ms=1e3 * middle(times), ratio=middle(times) / middle(bare))
