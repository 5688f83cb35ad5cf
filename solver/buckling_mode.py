"""The shape in which a member buckles: a deflection without size, its largest value set to 1."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.polynomial import legendre

from solver.arrays import FloatArray, IntArray, frozen
from solver.beam_elements import slope_coefficients
from solver.beam_mesh import BeamMesh
from solver.extremes import SAME, end_values
from solver.roots import roots_inside, slope_of_legendre

_NOISE = 1e-12  # of the largest deflection: a slope up to this is rounding


@dataclass(frozen=True, slots=True)
class Mode:
    """e elements in chain order; the deflection is largest, and 1, at the fraction `peak` of a segment."""

    segment: IntArray  # (e,)
    start: FloatArray  # (e,) fractions of the segment
    end: FloatArray  # (e,)
    deflection: FloatArray  # (e, p + 1) Legendre coefficients on −1…1 of each element
    peak_segment: int
    peak: float

    def at(self, segment: IntArray, fraction: FloatArray) -> FloatArray:
        """(k,) the deflection at places: segments and fractions 0…1 of them."""
        found = np.searchsorted(self.segment + self.start, segment + fraction, side="right") - 1
        first = np.searchsorted(self.segment, segment, side="left")
        last = np.searchsorted(self.segment, segment, side="right") - 1
        element = np.clip(found, first, last)
        start, end = self.start[element], self.end[element]
        t = np.clip((2.0 * fraction - start - end) / (end - start), -1.0, 1.0)
        values = legendre.legvander(t, self.deflection.shape[-1] - 1)
        return np.asarray(np.sum(values * self.deflection[element], axis=-1))


def mode_of(mesh: BeamMesh, at_start: FloatArray, strains: FloatArray) -> Mode:
    """From the deflection at the start of each element and its strains."""
    slopes = strains @ slope_coefficients(strains.shape[1])
    deflection: FloatArray = np.asarray(legendre.legint(slopes, axis=1, lbnd=-1), dtype=np.float64)
    deflection[:, 0] += at_start
    element, place, value = _largest(deflection)
    start, end = mesh.start[element], mesh.end[element]
    return Mode(
        segment=mesh.segment,
        start=frozen(mesh.start),
        end=frozen(mesh.end),
        deflection=frozen(deflection / value),
        peak_segment=int(mesh.segment[element]),
        peak=float(start + place * (end - start)),
    )


def _largest(deflection: FloatArray) -> tuple[int, float, float]:
    """The element, the place 0…1 on it and the value of the largest deflection, the first of equals."""
    noise = np.full(len(deflection), _NOISE * float(np.abs(deflection).sum(axis=1).max()))
    roots = roots_inside(deflection @ slope_of_legendre(deflection.shape[1] - 1), noise)
    inside = np.sum(
        legendre.legvander(2.0 * roots.place - 1.0, deflection.shape[1] - 1) * deflection[roots.row], axis=-1
    )
    every = np.arange(len(deflection))
    row = np.concatenate([every, every, roots.row])
    place = np.concatenate([np.zeros(len(every)), np.ones(len(every)), roots.place])
    value = np.concatenate([*end_values(deflection), inside])
    alike = np.flatnonzero(np.abs(value) >= (1.0 - SAME) * np.abs(value).max())
    first = alike[np.argmin(row[alike] + place[alike])]
    return int(row[first]), float(place[first]), float(value[first])
