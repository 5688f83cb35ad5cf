"""Elements reduced to their ends, and their fields found again from the ends' displacements.

An element passes on to the joints only how its two end forces follow from the mean and the stretch of its
end displacements (`Condensed`); its bubbles are eliminated here. With y the equilibrated force:

    y(end) − y(start)     = mean_mean · mean + mean_stretch · stretch − load_mean
    (y(end) + y(start))/2 = mean_stretch · mean + stretch_stretch · stretch − load_stretch

Prismatic unbedded elements have diagonal bubbles, so their fields are written down in closed form; all
others of one degree are solved together as one stack of small matrices.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Protocol

import numpy as np

from solver.arrays import FloatArray, IntArray
from solver.elements import reference
from solver.mesh import Block


@dataclass(frozen=True, slots=True)
class Condensed:
    """What the joints see of b elements in m states."""

    mean_mean: FloatArray  # (b,) N/m
    mean_stretch: FloatArray  # (b,) N/m
    stretch_stretch: FloatArray  # (b,) N/m
    load_mean: FloatArray  # (m, b) N
    load_stretch: FloatArray  # (m, b) N

    def of(self, states: slice | IntArray) -> Condensed:
        """The same elements in some of the states."""
        return replace(self, load_mean=self.load_mean[states], load_stretch=self.load_stretch[states])


@dataclass(frozen=True, slots=True)
class Fields:
    """The fields of b elements in m states, and the integrals that the bound and the energies need.

    Those named for a sum are already summed over the elements.
    """

    displacement: FloatArray  # (m, b, p + 1) Legendre
    force: FloatArray  # (m, b, q + 1) Legendre
    start_force: FloatArray  # (m, b) y at the start
    end_force: FloatArray  # (m, b) y at the end
    error: FloatArray | None  # (m, b) η²; None where it is 0
    flexibility: FloatArray  # (b,) ∫ dx/EA
    stretching: FloatArray  # () Σ ∫ EA dx / L²
    norm: FloatArray  # (m,) Σ ∫ EA u'² + ∫ k u²
    strain_norm: FloatArray  # (m,) Σ ∫ EA ε₀²
    force_norm: FloatArray  # (m,) Σ ∫ y²/EA
    strain_energy: FloatArray  # (m,) Σ ½ ∫ EA (u' − ε₀)² + ½ ∫ k u²
    work: FloatArray  # (m,) Σ ∫ q u
    load: FloatArray  # (m,) Σ ∫ q
    bedding_force: FloatArray  # (m,) Σ −∫ k u


class Condensation(Protocol):
    """Elements of one kind: condensed once, asked for their fields when the joints are known."""

    @property
    def condensed(self) -> Condensed:
        """What the joints see."""

    def fields(self, mean: FloatArray, stretch: FloatArray) -> Fields:
        """The fields that belong to mean and stretch (m, b) of the end displacements."""


class ClosedForm:
    """Prismatic unbedded elements under linear load and strain: u of degree 3, y of degree 2, both exact."""

    def __init__(self, block: Block) -> None:
        self._block = block
        self._rigidity = block.stiffness[:, 1]

    @property
    def condensed(self) -> Condensed:
        """See Condensation; made anew, for it is needed once and there may be many elements."""
        length, load = self._block.length, self._block.load
        none = np.zeros_like(length)
        return Condensed(
            mean_mean=none,
            mean_stretch=none,
            stretch_stretch=self._rigidity / length,
            load_mean=length * load[0],
            load_stretch=self._rigidity * self._block.strain[0] + (length / 6) * load[1],
        )

    def fields(self, mean: FloatArray, stretch: FloatArray) -> Fields:
        """See Condensation."""
        length, rigidity = self._block.length, self._rigidity
        strain, load = self._block.strain, self._block.load
        flexibility = length / rigidity
        half = length / 2
        y = np.empty((*mean.shape, 3))
        y0 = (rigidity / length) * stretch - rigidity * strain[0]
        y1 = -half * load[0]
        y2 = (-half / 3) * load[1]
        y[..., 0], y[..., 1], y[..., 2] = y0, y1, y2
        slope1 = y1 * (flexibility / 2) + half * strain[1]  # du/dt in Legendre coefficients
        slope2 = y2 * (flexibility / 2)
        u = np.empty((*mean.shape, 4))
        u2, u3 = slope1 / 3, slope2 / 5
        u1 = stretch / 2 - u3
        u0 = mean - u2
        u[..., 0], u[..., 1], u[..., 2], u[..., 3] = u0, u1, u2, u3
        stiffness = 4 / flexibility
        squares = y0 * y0 + y1 * y1 / 3 + y2 * y2 / 5
        force_norm = squares @ flexibility
        return Fields(
            displacement=u,
            force=y,
            start_force=y0 - y1 + y2,
            end_force=y0 + y1 + y2,
            error=None,
            flexibility=flexibility,
            stretching=(rigidity / length).sum(),
            norm=(stretch * stretch / 4 + slope1 * slope1 / 3 + slope2 * slope2 / 5) @ stiffness,
            strain_norm=(strain[0] * strain[0] + strain[1] * strain[1] / 3) @ (rigidity * length),
            force_norm=force_norm,
            strain_energy=force_norm / 2,
            work=(load[0] * u0 + load[1] * u1 / 3) @ length,
            load=load[0] @ length,
            bedding_force=np.zeros(mean.shape[0]),
        )


class Stacked:
    """Tapered or bedded elements of one degree p, condensed as a stack of small matrices."""

    def __init__(self, block: Block, degree: int) -> None:
        self._block = block
        self._ref = reference(degree)
        self._bedded = bool(block.bedding.any())
        matrix, load = self._matrix(degree), self._modal_load()
        couplings = matrix[:, :2, 2:]  # of mean and stretch with the bubbles
        right = np.concatenate((couplings, load[:, :, 2:].transpose(1, 0, 2)), axis=1).transpose(0, 2, 1)
        self._bubbles = np.linalg.solve(matrix[:, 2:, 2:], right)  # (b, p − 1, 2 + m)
        eliminated = couplings @ self._bubbles  # (b, 2, 2 + m)
        self.condensed = Condensed(
            mean_mean=matrix[:, 0, 0] - eliminated[:, 0, 0],
            mean_stretch=matrix[:, 0, 1] - eliminated[:, 0, 1],
            stretch_stretch=matrix[:, 1, 1] - eliminated[:, 1, 1],
            load_mean=load[:, :, 0] - eliminated[:, 0, 2:].T,
            load_stretch=load[:, :, 1] - eliminated[:, 1, 2:].T,
        )

    def _matrix(self, degree: int) -> FloatArray:
        """(b, p + 1, p + 1) stiffness over the modes."""
        block, ref = self._block, self._ref
        elastic = ((2 / block.length)[:, None] * block.stiffness) @ ref.stiffness
        if self._bedded:
            matrix = ((block.length / 2)[:, None] * block.bedding) @ ref.bedding
            matrix = matrix.reshape(-1, degree + 1, degree + 1)
        else:
            matrix = np.zeros((block.length.size, degree + 1, degree + 1))
        matrix[:, 1:, 1:] += elastic.reshape(-1, degree, degree)
        return matrix

    def _modal_load(self) -> FloatArray:
        """(m, b, p + 1) loads and stress-free strains over the modes."""
        block, ref = self._block, self._ref
        applied = (block.length / 2)[:, None] * (block.load.transpose(1, 2, 0) @ ref.load)
        forces = block.stiffness[:, :, None] * block.strain.transpose(1, 2, 0)[:, :, None, :]
        if block.constraint is not None:
            rise = block.constraint.temperature.transpose(1, 2, 0)
            forces += block.constraint.excess[:, :, None] * rise[:, :, None, :]
        applied[:, :, 1:] += forces.reshape(*forces.shape[:2], 6) @ ref.strain
        return np.asarray(applied)

    def fields(self, mean: FloatArray, stretch: FloatArray) -> Fields:
        """See Condensation."""
        bubbles = self._bubbles
        modes = np.empty((*mean.shape, bubbles.shape[1] + 2))
        modes[..., 0], modes[..., 1] = mean, stretch
        modes[..., 2:] = bubbles[:, :, 2:].transpose(2, 0, 1)
        modes[..., 2:] -= stretch[..., None] * bubbles[:, :, 1]
        if self._bedded:
            modes[..., 2:] -= mean[..., None] * bubbles[:, :, 0]
        u = modes @ self._ref.legendre
        y = self._force(u, mean, stretch)
        return self._with_integrals(u, y)

    def _force(self, u: FloatArray, mean: FloatArray, stretch: FloatArray) -> FloatArray:
        block, ref, ends = self._block, self._ref, self.condensed
        q = block.load.transpose(1, 2, 0)
        y = -(q @ ref.force_of_load)
        if self._bedded:
            k = block.bedding
            y += (k[:, :1] * u) @ ref.force_of_mean_bedding + (k[:, 1:] * u) @ ref.force_of_bedding_slope
        y *= (block.length / 2)[:, None]
        half_sum = ends.mean_stretch * mean + ends.stretch_stretch * stretch - ends.load_stretch
        y[..., 0] = half_sum - y[..., 2::2].sum(axis=-1)
        return np.asarray(y)

    def _with_integrals(self, u: FloatArray, y: FloatArray) -> Fields:
        block, ref = self._block, self._ref
        half = block.length / 2
        rigidity = block.stiffness @ ref.bernstein  # (b, g) EA at the points
        weights = half[:, None] * ref.weights
        elastic, inverse = weights * rigidity, weights / rigidity
        slope = (u @ ref.slope) / half[:, None]
        strain = self._strain(rigidity)
        force = y @ ref.force
        elongation = slope - strain
        leftover = force - rigidity * elongation
        bed = self._bed(u, weights)
        odd, even = y[..., 1::2].sum(axis=-1), y[..., ::2].sum(axis=-1)
        k0, k1 = block.bedding[:, 0] * block.length, block.bedding[:, 1] * (block.length / 3)
        q = block.load
        work = q[0] * u[..., 0] + q[1] * u[..., 1] / 3 + q[2] * u[..., 2] / 5
        return Fields(
            displacement=u,
            force=y,
            start_force=even - odd,
            end_force=even + odd,
            error=(leftover * leftover * inverse).sum(axis=-1),
            flexibility=inverse.sum(axis=-1),
            stretching=(elastic.sum(axis=-1) / (block.length * block.length)).sum(),
            norm=_integral(slope, elastic) + bed,
            strain_norm=_integral(strain, elastic),
            force_norm=_integral(force, inverse),
            strain_energy=(_integral(elongation, elastic) + bed) / 2,
            work=work @ block.length,
            load=q[0] @ block.length,
            bedding_force=-(u[..., 0] @ k0 + u[..., 1] @ k1),
        )

    def _strain(self, rigidity: FloatArray) -> FloatArray:
        """(m, b, g) ε₀ at the points; of bonded parts, the mean that their stiffnesses weigh."""
        block, ref = self._block, self._ref
        strain = block.strain.transpose(1, 2, 0) @ ref.value[:2]
        if block.constraint is not None:
            rise = block.constraint.temperature.transpose(1, 2, 0) @ ref.value[:2]
            strain += rise * ((block.constraint.excess @ ref.bernstein) / rigidity)
        return np.asarray(strain)

    def _bed(self, u: FloatArray, weights: FloatArray) -> FloatArray:
        """(m,) Σ ∫ k u²."""
        if not self._bedded:
            return np.zeros(u.shape[0])
        bedding = self._block.bedding @ self._ref.value[:2]
        return _integral(u @ self._ref.value, weights * bedding)


def _integral(values: FloatArray, weights: FloatArray) -> FloatArray:
    """(m,) the weighted squares of values (m, b, g) summed over elements and points."""
    squares = (values * values).reshape(values.shape[0], -1)
    return np.asarray(squares @ weights.ravel())
