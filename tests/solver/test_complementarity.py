"""The complementarity problem against trying all choices of which of each pair is zero."""

from __future__ import annotations

from itertools import product

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from solver.complementarity import _by_blocks, _lemke, complementary


def matrix_of(rng, size, rank, whole):
    """Positive semidefinite, not always symmetric; small whole numbers bring ties and singular blocks."""
    root, turn = rng.normal(size=(size, rank)), rng.normal(size=(size, size))
    if whole:
        root, turn = np.round(root), np.round(turn)
    return root @ root.T + (turn - turn.T) * rng.integers(0, 2)


def is_solution(matrix, constant, z):
    w = matrix @ z + constant
    size = 1e-7 * (1 + np.abs(z).max(initial=0.0))
    return (
        z.min(initial=0.0) >= 0 and w.min(initial=0.0) >= -size and abs(w @ z) <= size * (1 + np.abs(z).sum())
    )


def any_choice_solves(matrix, constant):
    for choice in product([False, True], repeat=constant.size):
        basic = np.flatnonzero(choice)
        z = np.zeros(constant.size)
        z[basic] = np.linalg.lstsq(matrix[np.ix_(basic, basic)], -constant[basic], rcond=1e-10)[0]
        w = matrix @ z + constant
        if np.abs(w[basic]).max(initial=0) < 1e-8 and z.min(initial=0) > -1e-9 and w.min(initial=0) > -1e-9:
            return True
    return False


@given(seed=st.integers(0, 2**32), size=st.integers(1, 5), whole=st.booleans(), data=st.data())
def test_agrees_with_enumeration(seed, size, whole, data):
    rng = np.random.default_rng(seed)
    matrix = matrix_of(rng, size, data.draw(st.integers(0, size)), whole)
    constant = np.round(2 * rng.normal(size=size)) if whole else rng.normal(size=size)
    methods = (complementary,) if (constant >= 0).all() else (complementary, _lemke)
    for method in methods:
        z = method(matrix, constant)
        assert (z is not None) == any_choice_solves(matrix, constant), method
        assert z is None or is_solution(matrix, constant, z), method


def test_two_contacts_that_face_each_other_without_play():
    # one displacement between 0 and 0, pushed by 1: the singular block sends it to Lemke's method
    matrix = np.array([[1.0, -1.0], [-1.0, 1.0]])
    z = complementary(matrix, np.array([-1.0, 1.0]))
    assert z is not None
    assert is_solution(matrix, np.array([-1.0, 1.0]), z)
    assert z.tolist() == [1.0, 0.0]


def test_a_ray_says_that_there_is_no_solution():
    assert complementary(np.zeros((2, 2)), np.array([-1.0, 1.0])) is None


def test_nothing_to_do():
    assert complementary(np.eye(2), np.zeros(2)).tolist() == [0.0, 0.0]
    assert complementary(np.zeros((0, 0)), np.zeros(0)).size == 0


def test_many_contacts_both_ways_agree():
    rng = np.random.default_rng(1)
    side = rng.choice([-1.0, 1.0], 200)
    chain = 2.01 * np.eye(200) - np.eye(200, k=1) - np.eye(200, k=-1)
    matrix, constant = np.linalg.inv(chain) * np.outer(side, side), rng.normal(size=200)
    one, other = _by_blocks(matrix, constant), _lemke(matrix, constant)
    assert one is not None
    assert other is not None
    assert one == pytest.approx(other, rel=1e-9, abs=1e-9)
