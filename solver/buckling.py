"""The elastic critical factor of a member: the smallest factor on all loads at which it can bend away.

The pencil (K − λ G) φ = 0 has K from the bending stiffness E I(x) and the lateral supports, and G from the
equilibrated axial force N(x) of the state, −N(x) at every point of the quadrature, so that compression drives
and tension holds back. Degrees are raised, then elements halved, until the factor no longer changes; since
each space holds the one before, every factor lies above the exact one and they go down to it.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from contextlib import suppress
from dataclasses import dataclass

import numpy as np

from solver.arrays import BoolArray, FloatArray
from solver.banded_eigen import NoFactor, largest, near
from solver.beam_elements import banded, raised, reference, step, strain_matrix, strains_of
from solver.beam_mesh import BeamMesh, Column, first_mesh, halved
from solver.buckling_mode import Mode, mode_of
from solver.errors import Cancelled
from solver.solution import Solution

SETTLED = 1e-7  # a change of the factor up to this part from one space to the next ends the refinement
DEGREES = (5, 7, 9, 11)
HALVINGS = 12
GROWTH, MOST_MORE = 4, 1000  # elements at most: so many times the first, and so many more
_IDLE = 1e-10  # an element whose last bubbles hold no more than this part of the energy is fine enough


@dataclass(frozen=True, slots=True)
class Buckled:
    """The factor, settled, and the shape that goes with it."""

    factor: float
    mode: Mode


def critical_factors(
    column: Column, solution: Solution, states: Sequence[int], cancelled: Callable[[], bool]
) -> dict[int, Buckled | None]:
    """The factor of each of the states, all of which compress the member; None where it does not settle.

    The lateral supports must hold the member as a rigid body.
    """
    found: dict[int, Buckled | None] = dict.fromkeys(states)
    with suppress(NoFactor):  # those that settled before are good
        found.update(_settled(column, solution, list(states), cancelled))
    return found


def _settled(
    column: Column, solution: Solution, pending: list[int], cancelled: Callable[[], bool]
) -> Iterator[tuple[int, Buckled]]:
    """The states as they settle."""
    before: dict[int, Shape | None] = dict.fromkeys(pending)
    mesh, degrees = first_mesh(column, solution), iter(DEGREES)
    degree, most = next(degrees), GROWTH * len(mesh.segment) + MOST_MORE
    for _ in range(len(DEGREES) + HALVINGS):
        space = Space(column, solution, mesh, degree)
        coarse = np.zeros(len(mesh.segment), dtype=np.bool_)
        for state in tuple(pending):
            if cancelled():
                raise Cancelled
            shape = space.lowest(state, before[state])
            if shape is not None and _has_settled(before[state], shape):
                pending.remove(state)
                yield state, Buckled(space.in_units(shape.factor, state), space.mode(shape))
            else:
                before[state] = shape
                coarse |= space.coarse(shape)
        finer = next(degrees, None)
        if not pending or (finer is None and len(mesh.segment) > most):
            return
        mesh, degree = (halved(mesh, coarse), degree) if finer is None else (mesh, finer)


def _has_settled(before: Shape | None, shape: Shape) -> bool:
    """Whether the factor is the same in two spaces."""
    return before is not None and abs(shape.factor - before.factor) <= SETTLED * shape.factor


@dataclass(frozen=True, slots=True)
class Shape:
    """An eigenvalue without units, all unknowns (N,) and the strains of the elements (e, p)."""

    factor: float
    unknowns: FloatArray
    strains: FloatArray


class Space:
    """One mesh and degree; lengths in units of the member's, stiffnesses of the largest, forces of N's."""

    def __init__(self, column: Column, solution: Solution, mesh: BeamMesh, degree: int) -> None:
        self._mesh, self._degree = mesh, degree
        self._reference = reference(degree, solution.force.shape[-1] - 1)
        self._whole = float(column.length.sum())
        self._length = mesh.length(column) / self._whole
        self._largest = float(column.rigidity.max())
        bending = mesh.rigidity(column, self._reference.points) / self._largest
        self._force = solution.force
        self._supports(column)
        self._matrix = strain_matrix(self._length, degree)
        stretched = (2.0 / self._length) ** 3
        self._energy = self._quadrature(bending, self._reference.curvature) * stretched[:, None, None]
        self._stiffness = self._held(banded(self._of_unknowns(self._energy), degree), 1.0)
        self._stiffness[0, self._sprung] += self._spring

    def _supports(self, column: Column) -> None:
        """Springs and what is held, of all unknowns."""
        first = step(self._degree) * self._mesh.joints()
        of_joints = np.stack([first, first + 1]).ravel()
        scale = np.array([[self._whole**3], [self._whole]]) / self._largest
        springs = (np.stack([column.translation, column.rotation]) * scale).ravel()
        self._fixed = of_joints[np.isinf(springs)]
        sprung = np.isfinite(springs) & (springs > 0.0)
        self._sprung, self._spring = of_joints[sprung], springs[sprung]

    def _quadrature(self, values: FloatArray, of_strains: FloatArray) -> FloatArray:
        """(e, p, p): ∫ values · (strain i)(strain j) dt of each element, values (e, g)."""
        p = len(of_strains)
        products = (of_strains[:, None] * of_strains[None] * self._reference.weights).reshape(p * p, -1)
        return (values @ products.T).reshape(-1, p, p)

    def _of_unknowns(self, of_strains: FloatArray) -> FloatArray:
        return np.asarray(self._matrix.transpose(0, 2, 1) @ of_strains @ self._matrix)

    def _held(self, band: FloatArray, diagonal: float) -> FloatArray:
        """The band without what the supports hold."""
        band[:, self._fixed] = 0.0
        for below in range(1, len(band)):
            band[below, self._fixed[self._fixed >= below] - below] = 0.0
        band[0, self._fixed] = diagonal
        return band

    def _driving(self, state: int) -> FloatArray:
        """(e, p, p): ∫ −N (dw)² of the state's own force, in units of its largest."""
        force = self._mesh.force(self._force[state], self._reference.points)
        scaled = -force / np.abs(self._force[state]).sum(axis=-1).max()
        return self._quadrature(scaled, self._reference.slope) * (2.0 / self._length)[:, None, None]

    def _near(
        self, pencil: tuple[FloatArray, FloatArray], coarser: Shape | None
    ) -> tuple[float, FloatArray] | None:
        """From what the coarser space has found, where it has and its elements are the same."""
        if coarser is None or len(coarser.strains) != len(self._length):
            return None
        degree = coarser.strains.shape[1]
        return near(*pencil, coarser.factor, raised(coarser.unknowns, degree, self._degree))

    def _pencil(self, driving: FloatArray) -> tuple[FloatArray, FloatArray]:
        return self._stiffness, self._held(banded(self._of_unknowns(driving), self._degree), 0.0)

    def pencil(self, state: int) -> tuple[FloatArray, FloatArray]:
        """The lower bands of K and G of a state."""
        return self._pencil(self._driving(state))

    def in_units(self, factor: float, state: int) -> float:
        """The factor on the loads."""
        unit = self._largest / self._whole**2
        return float(factor * unit / np.abs(self._force[state]).sum(axis=-1).max())

    def lowest(self, state: int, coarser: Shape | None = None) -> Shape | None:
        """The lowest shape; None where this space has none that compression drives.

        One on the same elements in a lower degree is where to begin from.
        """
        driving = self._driving(state)
        pencil = self._pencil(driving)
        found = self._near(pencil, coarser)
        value, unknowns = largest(*pencil) if found is None else found
        if not value > 0.0:
            return None
        unknowns[self._fixed] = 0.0
        strains = strains_of(unknowns, self._length, self._degree)
        work = float(np.sum(_quadratic(driving, strains)))
        stored = float(np.sum(_quadratic(self._energy, strains)) + self._spring @ unknowns[self._sprung] ** 2)
        return Shape(stored / work, unknowns, strains) if work > 0.0 else None

    def coarse(self, shape: Shape | None) -> BoolArray:
        """(e,) the elements to halve: those whose last bubbles still matter, or else all."""
        every = np.ones(len(self._length), dtype=np.bool_)
        if shape is None:
            return every
        last = np.where(np.arange(self._degree) < self._degree - 2, 0.0, shape.strains)
        share = _quadratic(self._energy, last) / np.sum(_quadratic(self._energy, shape.strains))
        marked = share > _IDLE
        return marked if marked.any() else every

    def mode(self, shape: Shape) -> Mode:
        """The shape on the member."""
        deflection = shape.unknowns[0 :: step(self._degree)][:-1]
        return mode_of(self._mesh, deflection, shape.strains)


def _quadratic(matrices: FloatArray, strains: FloatArray) -> FloatArray:
    """(e,) each element's own quadratic form."""
    return np.asarray(np.einsum("ei,eij,ej->e", strains, matrices, strains))
