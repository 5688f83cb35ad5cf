"""Elastic critical loads against closed forms, tables and independent integrations.

The factor is promised to 1e-6; closed forms are held to that, tables to their last digit.
"""

from __future__ import annotations

import math

import numpy as np
import pytest
from msgspec import UNSET, structs
from numpy.testing import assert_allclose
from scipy.integrate import solve_ivp
from scipy.optimize import brentq
from scipy.special import jv

from solver.model import FixedSupport, JointLoad, Lateral, Limits, SegmentLoad
from solver.solve import solve
from tests.members import STEEL, Part, case, member, round_bar

PROMISED = 1e-6
PINNED = Lateral(translation="fixed")
CLAMPED = Lateral(translation="fixed", rotation="fixed")
LENGTH, DIAMETER, LOAD = 3.0, 0.06, 10e3
BENDING = STEEL * math.pi * DIAMETER**4 / 64


def column(parts, laterals, cases):
    """Held along the axis at its foot, with lateral supports by joint."""
    project = member(parts, {0: FixedSupport()}, cases)
    joints = [structs.replace(j, lateral=laterals.get(i, UNSET)) for i, j in enumerate(project.joints)]
    return structs.replace(project, joints=tuple(joints), limits=Limits(stability_factor=2.0))


def pressed(parts, laterals, load=LOAD):
    """Compressed by a load on its last joint."""
    return column(parts, laterals, [case(on_joints=[JointLoad(str(len(parts)), force=-load)])])


def factor(project):
    """The critical factor of its only state."""
    (found,) = solve(project).stability
    assert found.status == "checked", found
    return found.critical_factor


def prismatic(*lengths):
    return [Part(length, round_bar(DIAMETER)) for length in lengths]


# --- Euler ---

_FIXED_PINNED = brentq(lambda x: math.tan(x) - x, 4.4, 4.6, xtol=1e-14)  # tan kL = kL


@pytest.mark.parametrize(
    ("foot", "head", "root"),
    [
        (CLAMPED, UNSET, math.pi / 2),
        (PINNED, PINNED, math.pi),
        (CLAMPED, PINNED, _FIXED_PINNED),
        (CLAMPED, CLAMPED, 2 * math.pi),
    ],
)
@pytest.mark.parametrize("lengths", [(3.0,), (1.3, 0.004, 1.696), (0.25,) * 12])
def test_end_cases_of_euler(foot, head, root, lengths):
    # Every textbook on strength of materials: P = (kL)² E I / L².
    project = pressed(prismatic(*lengths), {0: foot, len(lengths): head})
    assert_allclose(factor(project) * LOAD, root**2 * BENDING / LENGTH**2, rtol=PROMISED)


def test_a_head_held_against_turning_alone_buckles_as_half_a_wave():
    project = pressed(prismatic(LENGTH), {0: CLAMPED, 1: Lateral(translation="free", rotation="fixed")})
    assert_allclose(factor(project) * LOAD, math.pi**2 * BENDING / LENGTH**2, rtol=PROMISED)


# --- loads along the member ---


@pytest.mark.parametrize("lengths", [(3.0,), (1.0, 0.5, 1.5)])
def test_column_of_greenhill_under_its_own_weight(lengths):
    # Greenhill 1881; Timoshenko and Gere, Theory of Elastic Stability: q L³ / E I = 7.837, from the first
    # zero of the Bessel function of order −1/3: (3 j / 2)² with j = 1.8663… (from memory).
    j = brentq(lambda x: jv(-1 / 3, x), 1.8, 1.9, xtol=1e-14)
    assert_allclose((1.5 * j) ** 2, 7.837, atol=5e-4)
    density, gravity = 7850.0, 9.81
    parts = [Part(length, round_bar(DIAMETER), density=density) for length in lengths]
    project = column(parts, {0: CLAMPED}, [case(gravity=-gravity)])
    weight = density * gravity * math.pi * DIAMETER**2 / 4
    assert_allclose(factor(project) * weight * LENGTH**3 / BENDING, (1.5 * j) ** 2, rtol=PROMISED)


class Shooting:
    """A pinned column integrated from its foot: y = (w, w', M, V), M = E I w'', M' = V + factor N w', V' = 0.

    Pieces are (end, N(x), E I(x)).
    """

    def __init__(self, *pieces):
        self.pieces = pieces

    def _end(self, factor, y):
        start = 0.0
        for end, force, bending in self.pieces:

            def slope(x, y, force=force, bending=bending):
                return [y[1], y[2] / bending(x), y[3] + factor * force(x) * y[1], 0.0]

            y = solve_ivp(slope, (start, end), y, method="DOP853", rtol=1e-10, atol=1e-13).y[:, -1]
            start = end
        return y

    def determinant(self, factor):
        """Zero where the head, too, has neither deflection nor moment."""
        scale = BENDING / LENGTH**2
        turned, sheared = self._end(factor, [0.0, 1.0, 0.0, 0.0]), self._end(factor, [0.0, 0.0, 0.0, scale])
        return turned[0] * sheared[2] - turned[2] * sheared[0]

    def first_is(self, factor):
        """Whether the first zero lies within what is promised of the factor."""
        below = [self.determinant(part * factor) for part in (*np.linspace(0.1, 0.9, 6), 1 - PROMISED)]
        return min(below) * max(below) > 0 and self.determinant(factor * (1 + PROMISED)) * below[-1] < 0


def test_pull_in_one_part_holds_back_the_other():
    half = LENGTH / 2
    loads = [JointLoad("1", force=-2 * LOAD), JointLoad("2", force=LOAD)]
    project = column(prismatic(half, half), {0: PINNED, 2: PINNED}, [case(on_joints=loads)])
    pieces = (half, lambda x: -LOAD, lambda x: BENDING), (LENGTH, lambda x: LOAD, lambda x: BENDING)
    assert Shooting(*pieces).first_is(factor(project))


def test_load_that_grows_along_a_tapered_column():
    start, end = 0.05, 0.08
    spread = SegmentLoad("A", load_start=-LOAD / LENGTH, load_end=-2 * LOAD / LENGTH)
    loads = [case(on_segments=[spread], on_joints=[JointLoad("1", force=-LOAD)])]
    project = column([Part(LENGTH, round_bar(start, end))], {0: PINNED, 1: PINNED}, loads)

    def force(x):
        s = x / LENGTH
        return -LOAD - LOAD * ((1 - s) + (1 - s * s) / 2)

    def bending(x):
        return STEEL * math.pi / 64 * (start + (end - start) * x / LENGTH) ** 4

    assert Shooting((LENGTH, force, bending)).first_is(factor(project))


# --- stepped and tapered ---


@pytest.mark.parametrize(("part", "table"), [(0.2, 5.09), (0.4, 6.68), (0.6, 8.51), (0.8, 9.67)])
def test_pinned_column_with_a_stiffer_middle(part, table):
    # Timoshenko and Gere, Theory of Elastic Stability, symmetric column with two cross-sections: I₁/I₂ = 0.4,
    # P = m E I₂ / L² (table from memory; verified here by tan k₁l₁ tan k₂a/2 = k₁/k₂, l₁ = (L − a)/2).
    middle = part * LENGTH
    beside = (LENGTH - middle) / 2
    thin = DIAMETER * 0.4**0.25
    parts = [Part(beside, round_bar(thin)), Part(middle, round_bar(DIAMETER)), Part(beside, round_bar(thin))]
    m = factor(pressed(parts, {0: PINNED, 3: PINNED})) * LOAD * LENGTH**2 / BENDING
    assert_allclose(m, table, atol=0.006)

    def condition(value):
        k2 = math.sqrt(value) / LENGTH
        k1 = k2 / math.sqrt(0.4)
        left = math.sin(k1 * beside) * math.sin(k2 * middle / 2) * k2
        return left - k1 * math.cos(k1 * beside) * math.cos(k2 * middle / 2)

    assert_allclose(m, brentq(condition, table - 0.3, table + 0.3, xtol=1e-13), rtol=PROMISED)


@pytest.mark.parametrize("ratio", [1.02, 1.5, 3.0, 8.0])
def test_tapered_pinned_column(ratio):
    # I = I₀ (x/a)⁴ (Dinnik; Timoshenko and Gere): w = x sin(β/x + γ), β² = P a⁴/E I₀, so that with pinned
    # ends P = π² E √(I₀ I₁) / L²; derived anew.
    small = 0.03
    project = pressed([Part(LENGTH, round_bar(small, small * ratio))], {0: PINNED, 1: PINNED})
    moments = STEEL * math.pi / 64 * small**4
    expected = math.pi**2 * moments * ratio**2 / LENGTH**2
    assert_allclose(factor(project) * LOAD, expected, rtol=PROMISED)


# --- elastic lateral supports ---


@pytest.mark.parametrize("stiffness", [1e2, 2e4, 1e6, 1e12])
def test_cantilever_braced_by_a_spring_at_its_head(stiffness):
    # Timoshenko and Gere: tan kL = kL − (kL)³ E I / (k_s L³); derived anew.
    project = pressed(prismatic(LENGTH), {0: CLAMPED, 1: Lateral(translation=stiffness)})
    c = BENDING / (stiffness * LENGTH**3)
    root = brentq(
        lambda x: math.sin(x) - (x - x**3 * c) * math.cos(x), math.pi / 2 - 1e-9, 4.4934095, xtol=1e-14
    )
    assert_allclose(factor(project) * LOAD, root**2 * BENDING / LENGTH**2, rtol=PROMISED)


@pytest.mark.parametrize("stiffness", [1e2, 1e5, 1e9])
def test_cantilever_on_a_foot_that_turns(stiffness):
    # Textbook: kL tan kL = k_r L / E I.
    foot = Lateral(translation="fixed", rotation=stiffness)
    project = pressed(prismatic(LENGTH), {0: foot})
    c = stiffness * LENGTH / BENDING
    root = brentq(lambda x: x * math.sin(x) - c * math.cos(x), 0.0, math.pi / 2, xtol=1e-15)
    assert_allclose(factor(project) * LOAD, root**2 * BENDING / LENGTH**2, rtol=PROMISED)


@pytest.mark.parametrize("stiffness", [1e3, 4e4, 1e7])
def test_pinned_column_braced_in_its_middle(stiffness):
    # Timoshenko and Gere, derived anew: a stiff brace forces two half waves; with a soft one each half is
    # w = A sin kx − (R / 2P) x with w' = 0 at the brace and R = −k_s w there, which for v = kL/2 gives
    # 16 v³ cos v + k_s L³ / E I (sin v − v cos v) = 0.
    project = pressed(
        prismatic(LENGTH / 2, LENGTH / 2), {0: PINNED, 1: Lateral(translation=stiffness), 2: PINNED}
    )
    c = stiffness * LENGTH**3 / BENDING

    def symmetric(v):
        return c * (math.sin(v) - v * math.cos(v)) + 16 * v**3 * math.cos(v)

    found = brentq(symmetric, math.pi / 2 - 1e-12, 4.4934094, xtol=1e-14)  # to tan v = v
    root = min(2 * found, 2 * math.pi)
    assert_allclose(factor(project) * LOAD, root**2 * BENDING / LENGTH**2, rtol=PROMISED)
