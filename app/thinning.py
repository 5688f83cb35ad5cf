"""Fewer points for the same drawn curve: what a pixel cannot show is left out, and no extreme ever is.

Of the many points in one column of pixels the first, the last, the lowest and the highest are kept, so that
the column is inked from its lowest to its highest value; of points on a straight line only the ends are.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Final

import numpy as np

from solver.arrays import BoolArray, FloatArray, IntArray

MOST: Final = 4  # points of a column of pixels that are drawn as they are
STRAIGHT: Final = 0.03  # pixels across the axis that a point left out may lie off the line, in each pass
PASSES: Final = 6
FEW: Final = 700  # points that are painted as fast as they are thinned


@dataclass(frozen=True, slots=True)
class Chain:
    """Points by index (k,) along a curve; `joined` (k,) says of each whether a line leads to the next."""

    index: IntArray
    joined: BoolArray


def chain_of(chosen: BoolArray) -> Chain:
    """The chain of the chosen intervals (k − 1,) of k points."""
    used = np.zeros(len(chosen) + 1, dtype=np.bool_)
    used[:-1] |= chosen
    used[1:] |= chosen
    index = np.flatnonzero(used)
    joined = np.append(np.diff(index) == 1, False)
    inside = index[:-1][joined[:-1]]
    joined[:-1][joined[:-1]] = chosen[inside]
    return Chain(index, joined)


def thinned(chain: Chain, along: FloatArray, across: FloatArray) -> Chain:
    """The chain without what a pixel cannot show; `along` and `across` (n,) in pixels, `along` in order."""
    if len(chain.index) <= 2:
        return chain
    found = _by_columns(chain, along, across)
    for _ in range(PASSES if len(found.index) > FEW else 0):
        fewer = _without_straight(found, along[found.index], across[found.index])
        if 8 * len(fewer.index) > 7 * len(found.index):  # hardly any left to take out
            return fewer
        found = fewer
    return found


def _by_columns(chain: Chain, along: FloatArray, across: FloatArray) -> Chain:
    """First, last, lowest and highest of each column that holds more than a few points, all joined there."""
    column = np.floor(along[chain.index])
    starts = np.flatnonzero(np.append(True, np.diff(column) != 0))
    counts = np.diff(np.append(starts, len(column)))
    if counts.max() <= MOST:
        return chain
    crowded = np.repeat(counts > MOST, counts)
    order = np.lexsort((across[chain.index], np.repeat(np.arange(len(starts)), counts)))
    ends = starts + counts - 1
    kept = ~crowded
    kept[np.concatenate([starts, ends, order[starts], order[ends]])] = True
    last = np.zeros(len(column), dtype=np.bool_)
    last[ends] = True
    joined = chain.joined | (crowded & ~last)
    return Chain(chain.index[kept], joined[kept])


def _without_straight(chain: Chain, x: FloatArray, y: FloatArray) -> Chain:
    """Every second point left out where it lies on the line between its neighbours."""
    before_x, before_y = x[1:-1] - x[:-2], y[1:-1] - y[:-2]
    after_x, after_y = x[2:] - x[1:-1], y[2:] - y[1:-1]
    twice_area = np.abs(before_x * after_y - before_y * after_x)
    forward = before_x * after_x + before_y * after_y >= 0.0  # else it is the tip of a spike
    straight = twice_area <= STRAIGHT * np.abs(x[2:] - x[:-2])
    left_out = straight & forward & chain.joined[:-2] & chain.joined[1:-1]
    left_out[1:] &= ~_alternate(left_out)
    kept = np.concatenate([[True], ~left_out, [True]])
    return Chain(chain.index[kept], chain.joined[kept])


def _alternate(chosen: BoolArray) -> BoolArray:
    """Of neighbours that are chosen one after the other, whether the later one (k − 1,) has to stay."""
    rank = np.arange(len(chosen)) - np.maximum.accumulate(np.where(chosen, -1, np.arange(len(chosen))))
    odd: BoolArray = chosen[1:] & (rank[1:] % 2 == 0)
    return odd
