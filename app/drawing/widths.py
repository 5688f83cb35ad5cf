"""How wide each segment is on the sheet: in proportion to its length, but never too narrow to see and to hit.

A short segment gets a least width and the others, which stay in proportion to each other, yield the room.
The sheet coordinate is measured in metres of those others; where all are wide enough it is the position.
"""

from __future__ import annotations

from collections.abc import Sequence
from functools import lru_cache
from itertools import accumulate, pairwise

LEAST = 14.0  # px, of a segment where the whole member is shown
LARGEST_SHARE = 0.4  # of the member's drawn length, that least widths may take together
TRUE = 1e-9  # a width this near to the length is to scale


def sheet_of(joints: Sequence[float], pixels: float) -> tuple[float, ...]:
    """Sheet coordinates of the joints, where the member is drawn on so many pixels; 0 stays 0."""
    lengths = [last - first for first, last in pairwise(joints)]
    least = _least_width(lengths, pixels)
    if not lengths or least <= min(lengths):
        return tuple(joints)
    return tuple(accumulate((max(length, least) for length in lengths), initial=joints[0]))


@lru_cache(8)  # asked for several times while a drawing is laid out
def widened(joints: tuple[float, ...], sheet: tuple[float, ...]) -> tuple[int, ...]:
    """The segments that are drawn wider than in proportion to their length."""
    if joints is sheet:
        return ()
    spans = zip(pairwise(joints), pairwise(sheet), strict=True)
    return tuple(i for i, ((a, b), (s, t)) in enumerate(spans) if t - s > (b - a) * (1.0 + TRUE))


def _least_width(lengths: Sequence[float], pixels: float) -> float:
    """The least width in metres of the segments that are to scale.

    With the share q of all pixels for each least width, the k shortest take k·q and the rest of the length
    has 1 − k·q, so that the width is q·rest / (1 − k·q). The shortest are taken until the next one is wider.
    """
    if not lengths:
        return 0.0
    share = min(LEAST / pixels, LARGEST_SHARE / len(lengths)) if pixels > 0.0 else 0.0
    rest, least = sum(lengths), 0.0
    for count, length in enumerate(sorted(lengths)):
        least = share * rest / (1.0 - count * share)
        if length >= least:
            break
        rest -= length
    return least
