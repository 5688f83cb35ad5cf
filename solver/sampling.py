"""Where curves are drawn through: both sides of every joint, the extremes, and an even filling between.

A place is a segment and a fraction 0…1 of it, so that the two sides of a joint are two places. The number of
places keeps to a budget: the ends are there, the extremes of every segment, and what is left is shared out by
length. Where ends and extremes alone take more than that, the most extreme of each of many even stretches are
kept, so that a drawing with no more columns of pixels than stretches still shows every extreme.

A window that is looked at closely gets as many places again for itself, and the extremes of its segments.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TypeAlias

import numpy as np

from solver.arrays import FloatArray, IntArray
from solver.results import Results, SegmentResults

Window: TypeAlias = tuple[float, float]  # from, to in m
FINENESS = 8  # stretches for each point of the budget: more than a screen or a sheet has columns of pixels
_CLOSE = 1e-9  # a place nearer than this part of the segment to the one before adds nothing to a curve


@dataclass(frozen=True, slots=True)
class Places:
    """Places in order along the member, all (k,)."""

    segment: IntArray
    fraction: FloatArray
    x: FloatArray


@dataclass(frozen=True, slots=True)
class Peaks:
    """An extreme quantity by state and segment (m, n): its size, the larger the more extreme, and its x."""

    size: FloatArray
    x: FloatArray


def peaks_of(segments: SegmentResults, *, bonded: bool) -> tuple[Peaks, ...]:
    """The extremes that a curve must pass through; bonded parts show in the utilisation alone."""
    used = np.nan_to_num(segments.utilisation, nan=-1.0), np.nan_to_num(segments.utilisation_at)
    return (
        *([Peaks(*used)] if bonded else []),
        Peaks(segments.displacement_max, segments.displacement_max_at),
        Peaks(-segments.displacement_min, segments.displacement_min_at),
        Peaks(segments.force_max, segments.force_max_at),
        Peaks(-segments.force_min, segments.force_min_at),
        Peaks(segments.stress_max, segments.stress_max_at),
        Peaks(-segments.stress_min, segments.stress_min_at),
    )


def places_for(
    results: Results,
    states: IntArray,
    points: int,
    near: Window | None = None,
    also: tuple[float, ...] = (),
) -> Places:
    """Places for curves of these states: about `points`, and more where ends and extremes take more.

    In the window `near` (from, to in m) there are about as many again; `also` are further places, m.
    """
    n = len(results.chain.length)
    found = peaks_of(results.segments, bonded=results.parts is not None)
    peaks = [Peaks(peak.size[states], peak.x[states]) for peak in found]
    extremes = _inside(results, [_governing(peak) for peak in peaks])
    room = points - 2 * n - len(extremes)
    if room < 0:
        extremes = _inside(
            results, [_of_stretches(peak, results.position, FINENESS * points) for peak in peaks]
        )
        room = max(points - 2 * n - len(extremes), points // 2 - 2 * n)
    filling = _filling(results.chain.length, room)
    closer = [] if near is None else [_closer(results, peaks, near, points)]
    further = [_at(results, np.array(also))] if also else []
    inside = [extremes, filling, *closer, *further]
    segment = np.concatenate([np.repeat(np.arange(n), 2), *(part.segment for part in inside)])
    fraction = np.concatenate([np.tile([0.0, 1.0], n), *(part.fraction for part in inside)])
    return _in_order(results, _Inside(segment, fraction))


@dataclass(frozen=True, slots=True)
class _Inside:
    """Places in no order."""

    segment: IntArray
    fraction: FloatArray

    def __len__(self) -> int:
        return len(self.segment)


def _governing(peak: Peaks) -> _Inside:
    """By segment, the place in the state where the quantity is most extreme; `fraction` is still x."""
    segment = np.arange(peak.size.shape[1])
    return _Inside(segment, peak.x[np.argmax(peak.size, axis=0), segment])


def _of_stretches(peak: Peaks, position: FloatArray, stretches: int) -> _Inside:
    """The most extreme of each of many even stretches of the member, so those of the whole member too."""
    found = _governing(peak)
    size = peak.size.max(axis=0)
    stretch = np.floor(found.fraction / position[-1] * stretches)  # `fraction` is still x
    order = np.lexsort((size, stretch))
    last = order[np.append(np.diff(stretch[order]) > 0, True)]
    return _Inside(found.segment[last], found.fraction[last])


def _closer(results: Results, peaks: list[Peaks], near: Window, points: int) -> _Inside:
    """Even places in a window, and the extremes there, of very many segments those of even stretches."""
    position = results.position
    low, high = np.clip(near, 0.0, position[-1])
    if high <= low:  # beyond the end of a shorter member
        return _Inside(np.zeros(0, dtype=np.intp), np.zeros(0))
    found = []
    for peak in peaks:
        whole = _governing(peak)
        shown = np.flatnonzero((whole.fraction >= low) & (whole.fraction <= high))  # still x
        if len(shown) > points:
            stretch = np.floor((whole.fraction[shown] - low) / (high - low) * points)
            order = np.lexsort((peak.size.max(axis=0)[shown], stretch))
            shown = shown[order[np.append(np.diff(stretch[order]) > 0, True)]]
        found.append(_Inside(whole.segment[shown], whole.fraction[shown]))
    x = np.linspace(low, high, points)
    return _inside(results, [*found, _Inside(_segments_at(position, x), x)])


def _at(results: Results, x: FloatArray) -> _Inside:
    """Places that are asked for."""
    return _inside(results, [_Inside(_segments_at(results.position, x), x)])


def _segments_at(position: FloatArray, x: FloatArray) -> IntArray:
    """In which segment each x lies."""
    return np.clip(np.searchsorted(position, x, side="right") - 1, 0, len(position) - 2)


def _inside(results: Results, found: list[_Inside]) -> _Inside:
    """The places that lie inside their segment, each once, x turned into the fraction."""
    segment = np.concatenate([f.segment for f in found])
    x = np.concatenate([f.fraction for f in found])
    fraction = (x - results.position[segment]) / results.chain.length[segment]
    inside = (fraction > _CLOSE) & (fraction < 1.0 - _CLOSE)
    once = np.unique(np.stack([segment[inside], fraction[inside]], axis=1), axis=0)
    return _Inside(once[:, 0].astype(np.intp), once[:, 1])


def _filling(length: FloatArray, points: int) -> _Inside:
    """Even places inside the segments, as many as the budget leaves, shared by length."""
    counts = np.floor(max(points, 0) * length / np.sum(length)).astype(np.intp)
    segment = np.repeat(np.arange(len(length)), counts)
    rank = np.arange(len(segment)) - np.repeat(np.cumsum(counts) - counts, counts)
    return _Inside(segment, (rank + 1.0) / (counts[segment] + 1.0))


def _in_order(results: Results, places: _Inside) -> Places:
    order = np.lexsort((places.fraction, places.segment))
    segment, fraction = places.segment[order], places.fraction[order]
    new = np.append(True, (np.diff(segment) > 0) | (np.diff(fraction) > _CLOSE))
    segment, fraction = segment[new], fraction[new]
    return Places(segment, fraction, x_of(results, segment, fraction))


def x_of(results: Results, segment: IntArray, fraction: FloatArray) -> FloatArray:
    """The positions x of places, exactly the joint's at a segment's ends."""
    end = results.position[segment + 1]
    inside = results.position[segment] + fraction * results.chain.length[segment]
    return np.where(fraction >= 1.0, end, np.minimum(inside, end))
