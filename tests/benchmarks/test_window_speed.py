"""How fast the window is: an edit until all strips are repainted, and the start, each against its bare cost.

Ratios within one run, so that a busy machine slows both sides. Run with `--benchmark-only`; the printed table
says what was measured.
"""

from __future__ import annotations

import os
import statistics
import subprocess
import sys
import time

import numpy as np
import pyqtgraph as pg
import pytest
from PySide6.QtCore import QEventLoop, Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app.gui.main import open_window
from app.gui.settings import Settings
from app.gui.sheet_view import SheetView
from app.gui.view import Shown, View
from app.project_file import write
from app.samples import sample_path
from solver.fields import envelope
from solver.model import Combination, FixedSupport, SegmentLoad
from tests.gui.hand import begin, go_to
from tests.members import Part, case, member, round_bar, segment_mark

SEGMENTS, COMBINATIONS = 40, 10
SHEET_RATIO = 2.5  # drawing, strips, labels and limits, against four plain plots of the same curves
EDIT_RATIO = 7.0  # an edit, with its solve, findings and tables, against the same
START_RATIO = 1.5


def say(line):
    """A line of the table of timings."""
    sys.stdout.write(line + "\n")


def long_shaft():
    """40 tapered segments, 10 combinations of three cases."""
    parts = [
        Part(
            0.1 + 0.01 * (i % 5),
            round_bar(0.05 + 0.001 * (i % 7), 0.06),
            allowable_tension=160e6,
            allowable_compression=140e6,
        )
        for i in range(SEGMENTS)
    ]
    loads = [SegmentLoad(segment_mark(i), 1e4 * (i % 3), 2e4, 10.0 + i, 20.0) for i in range(SEGMENTS)]
    cases = [
        case("Dead", on_segments=loads[:20]),
        case("Live", on_segments=loads[20:]),
        case("Hot", on_segments=loads),
    ]
    combinations = [
        Combination(f"C{i}", {"Dead": 1.0, "Live": 0.1 * i, "Hot": 1.0 - 0.1 * i})
        for i in range(COMBINATIONS)
    ]
    return member(parts, {0: FixedSupport(), SEGMENTS: FixedSupport()}, cases, combinations)


@pytest.fixture
def window(qtbot, tmp_path):
    path = tmp_path / "long.barwright.json"
    write(long_shaft(), path)
    made = open_window(path, Settings(tmp_path / "s.ini"), tmp_path / "recovery")
    made.resize(1280, 800)
    with qtbot.waitActive(made):
        made.activateWindow()
    qtbot.waitUntil(lambda: made.showing.current, timeout=10000)
    made.view.set_shown(Shown("envelope"))  # the most curves, as in the plain plots
    yield made
    made._closing = True
    with qtbot.waitSignal(made.destroyed, timeout=5000):
        made.close()


def until_current(window):
    """Wait in the event loop, as the program does, until the newest results are on the screen."""
    while not window.showing.current:
        QApplication.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents)
    QApplication.processEvents()


def edit_to_repaint(window, editor, text):
    """Seconds from a keystroke in the table to all strips repainted with its results."""
    start = time.perf_counter()
    QTest.keyClicks(editor, text)
    until_current(window)
    elapsed = time.perf_counter() - start
    QTest.keyClick(editor, Qt.Key.Key_Backspace)
    until_current(window)
    return elapsed


def sheet_repaint(sheet, outcome):
    """Seconds to give the sheet alone the same curves and paint it: no solver, no table, no findings."""
    sheet.show_results(outcome.project, None, False)
    QApplication.processEvents()
    start = time.perf_counter()
    sheet.show_results(outcome.project, outcome.results, True)
    QApplication.processEvents()
    return time.perf_counter() - start


def bare_plots(results):
    """Four plain plots of the plotting library with the same curves, as large as the sheet."""
    plots, drawn = pg.GraphicsLayoutWidget(), []
    found = envelope(results)
    ranges = (
        (found.displacement_max, found.displacement_min),
        (found.force_max, found.force_min),
        (found.stress_max, found.stress_min),
        (found.utilisation,),
    )
    for row, values in enumerate(ranges):
        plot = plots.addPlot(row, 0)
        plot.disableAutoRange()
        plot.setXRange(found.x[0], found.x[-1])
        plot.setYRange(min(0.0, *(np.nanmin(v) for v in values)), max(np.nanmax(v) for v in values))
        pen = pg.mkPen("#0072B2", width=2)
        drawn += [(plot.plot(pen=pen, antialias=True, fillLevel=0, brush="#D0E0EC"), v) for v in values]
    return plots, [(curve, found.x, values) for curve, values in drawn]


def plots_repaint(drawn):
    """Seconds to set and paint the curves of the plain plots."""
    start = time.perf_counter()
    for curve, x, values in drawn:
        curve.setData(x, values)
    QApplication.processEvents()
    return time.perf_counter() - start


@pytest.mark.benchmark(group="window: edit to repaint, 40 segments, 10 combinations")
def test_an_edit_is_on_the_screen_within_some_bare_repaints(benchmark, qtbot, window):
    results = window.showing.outcome.results
    plots, drawn = bare_plots(results)
    sheet = SheetView(View())
    for widget in (plots, sheet):
        widget.setAttribute(Qt.WidgetAttribute.WA_ShowWithoutActivating)
        widget.resize(window.sheet.size())
        widget.show()
    QApplication.processEvents()
    with qtbot.waitActive(window):
        window.activateWindow()  # what is typed goes there
    table = window.tables.views["segments"]
    table.setFocus()
    go_to(table, 3, "length")
    editor = begin(table, "1")
    until_current(window)
    edits, sheets, bare = [], [], []
    for number in range(25):  # side by side, so that a busy machine slows all of them
        edits.append(edit_to_repaint(window, editor, str(number % 9 + 1)))
        sheets.append(sheet_repaint(sheet, window.showing.outcome))
        bare.append(plots_repaint(drawn))
    benchmark.pedantic(edit_to_repaint, (window, editor, "5"), rounds=10)
    for widget in (plots, sheet):  # not closed: closing a view of the plotting library tears its scene down
        widget.hide()
        widget.deleteLater()
    edit, own, plain = (1e3 * statistics.median(times) for times in (edits, sheets, bare))
    benchmark.extra_info.update(edit_ms=edit, sheet_ms=own, plain_plots_ms=plain, ratio=edit / plain)
    say(f"edit {edit:.1f} ms, the sheet alone {own:.1f} ms, four plain plots {plain:.1f} ms")
    say(f"against the plots: edit {edit / plain:.2f}, sheet {own / plain:.2f}")
    assert own <= SHEET_RATIO * plain
    assert edit <= EDIT_RATIO * plain


BARE_START = """
import time; start = time.perf_counter()
import numpy, scipy.linalg, pyqtgraph
from PySide6.QtWidgets import QApplication, QMainWindow
app = QApplication([]); window = QMainWindow(); window.resize(1280, 800); window.show(); app.processEvents()
print(time.perf_counter() - start)
"""
OWN_START = """
import time; start = time.perf_counter()
import sys; from pathlib import Path
from app.gui.main import application, open_window
from app.gui.settings import Settings
from app.gui.view import Shown
from app.gui.sheet_view import SheetView
from app.gui.view import View
app = application(); folder = Path(sys.argv[2])
window = open_window(sys.argv[1], Settings(folder / "s.ini"), folder)
window.resize(1280, 800); app.processEvents()
print(time.perf_counter() - start)
window.close()
"""


def seconds_of(script, *arguments):
    """What the script says it took, in a process of its own, with compiled modules as an installation has.

    Up to the window with the member drawn in it; what only results need is imported when they come.
    """
    environment = {**os.environ, "QT_QPA_PLATFORM": "offscreen", "PYTHONPATH": os.pathsep.join(sys.path)}
    environment.pop("PYTHONDONTWRITEBYTECODE", None)
    environment["PYTHONPYCACHEPREFIX"] = arguments[-1]
    run = subprocess.run(
        [sys.executable, "-c", script, *arguments],
        env=environment,
        capture_output=True,
        text=True,
        check=True,
    )
    return float(run.stdout)


@pytest.mark.benchmark(group="window: start")
def test_the_window_starts_within_half_again_of_its_libraries(benchmark, tmp_path):
    path = sample_path()
    bare, own = [], []
    for _ in range(6):  # the first compiles
        bare.append(seconds_of(BARE_START, str(tmp_path)))
        own.append(seconds_of(OWN_START, str(path), str(tmp_path)))
    benchmark.pedantic(seconds_of, (OWN_START, str(path), str(tmp_path)), rounds=1)
    least = min(own) / min(bare)
    benchmark.extra_info.update(own_s=min(own), libraries_s=min(bare), ratio=least)
    say(f"start {min(own):.2f} s, its libraries with an empty window {min(bare):.2f} s: {least:.2f}")
    assert least <= START_RATIO
