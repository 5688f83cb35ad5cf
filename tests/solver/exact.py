"""Members solved in 50 digits by closed forms and flexibility, for the tests of the bound.

An unbedded segment carries N₀ − ∫ q, whatever its taper, and stretches by ∫ N/EA + ε₀; an evenly bedded
prismatic one moves as sinh μ(L − x), sinh μx and a particular solution linear in x. The joints'
displacements follow from a dense solve. Nothing is shared with the solver but the arrays that state the
problem, whose doubles are taken as exact.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cache

import mpmath
import numpy as np
from mpmath import mp, mpf

from solver.chain import Chain, Loads
from solver.solution import Solution

DIGITS = 50
POINTS = 18  # Gauss–Legendre, exact to degree 35; the error of an element of degree 12 is of degree 13 and up


@dataclass
class Stretch:
    """One segment of the exact solution, as functions of its own x = 0…L."""

    length: mpf
    modulus: mpf
    area: list  # Bernstein
    bedding: mpf
    load: list  # q in powers of x
    strain: tuple  # ε₀ in powers of x
    breaks: list  # 0…L, where the quadrature is broken
    ends: tuple = (mpf(0), mpf(0))  # displacements
    flexibility: mpf = field(init=False)
    free: mpf = field(init=False)  # what it would stretch by with no force at its start

    def __post_init__(self):
        self.flexibility = self.integral(lambda x: 1 / self.rigidity(x))
        self.free = self.integral(lambda x: self.strain_at(x) - self.shed(x) / self.rigidity(x))
        self.mu = mp.sqrt(self.bedding / (self.modulus * self.area[0]))

    @property
    def points(self):
        """Gauss–Legendre points a piece: fewer where everything is a polynomial of degree 3."""
        even = self.area[0] == self.area[1] == self.area[2]
        return gauss(6 if even and not self.bedding else POINTS)

    def integral(self, function):
        total = mpf(0)
        for start, end in zip(self.breaks, self.breaks[1:], strict=False):
            half = (end - start) / 2
            total += half * sum(w * function(start + half * (1 + t)) for t, w in self.points)
        return total

    def rigidity(self, x):
        s = x / self.length
        first, middle, last = self.area
        return self.modulus * (first * (1 - s) ** 2 + 2 * middle * s * (1 - s) + last * s**2)

    def strain_at(self, x):
        return self.strain[0] + self.strain[1] * x

    def shed(self, x):
        """∫ q from the start to x: what the axial force has lost."""
        return sum(q * x ** (n + 1) / (n + 1) for n, q in enumerate(self.load))

    def force(self, x):
        if self.bedding:
            return self.rigidity(x) * (self._waves(x)[1] - self.strain_at(x))
        return (self.ends[1] - self.ends[0] - self.free) / self.flexibility - self.shed(x)

    def slope(self, x):
        return self._waves(x)[1] if self.bedding else self.force(x) / self.rigidity(x) + self.strain_at(x)

    def displacement(self, x):
        """Of bedded segments only: no norm here asks for the others'."""
        return self._waves(x)[0]

    def _waves(self, x):
        q0, q1 = self.load[:2]
        level = (q0 - self.rigidity(x) * self.strain[1]) / self.bedding
        tilt = q1 / self.bedding
        first, last = self.ends[0] - level, self.ends[1] - level - tilt * self.length
        there, here = mp.exp(self.mu * (self.length - x)), mp.exp(self.mu * x)
        scale = 2 * mp.sinh(self.mu * self.length)
        u = (first * (there - 1 / there) + last * (here - 1 / here)) / scale
        du = self.mu * (last * (here + 1 / here) - first * (there + 1 / there)) / scale
        return u + level + tilt * x, du + tilt


def exact_member(chain: Chain, loads: Loads, solution: Solution, state: int) -> list[Stretch]:
    """The exact solution in one state; the elements of `solution` say where quadrature is broken."""
    found = []
    for i in range(chain.length.size):
        ends = solution.end[solution.segment == i]
        breaks = [mpf(0), *(mpf(float(end)) * mpf(float(chain.length[i])) for end in ends)]
        found.append(_stretch(chain, loads, state, i, breaks))
    displacement = _joint_displacements(chain, loads, state, found)
    for i, one in enumerate(found):
        one.ends = (displacement[i], displacement[i + 1])
    return found


def _mpf(values):
    return [mpf(float(value)) for value in values]


def _stretch(chain: Chain, loads: Loads, state: int, i: int, breaks: list) -> Stretch:
    length, area = mpf(float(chain.length[i])), _mpf(chain.area[i])
    weight = mpf(float(loads.gravity[state])) * mpf(float(chain.density[i]))
    q0, q1 = _mpf(loads.distributed[state, i])
    t0, t1 = _mpf(loads.temperature[state, i])
    alpha = mpf(float(chain.expansion[i]))
    first, middle, last = area
    powers = [first, 2 * (middle - first) / length, (first - 2 * middle + last) / length**2]
    return Stretch(
        length=length,
        modulus=mpf(float(chain.modulus[i])),
        area=area,
        bedding=mpf(float(chain.bedding[i, 0])),
        load=[q0 + weight * powers[0], (q1 - q0) / length + weight * powers[1], weight * powers[2]],
        strain=(alpha * t0 + mpf(float(loads.lack_of_fit[state, i])) / length, alpha * (t1 - t0) / length),
        breaks=breaks,
    )


def _joint_displacements(chain: Chain, loads: Loads, state: int, found: list[Stretch]):
    """End forces are affine in the end displacements: probe each segment with none and with unit ones."""
    count = len(found) + 1
    matrix, right = mpmath.matrix(count, count), mpmath.matrix(count, 1)
    spring, movement = _mpf(chain.spring), _mpf(loads.movement[state])
    for j, force in enumerate(_mpf(loads.joint_force[state])):
        matrix[j, j] += spring[j]
        right[j] += force + spring[j] * movement[j]
    for i, one in enumerate(found):
        still = _end_forces(one, (mpf(0), mpf(0)))
        for column, ends in ((i, (mpf(1), mpf(0))), (i + 1, (mpf(0), mpf(1)))):
            first, last = _end_forces(one, ends)
            matrix[i, column] -= first - still[0]
            matrix[i + 1, column] += last - still[1]
        right[i] += still[0]
        right[i + 1] -= still[1]
    for j in np.flatnonzero(chain.fixed).tolist():
        for column in range(count):
            matrix[j, column] = mpf(int(column == j))
        right[j] = movement[j]
    return mp.lu_solve(matrix, right)


def _end_forces(one: Stretch, ends):
    one.ends = ends
    return one.force(mpf(0)), one.force(one.length)


@dataclass
class Errors:
    """What the exact solution says about a computed one."""

    energy: float  # √(∫ EA e'² + ∫ k e² + Σ k_s e²)
    size: float  # the D that makes the bound relative, computed anew from the exact fields
    force_by_segment: np.ndarray  # (n,) largest |N − y| found in each segment


def errors(chain: Chain, loads: Loads, solution: Solution, state: int) -> Errors:
    """The errors of `solution` in one state; call within `mp.workdps(DIGITS)`."""
    exact = exact_member(chain, loads, solution, state)
    energy = size = floor = mpf(0)
    largest = np.zeros(len(exact))
    for e, i in enumerate(solution.segment):
        one, half = exact[i], _half_length(exact[i], solution, e)
        u, y = _trimmed(solution.displacement[state, e]), _trimmed(solution.force[state, e])
        for t, w in ((mpf(-1), mpf(0)), *one.points, (mpf(1), mpf(0))):
            x = one.length * mpf(float(solution.start[e])) + half * (1 + t)
            rigidity, weight, slope, (value, rate) = one.rigidity(x), w * half, one.slope(x), legendre(u, t)
            energy += weight * rigidity * (slope - rate / half) ** 2
            size += weight * rigidity * (slope**2 + one.strain_at(x) ** 2)
            floor += weight * rigidity / (2 * half) ** 2
            if one.bedding:
                moved = one.displacement(x)
                energy += weight * one.bedding * (moved - value) ** 2
                size += weight * one.bedding * moved**2
            largest[i] = max(largest[i], float(abs(one.force(x) - legendre(y, t)[0])))
    joints = [one.ends[0] for one in exact] + [exact[-1].ends[1]]
    for j, moved in enumerate(joints):
        spring = mpf(float(chain.spring[j]))
        energy += spring * (moved - mpf(float(solution.joint_displacement[state, j]))) ** 2
        size += spring * moved**2
    size += mpf("1e-10") * max(abs(u) for u in joints) ** 2 * floor
    return Errors(float(mp.sqrt(energy)), float(mp.sqrt(size)), largest)


def _half_length(one: Stretch, solution: Solution, e: int):
    return one.length * (mpf(float(solution.end[e])) - mpf(float(solution.start[e]))) / 2


def _trimmed(coefficients):
    used = np.flatnonzero(coefficients)
    return _mpf(coefficients[: used[-1] + 1 if used.size else 1])


@cache
def gauss(points: int) -> tuple:
    """Points and weights to DIGITS, by Newton's method from numpy's doubles."""
    found, series = [], [mpf(0)] * points + [mpf(1)]
    for t in np.polynomial.legendre.leggauss(points)[0]:
        x = mpf(float(t))
        for _ in range(4):
            value, slope = legendre(series, x)
            x -= value / slope
        found.append((x, 2 / ((1 - x**2) * legendre(series, x)[1] ** 2)))
    return tuple(found)


def legendre(coefficients, t):
    """Value and slope of a Legendre series, by the recurrences of P_n and of its derivative."""
    before, now, slope_before, slope = mpf(1), t, mpf(0), mpf(1)
    value, rate = coefficients[0], mpf(0)
    for n, c in enumerate(coefficients[1:], start=1):
        value += c * now
        rate += c * slope
        before, now = now, ((2 * n + 1) * t * now - n * before) / (n + 1)
        slope_before, slope = slope, slope_before + (2 * n + 1) * before
    return value, rate
