"""The reference element: hierarchical functions on t = −1…1 and their integrals, once for every degree.

The displacement of an element is  mean · 1 + stretch · t/2 + Σ b_j φ_j(t),  j = 2…p, with φ_j the integrated
Legendre polynomials (P_j − P_{j−2}) / √(2(2j − 1)), which vanish at both ends and whose slopes are
orthonormal. Mean and stretch of the end displacements are used instead of the two end functions (they span
the same space): a rigid movement then costs no energy to the last bit, and a stretch far smaller than the
displacement keeps its digits.

The area is a sum of three Bernstein polynomials, bedding, load and strain are Legendre polynomials, so every
integral of an element is a small fixed sum of the integrals kept here, found by Gauss–Legendre quadrature
that is exact for them. The rejected alternative, quadrature on each element, costs ten times the work.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import FloatArray, frozen

LEAST_DEGREE = 2
GREATEST_DEGREE = 12
STIFFNESS_POINTS = 3  # more quadrature points than the degree, for polynomials
BOUND_POINTS = 10  # likewise where 1/A is integrated


@dataclass(frozen=True, slots=True)
class Reference:
    """Arrays of degree p; "modes" are the p + 1 functions 1, t/2, φ_2 … φ_p in this order.

    The first axis of an integral counts the polynomials of the coefficient, the rest is flat over modes.
    """

    stiffness: FloatArray  # (3, p²) ∫ B_b φ_i' φ_j' dt over all modes but the first
    bedding: FloatArray  # (2, (p + 1)²) ∫ P_c φ_i φ_j dt
    load: FloatArray  # (3, p + 1) ∫ P_c φ_j dt
    strain: FloatArray  # (6, p) ∫ B_b P_c φ_j' dt, all modes but the first; b the slow index, c = 0, 1
    legendre: FloatArray  # (p + 1, p + 1) modes to Legendre coefficients
    force_of_mean_bedding: FloatArray  # (p + 1, p + 3) Legendre u to Legendre ∫ u dt, without constant
    force_of_bedding_slope: FloatArray  # (p + 1, p + 3) likewise ∫ t u dt
    force_of_load: FloatArray  # (3, p + 3) likewise for a load of degree 2
    weights: FloatArray  # (g,) the bound's quadrature, sum 2
    bernstein: FloatArray  # (3, g) at the bound's points, as everything below
    value: FloatArray  # (p + 1, g) Legendre u to u
    slope: FloatArray  # (p + 1, g) Legendre u to du/dt
    force: FloatArray  # (p + 3, g) Legendre y to y


def bernstein_values(t: FloatArray) -> FloatArray:
    """The three quadratic Bernstein polynomials at t (g,), as (3, g)."""
    return np.array([(1 - t) ** 2 / 4, (1 - t) * (1 + t) / 2, (1 + t) ** 2 / 4])


def legendre_of_modes(degree: int) -> FloatArray:
    """(p + 1, p + 1): row i holds mode i in Legendre coefficients."""
    modes = np.zeros((degree + 1, degree + 1))
    modes[0, 0], modes[1, 1] = 1.0, 0.5
    for j in range(2, degree + 1):
        modes[j, j] = 1 / np.sqrt(2 * (2 * j - 1))
        modes[j, j - 2] = -modes[j, j]
    return modes


def integration(degree: int, columns: int) -> FloatArray:
    """(degree + 1, columns): Legendre coefficients to those of an integral over t, constant left at 0."""
    matrix = np.zeros((degree + 1, columns))
    for n in range(degree + 1):
        matrix[n, n + 1] = 1 / (2 * n + 1)
        if n > 1:
            matrix[n, n - 1] = -1 / (2 * n + 1)
    return matrix


def times_t(degree: int) -> FloatArray:
    """(degree + 1, degree + 2): Legendre coefficients of f to those of t f."""
    matrix = np.zeros((degree + 1, degree + 2))
    for n in range(degree + 1):
        matrix[n, n + 1] = (n + 1) / (2 * n + 1)
        if n:
            matrix[n, n - 1] = n / (2 * n + 1)
    return matrix


def legendre_slopes(degree: int, t: FloatArray) -> FloatArray:
    """(p + 1, g): dP_n/dt at t."""
    derivative = np.zeros((degree + 1, degree + 1))
    derivative[:, :degree] = legendre.legder(np.eye(degree + 1)).T
    return derivative @ legendre.legvander(t, degree).T


def _integrals(degree: int) -> dict[str, FloatArray]:
    t, w = legendre.leggauss(degree + STIFFNESS_POINTS)
    modes = legendre_of_modes(degree)
    value = modes @ legendre.legvander(t, degree).T
    slope = (modes @ legendre_slopes(degree, t))[1:]
    powers = legendre.legvander(t, 2).T
    area = bernstein_values(t)
    return {
        "stiffness": np.einsum("bg,ig,jg,g->bij", area, slope, slope, w).reshape(3, -1),
        "bedding": np.einsum("cg,ig,jg,g->cij", powers[:2], value, value, w).reshape(2, -1),
        "load": np.einsum("cg,jg,g->cj", powers, value, w),
        "strain": np.einsum("bg,cg,jg,g->bcj", area, powers[:2], slope, w).reshape(6, -1),
    }


def _at_bound_points(degree: int) -> dict[str, FloatArray]:
    t, w = legendre.leggauss(degree + BOUND_POINTS)
    return {
        "weights": w,
        "bernstein": bernstein_values(t),
        "value": np.asarray(legendre.legvander(t, degree).T),
        "slope": legendre_slopes(degree, t),
        "force": np.asarray(legendre.legvander(t, degree + 2).T),
    }


@cache
def reference(degree: int) -> Reference:
    """The arrays of one degree, read-only, made when first asked for."""
    arrays = _integrals(degree) | _at_bound_points(degree)
    arrays["legendre"] = legendre_of_modes(degree)
    arrays["force_of_mean_bedding"] = integration(degree, degree + 3)
    arrays["force_of_bedding_slope"] = times_t(degree) @ integration(degree + 1, degree + 3)
    arrays["force_of_load"] = integration(2, degree + 3)
    return Reference(**{name: frozen(np.ascontiguousarray(array)) for name, array in arrays.items()})
