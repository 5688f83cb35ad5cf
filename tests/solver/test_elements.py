"""The reference element: what must hold for every degree, and its integrals by another road."""

from __future__ import annotations

import numpy as np
import pytest
from numpy.polynomial import Legendre, legendre
from numpy.testing import assert_allclose

from solver.elements import (
    BOUND_POINTS,
    GREATEST_DEGREE,
    LEAST_DEGREE,
    bernstein_values,
    integration,
    legendre_of_modes,
    legendre_slopes,
    reference,
    times_t,
)

DEGREES = range(LEAST_DEGREE, GREATEST_DEGREE + 1)
T = np.linspace(-1, 1, 41)


def modes(degree):
    """The modes as Legendre series, whose products numpy works out term by term, without quadrature."""
    return [Legendre(row) for row in legendre_of_modes(degree)]


def over_t(series):
    return 2 * series.coef[0]


BERNSTEIN = [Legendre([1 / 3, -1 / 2, 1 / 6]), Legendre([1 / 3, 0, -1 / 3]), Legendre([1 / 3, 1 / 2, 1 / 6])]
POWERS = [Legendre.basis(n) for n in range(3)]


@pytest.mark.parametrize("degree", DEGREES)
def test_ends_are_carried_by_mean_and_stretch_alone(degree):
    ends = legendre_of_modes(degree) @ legendre.legvander(np.array([-1.0, 1.0]), degree).T
    assert_allclose(ends[0], [1, 1], atol=1e-15)
    assert_allclose(ends[1], [-0.5, 0.5], atol=1e-15)
    assert_allclose(ends[2:], 0, atol=1e-15)


@pytest.mark.parametrize("degree", DEGREES)
def test_modes_span_all_polynomials_of_the_degree(degree):
    assert np.linalg.matrix_rank(legendre_of_modes(degree)) == degree + 1


@pytest.mark.parametrize("degree", DEGREES)
def test_bubble_slopes_are_orthonormal_and_free_of_mean(degree):
    # so a prismatic element's bubbles are diagonal and do not couple with its stretch
    even = np.array([1.0, 1.0, 1.0])
    matrix = np.tensordot(even, reference(degree).stiffness, 1).reshape(degree, degree)
    assert_allclose(matrix[1:, 1:], np.eye(degree - 1), atol=1e-14)
    assert_allclose(matrix[0], [0.5, *[0] * (degree - 1)], atol=1e-14)


@pytest.mark.parametrize("degree", DEGREES)
def test_integrals_agree_with_products_of_series(degree):
    ref, phi = reference(degree), modes(degree)
    slopes = [p.deriv() for p in phi[1:]]
    stiffness = [[over_t(b * f * g) for f in slopes for g in slopes] for b in BERNSTEIN]
    bedding = [[over_t(c * f * g) for f in phi for g in phi] for c in POWERS[:2]]
    load = [[over_t(c * f) for f in phi] for c in POWERS]
    strain = [[over_t(b * c * f) for f in slopes] for b in BERNSTEIN for c in POWERS[:2]]
    close = {"rtol": 0, "atol": 1e-13}
    assert_allclose(ref.stiffness, stiffness, **close)
    assert_allclose(ref.bedding, bedding, **close)
    assert_allclose(ref.load, load, **close)
    assert_allclose(ref.strain, strain, **close)


@pytest.mark.parametrize("degree", DEGREES)
@pytest.mark.parametrize("area", [(1, 1, 1), (1, 3, 9), (400, 20, 1), (1, 5, 2)])
def test_stiffness_is_symmetric_and_positive(degree, area):
    matrix = (np.array(area, float) @ reference(degree).stiffness).reshape(degree, degree)
    assert_allclose(matrix, matrix.T, atol=1e-13 * max(area))
    assert np.linalg.eigvalsh(matrix)[0] > 0


@pytest.mark.parametrize("degree", DEGREES)
def test_slopes_agree_with_finite_differences(degree):
    h = 1e-6
    rates = (legendre.legvander(T + h, degree) - legendre.legvander(T - h, degree)).T / (2 * h)
    # third derivatives of P_12 reach 1e5 at the ends, times h²/6
    assert_allclose(legendre_slopes(degree, T), rates, rtol=0, atol=1e-6)


@pytest.mark.parametrize("degree", [2, 5, 12])
def test_integration_and_product_agree_with_numpy(degree):
    series = np.random.default_rng(degree).normal(size=degree + 1)
    ours = series @ integration(degree, degree + 2)
    theirs = legendre.legint(series)
    assert_allclose(ours[1:], theirs[1:], atol=1e-15)
    assert_allclose(series @ times_t(degree), legendre.legmulx(series), atol=1e-15)


@pytest.mark.parametrize("degree", [2, 7, 12])
def test_equilibrium_matrices_integrate_bedding_and_load(degree):
    rng, ref = np.random.default_rng(degree), reference(degree)
    u, q, k = rng.normal(size=degree + 1), rng.normal(size=3), rng.normal(size=2)
    y = (
        k[0] * (u @ ref.force_of_mean_bedding)
        + k[1] * (u @ ref.force_of_bedding_slope)
        - q @ ref.force_of_load
    )
    expected = legendre.legval(T, k) * legendre.legval(T, u) - legendre.legval(T, q)
    assert_allclose(legendre.legval(T, legendre.legder(y)), expected, atol=1e-12)


@pytest.mark.parametrize("degree", DEGREES)
def test_values_at_the_bound_points(degree):
    ref = reference(degree)
    t = legendre.leggauss(degree + BOUND_POINTS)[0]
    series = np.random.default_rng(degree).normal(size=degree + 3)
    assert_allclose(series @ ref.force, legendre.legval(t, series), atol=1e-12)
    assert_allclose(series[:-2] @ ref.value, legendre.legval(t, series[:-2]), atol=1e-12)
    assert_allclose(series[:-2] @ ref.slope, legendre.legval(t, legendre.legder(series[:-2])), atol=1e-10)
    assert_allclose(ref.weights.sum(), 2, rtol=1e-14)


def test_bernstein_polynomials_are_positive_and_sum_to_one():
    first, middle, last = bernstein_values(T)
    for ours, series in zip((first, middle, last), BERNSTEIN, strict=True):
        assert_allclose(ours, series(T), atol=1e-15)
    assert_allclose(first + middle + last, 1, rtol=1e-15)
    assert min(first.min(), middle.min(), last.min()) >= 0


def test_reference_arrays_are_shared_and_read_only():
    assert reference(4) is reference(4)
    with pytest.raises(ValueError, match="read-only"):
        reference(4).stiffness[0, 0] = 1.0
