"""The ruler: there and back, zoom about a pixel, pan within the member, both ways round."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.drawing.ruler import CLOSEST, Ruler

LENGTHS = st.floats(1e-3, 1e4)
SHARES = st.floats(0.0, 1.0)
WAYS = st.sampled_from([(100.0, 900.0), (500.0, 40.0)])  # across, and upright


@given(LENGTHS, SHARES, WAYS, st.floats(1.0, 50.0), SHARES)
def test_a_position_comes_back_from_its_pixel(length, share, way, factor, about):
    ruler = Ruler.whole(length, *way)
    ruler = ruler.zoomed(factor, way[0] + about * (way[1] - way[0]))
    x = share * length
    # Pixels of positions far outside a close window are large: 1e-9 of the member is far below a pixel.
    assert ruler.position_at(ruler.pixel(x)) == pytest.approx(x, abs=1e-9 * length)


@given(LENGTHS, WAYS, st.floats(0.1, 100.0), SHARES)
def test_zooming_keeps_what_is_under_the_pointer_unless_an_end_is_met(length, way, factor, about):
    pixel = way[0] + about * (way[1] - way[0])
    ruler = Ruler.whole(length, *way).zoomed(4.0, 0.5 * sum(way))
    zoomed = ruler.zoomed(factor, pixel)
    assert zoomed.first >= 0.0
    assert zoomed.last <= length * (1 + 1e-12)
    free = zoomed.first > 1e-9 * length and zoomed.last < length * (1 - 1e-9)
    if free:
        assert zoomed.position_at(pixel) == pytest.approx(ruler.position_at(pixel), abs=1e-7 * length)


def test_zoom_stops_at_the_whole_and_at_the_closest():
    ruler = Ruler.whole(2.0, 0.0, 100.0)
    assert ruler.zoomed(0.1, 50.0) == ruler
    close = ruler.zoomed(1e9, 50.0)
    assert close.last - close.first == pytest.approx(CLOSEST * 2.0)
    assert close.fitted() == ruler


def test_panning_moves_with_the_hand_and_stops_at_the_ends():
    ruler = Ruler.whole(10.0, 0.0, 100.0).zoomed(2.0, 50.0)
    assert ruler.panned(10.0).pixel(5.0) == pytest.approx(ruler.pixel(5.0) + 10.0)
    assert ruler.panned(1e6).first == 0.0
    assert ruler.panned(-1e6).last == pytest.approx(10.0)
    upright = Ruler.whole(10.0, 100.0, 0.0).zoomed(2.0, 50.0)
    assert upright.panned(10.0).pixel(5.0) == pytest.approx(upright.pixel(5.0) + 10.0)


def test_upright_x_grows_upward():
    ruler = Ruler.whole(3.0, 400.0, 20.0)
    assert ruler.pixel(0.0) == 400.0
    assert ruler.pixel(3.0) == 20.0
    np.testing.assert_allclose(ruler.pixel(np.array([0.0, 1.5])), [400.0, 210.0])
    assert ruler.pixels_per_metre == pytest.approx(380.0 / 3.0)


def test_positions_stay_on_the_member():
    ruler = Ruler.whole(3.0, 10.0, 40.0)
    assert ruler.position_at(-100.0) == 0.0
    assert ruler.position_at(1000.0) == 3.0
    assert ruler.holds(3.0)
    assert not ruler.zoomed(3.0, 10.0).holds(3.0)


def test_another_length_keeps_a_close_window_but_not_beyond_the_end():
    ruler = Ruler.whole(10.0, 0.0, 100.0)
    assert ruler.of((0.0, 12.0)) == Ruler.whole(12.0, 0.0, 100.0)
    close = ruler.zoomed(5.0, 0.0)
    assert (close.of((0.0, 12.0)).first, close.of((0.0, 12.0)).last) == (close.first, close.last)
    assert close.of((0.0, 1.0)).whole_shown


@pytest.mark.parametrize("end", [800.0, -800.0])
def test_a_ruler_reaches_to_the_end_of_a_member_that_has_grown(end):
    near = Ruler.fitting((0.0, 1.0, 2.0), 0.0, end).showing(0.5, 2.0, air=0.0)
    far = near.reaching((0.0, 1.0, 5.0))
    assert far.pixel(5.0) == pytest.approx(end)
    assert far.pixel(0.5) == pytest.approx(0.0)
    assert Ruler.fitting((0.0, 1.0), 0.0, end).reaching((0.0, 3.0)).whole_shown
