"""Roots of Bernstein polynomials against numpy's eigenvalue roots; basis changes against evaluation."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from numpy.polynomial import Polynomial, legendre
from numpy.testing import assert_allclose

from solver.roots import (
    bernstein_of_legendre,
    bernstein_values,
    product_with,
    roots_inside,
    slope_of_legendre,
)

S = np.linspace(0.0, 1.0, 9)
rng = np.random.default_rng(20)


def bernstein_of_power(power):
    """Power coefficients on 0…1 to Bernstein form, by interpolation (a road of its own)."""
    degree = len(power) - 1
    places = np.linspace(0.0, 1.0, degree + 1)
    basis = np.stack(
        [bernstein_values(np.tile(row, (degree + 1, 1)), places) for row in np.eye(degree + 1)], axis=1
    )
    return np.linalg.solve(basis, Polynomial(power)(places))


def roots_of(coefficients, noise=0.0):
    found = roots_inside(np.array([coefficients], dtype=float), np.array([noise]))
    return np.sort(found.place)


def values(coefficients):
    return bernstein_values(np.tile(coefficients, (len(S), 1)), S)


@pytest.mark.parametrize("degree", range(16))
def test_legendre_polynomials_in_bernstein_form(degree):
    for k, row in enumerate(bernstein_of_legendre(degree)):
        assert_allclose(values(row), legendre.legval(2 * S - 1, np.eye(degree + 1)[k]), atol=1e-12)


@pytest.mark.parametrize("degree", range(1, 16))
def test_slopes_of_legendre_polynomials(degree):
    for k, row in enumerate(slope_of_legendre(degree)):
        slope = 2 * legendre.legval(2 * S - 1, legendre.legder(np.eye(degree + 1)[k]))
        assert_allclose(values(row), slope, rtol=1e-11, atol=1e-10)


def test_product_of_two_polynomials():
    a, b = rng.normal(size=5), rng.normal(size=3)
    product = np.einsum("i,j,ijc->c", a, b, product_with(4, 2))
    assert_allclose(values(product), values(a) * values(b), atol=1e-14)


@given(st.lists(st.floats(0.01, 0.99), min_size=1, max_size=6), st.floats(-3.0, -0.5), st.floats(1.5, 4.0))
def test_every_planted_root_is_found(planted, below, above):
    planted = np.sort(planted)
    if np.any(np.diff(planted) < 0.02):  # nearer than that, rounding of the coefficients moves them
        return
    power = Polynomial.fromroots([*planted, below, above]).coef
    found = roots_of(bernstein_of_power(power))
    assert len(found) == len(planted)
    assert_allclose(found, planted, atol=1e-8)


def test_many_rows_at_once_agree_with_eigenvalues():
    rows = rng.normal(size=(300, 8))
    found = roots_inside(rows, np.zeros(300))
    for index, row in enumerate(rows):
        power = sum(
            c * (Polynomial([0, 1]) ** i) * (Polynomial([1, -1]) ** (7 - i)) * b
            for i, (c, b) in enumerate(zip(row, [1, 7, 21, 35, 35, 21, 7, 1], strict=True))
        )
        reference = power.roots()
        real = np.sort(reference[(abs(reference.imag) < 1e-9)].real)
        inside = real[(real > 0) & (real < 1)]
        assert_allclose(np.sort(found.place[found.row == index]), inside, atol=1e-7)


def test_double_root_is_found_although_the_sign_does_not_change():
    # (s − 1/3)²: Bernstein form 1/9, −2/9, 4/9; halving alone finds it, to half the digits
    found = roots_of([1 / 9, -2 / 9, 4 / 9])
    assert len(found) >= 1
    assert_allclose(found, 1 / 3, atol=1e-6)


def test_triple_root_is_found():
    power = Polynomial.fromroots([0.3, 0.3, 0.3]).coef
    found = roots_of(bernstein_of_power(power), noise=1e-15)
    assert_allclose(found, 0.3, atol=1e-4)
    assert 1 <= len(found) < 10


def test_root_at_the_middle_where_halving_cuts():
    # three roots, so that it is halved, and the middle one lies on the cut
    found = roots_of(bernstein_of_power(Polynomial.fromroots([0.25, 0.5, 0.75]).coef))
    assert_allclose(found, [0.25, 0.5, 0.75], atol=1e-12)


def test_noise_has_no_roots():
    assert len(roots_of([1e-15, -1e-15, 2e-15, -3e-15], noise=1e-13)) == 0
    assert len(roots_of([1.0, 1.0, -1e-15, 1.0], noise=1e-13)) == 0


def test_constant_and_nothing_at_all():
    assert len(roots_of([1.0])) == 0
    assert len(roots_inside(np.zeros((0, 4)), np.zeros(0)).row) == 0
    assert len(roots_of([0.0, 0.0, 0.0])) == 0
