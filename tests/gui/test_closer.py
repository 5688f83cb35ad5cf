"""Zooming in gives the curves points where it is looked at: as true close up as of the whole member."""

import numpy as np
import pytest

from app.drawing.ruler import Ruler
from app.gui.strips.closer import sampled_window
from solver.fields import at

RULER = Ruler.fitting((0.0, 0.4, 10.0), 0.0, 800.0)


def test_the_whole_member_needs_no_points_of_a_window():
    assert sampled_window(RULER, None) is None
    assert sampled_window(RULER, (1.0, 2.0)) is None


def test_a_step_keeps_the_window_and_a_leap_makes_another():
    closer = RULER.showing(4.0, 5.0)
    window = sampled_window(closer, None)
    assert window[0] < 4.0
    assert window[1] > 5.0
    assert sampled_window(closer.panned(30.0), window) == window
    assert sampled_window(closer.zoomed(1.2, 400.0), window) == window
    assert sampled_window(closer.panned(-3000.0), window) != window
    far = sampled_window(closer.zoomed(20.0, 400.0), window)
    assert far[1] - far[0] < 0.3 * (window[1] - window[0])


@pytest.mark.parametrize("factor", [30.0, 900.0])
def test_what_is_drawn_close_up_is_what_the_solver_has(window, factor):
    sheet = window.sheet
    results = window.showing.outcome.results
    sheet.zoom(factor, 0.5 * (sheet.ruler.begin + sheet.ruler.end))
    ruler, state = sheet.ruler, sheet.shown_state
    low, high = ruler.position_at(ruler.begin), ruler.position_at(ruler.end)
    for strip in sheet.strips:
        (trace,) = strip.content.traces
        assert ((trace.x > low) & (trace.x < high)).sum() > 100
        for x in np.linspace(low, high, 17)[1:-1]:
            drawn = strip.scale.pixel(float(np.interp(x, trace.x, trace.value)))
            exact = strip.scale.pixel(getattr(at(results, state, float(x)).left, strip.content.kind))
            assert drawn == pytest.approx(exact, abs=0.05)


def test_fitting_goes_back_to_the_points_of_the_whole(window):
    before = window.sheet.strips[1].content
    window.sheet.zoom(40.0, 300.0)
    assert len(window.sheet.strips[1].content.traces[0].x) > len(before.traces[0].x)
    window.sheet.fit()
    assert len(window.sheet.strips[1].content.traces[0].x) == len(before.traces[0].x)
    assert window.sheet.strips[1].content.high == before.high
