"""Thinned curves show what the whole ones do: every extreme of a column of pixels, every break."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.thinning import FEW, MOST, Chain, chain_of, thinned


def all_joined(count):
    return chain_of(np.ones(count - 1, dtype=bool))


def height_at(chain, along, across, at):
    """What the thinned line has at a place, by linear interpolation."""
    return np.interp(at, along[chain.index], across[chain.index])


def test_a_chain_breaks_where_an_interval_is_not_chosen():
    chain = chain_of(np.array([True, True, False, True, False, False]))
    assert chain.index.tolist() == [0, 1, 2, 3, 4]
    assert chain.joined.tolist() == [True, True, False, True, False]


def test_a_straight_line_keeps_its_ends():
    count = 10 * FEW
    along = np.linspace(0.0, 5.0 * count, count)
    chain = thinned(all_joined(count), along, 3.0 * along)
    assert len(chain.index) <= count / 50
    assert {0, count - 1} <= set(chain.index.tolist())


def test_a_spike_on_a_vertical_line_stays():
    at = FEW
    along = np.concatenate([np.arange(at + 0.0), [at, at, at, at + 1.0]])
    across = np.zeros(at + 4)
    across[at + 1] = 50.0
    chain = thinned(all_joined(at + 4), along, across)
    assert at + 1 in chain.index.tolist()
    assert len(chain.index) < at / 10


def test_few_points_are_left_as_they_are():
    along = np.arange(0.0, FEW)
    assert len(thinned(all_joined(FEW), along, along).index) == FEW


def test_a_break_stays_where_columns_are_not_crowded():
    along = np.array([0.0, 50.0, 50.0, 100.0])
    chain = thinned(chain_of(np.array([True, False, True])), along, np.array([1.0, 1.0, 9.0, 9.0]))
    assert chain.index.tolist() == [0, 1, 2, 3]
    assert chain.joined.tolist() == [True, False, True, False]


@given(st.integers(0, 2**32 - 1), st.integers(10, 20_000))
def test_no_column_of_pixels_loses_its_lowest_or_highest_value(seed, count):
    random = np.random.default_rng(seed)
    along = np.sort(random.uniform(0.0, 300.0, count))
    across = random.normal(0.0, 40.0, count)
    chain = thinned(all_joined(count), along, across)
    kept = along[chain.index]
    for column in range(300):
        there = (along >= column) & (along < column + 1)
        if not there.any():
            continue
        tips = across[chain.index[(kept >= column) & (kept < column + 1)]]
        drawn = np.concatenate([height_at(chain, along, across, along[there]), tips])
        assert drawn.min() == pytest.approx(across[there].min(), abs=0.2)
        assert drawn.max() == pytest.approx(across[there].max(), abs=0.2)
    assert len(chain.index) <= MOST * 301


@given(st.floats(0.5, 9.0), st.floats(0.0, 6.0))
def test_a_smooth_curve_is_off_by_less_than_a_pixel_shows(waves, phase):
    along = np.linspace(0.0, 650.0, 2 * FEW)
    across = 60.0 * np.sin(waves * along / 100.0 + phase)
    chain = thinned(all_joined(2 * FEW), along, across)
    assert np.abs(height_at(chain, along, across, along) - across).max() < 0.2


@pytest.mark.parametrize("count", [0, 1, 2])
def test_short_chains_stay(count):
    index = np.arange(count)
    chain = Chain(index, np.ones(count, dtype=bool))
    assert thinned(chain, index * 1.0, index * 1.0) is chain
