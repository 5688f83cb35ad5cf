"""Least widths on the ruler: there and back, nothing too narrow, nothing changed where all is wide."""

from __future__ import annotations

from itertools import accumulate, pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.drawing.ruler import Ruler
from app.drawing.widths import LARGEST_SHARE, LEAST, sheet_of, widened

LENGTHS = st.lists(st.floats(1e-3, 1e3), min_size=1, max_size=60)
WAYS = st.sampled_from([(100.0, 900.0), (500.0, 40.0)])  # across, and upright
SHARES = st.floats(0.0, 1.0)


def joints_of(lengths: list[float]) -> tuple[float, ...]:
    return tuple(accumulate(lengths, initial=0.0))


def widths(ruler: Ruler) -> list[float]:
    return [abs(ruler.pixel(b) - ruler.pixel(a)) for a, b in pairwise(ruler.joints)]


@given(LENGTHS, WAYS)
def test_no_segment_is_narrower_than_the_least_width(lengths, way):
    pixels = abs(way[1] - way[0])
    least = min(LEAST, LARGEST_SHARE * pixels / len(lengths))
    found = widths(Ruler.fitting(joints_of(lengths), *way))
    assert min(found) >= least * (1 - 1e-9)
    assert sum(found) == pytest.approx(pixels)


@given(LENGTHS, WAYS)
def test_the_others_stay_in_proportion_and_yield_no_more_than_is_needed(lengths, way):
    ruler = Ruler.fitting(joints_of(lengths), *way)
    narrow = set(ruler.widened)
    least = min(LEAST, LARGEST_SHARE * abs(way[1] - way[0]) / len(lengths))
    for index, (length, width) in enumerate(zip(lengths, widths(ruler), strict=True)):
        if index in narrow:
            assert width == pytest.approx(least, rel=1e-6)
        else:
            assert width == pytest.approx(length * ruler.pixels_per_metre, rel=1e-6)
    assert len(narrow) < len(lengths)


@given(LENGTHS, WAYS, st.floats(1.0, 50.0), SHARES, st.lists(SHARES, min_size=2, max_size=20))
def test_pixels_grow_with_positions_and_lead_back(lengths, way, factor, about, shares):
    ruler = Ruler.fitting(joints_of(lengths), *way).zoomed(factor, way[0] + about * (way[1] - way[0]))
    for x in (share * ruler.length for share in shares):
        assert ruler.position_at(ruler.pixel(x)) == pytest.approx(x, abs=1e-9 * ruler.length)
    xs = np.unique([round(share, 6) for share in shares]) * ruler.length
    steps = np.diff(ruler.pixel(xs)) * np.sign(ruler.scale)
    assert (steps > 0).all()


@given(LENGTHS, WAYS, st.lists(SHARES, min_size=1, max_size=20))
def test_one_position_and_many_have_the_same_pixels(lengths, way, shares):
    ruler = Ruler.fitting(joints_of(lengths), *way)
    places = [*ruler.joints, *(share * ruler.length for share in shares), 1.5 * ruler.length]
    np.testing.assert_allclose(ruler.pixel(np.array(places)), [ruler.pixel(x) for x in places], rtol=1e-12)


@given(st.lists(st.floats(1.0, 2.0), min_size=1, max_size=20), WAYS)
def test_where_all_are_wide_enough_the_sheet_is_the_member(lengths, way):
    ruler = Ruler.fitting(joints_of(lengths), *way)
    assert ruler.to_scale
    assert ruler.widened == ()
    assert ruler.sheet_joints is ruler.joints


def test_five_hundred_segments_keep_a_width_that_can_be_told_apart():
    lengths = [10.0 if index % 7 == 0 else 0.01 for index in range(500)]
    ruler = Ruler.fitting(joints_of(lengths), 0.0, 800.0)
    assert min(widths(ruler)) == pytest.approx(LARGEST_SHARE * 800.0 / 500)
    assert len(ruler.widened) == 500 - 72


def test_to_one_scale_if_asked_and_back():
    ruler = Ruler.fitting((0.0, 0.01, 10.0), 0.0, 100.0)
    assert ruler.widened == (0,)
    true = ruler.truly(true=True)
    assert true.pixel(0.01) == pytest.approx(0.1)
    assert true.fitted().to_scale
    assert true.truly(true=False) == ruler


def test_a_close_window_shows_the_same_positions_on_other_pixels():
    close = Ruler.fitting((0.0, 0.01, 10.0), 0.0, 100.0).zoomed(4.0, 0.0)
    wide = close.on(0.0, 1000.0)
    assert wide.position_at(1000.0) == pytest.approx(close.position_at(100.0))
    assert wide.pixel(0.01) - wide.pixel(0.0) == pytest.approx(
        LEAST / 1000.0 * wide.fitted().last * wide.pixels_per_metre
    )


def test_held_keeps_every_pixel_while_the_member_grows():
    ruler = Ruler.fitting((0.0, 0.01, 10.0), 0.0, 100.0)
    held = ruler.held(12.0)
    assert [held.pixel(x) for x in (0.0, 0.01, 5.0, 10.0)] == [ruler.pixel(x) for x in (0.0, 0.01, 5.0, 10.0)]
    assert held.position_at(held.pixel(11.0)) == pytest.approx(11.0)
    assert held.pixel(11.0) == pytest.approx(100.0 + ruler.pixels_per_metre)
    assert held.of((0.0, 0.01, 12.0)) == Ruler.fitting((0.0, 0.01, 12.0), 0.0, 100.0)


@pytest.mark.parametrize("way", [(0.0, 800.0), (600.0, 50.0)])
def test_a_stretch_is_shown_whole_with_air_on_both_sides(way):
    ruler = Ruler.fitting((0.0, 2.0, 2.01, 10.0), *way).showing(2.0, 2.01)
    assert ruler.first < ruler.sheet(2.0)
    assert ruler.last > ruler.sheet(2.01)
    assert abs(ruler.pixel(2.01) - ruler.pixel(2.0)) > 0.8 * abs(way[1] - way[0])
    assert ruler.showing(0.0, 10.0).whole_shown


def test_a_member_without_length_on_the_sheet_is_to_scale():
    assert sheet_of((0.0, 1.0), 0.0) == (0.0, 1.0)
    assert widened((0.0, 1.0), (0.0, 1.0)) == ()
