"""What runs linearly along a segment, cut and put together again: dimensions, bedding, loads, temperatures.

Arithmetic is done in exact fractions of the shortest decimals, rounded once: 0.35 less 0.1 is 0.25, not
0.24999999999999997, so that a split shows the numbers that a person would write.
"""

from __future__ import annotations

import math
from fractions import Fraction
from itertools import chain
from typing import Final, TypeVar

from msgspec import UNSET, Struct, UnsetType, structs

from solver.model import (
    AreaSection,
    RectangleSection,
    RoundSection,
    Segment,
    SegmentLoad,
    TubeSection,
)

_R = TypeVar("_R", bound=Struct)
_End = float | UnsetType
Ends = tuple[_End, _End]

PAIRS: Final[dict[type[Struct], tuple[tuple[str, str], ...]]] = {
    AreaSection: (("area", "area_end"), ("second_moment", "second_moment_end")),
    RoundSection: (("diameter", "diameter_end"),),
    TubeSection: (("outer", "outer_end"), ("inner", "inner_end")),
    RectangleSection: (("width", "width_end"), ("depth", "depth_end")),
    Segment: (("bedding", "bedding_end"),),
    SegmentLoad: (("load_start", "load_end"), ("temperature_start", "temperature_end")),
}


def exact(value: float) -> Fraction:
    """The shortest decimal that reads back to the double, as a fraction."""
    return Fraction(repr(float(value)))


def rounded(value: Fraction) -> float:
    """The nearest double; infinite beyond the doubles, for the check of the edit to refuse."""
    try:
        return float(value)
    except OverflowError:
        return math.copysign(math.inf, value)


def sum_of(first: float, second: float) -> float:
    """The decimal sum, rounded once."""
    return rounded(exact(first) + exact(second))


def parted(whole: float, part: float) -> tuple[float, float]:
    """The part and the rest, in decimals, such that `sum_of` makes the very same whole of them again.

    Where the digits are too many for that, the rest gives way in its last digit, and failing that the part.
    """
    rests = tuple(_around(_difference(whole, part)))
    as_asked = ((part, rest) for rest in rests)
    shifted = ((near, rest) for rest in rests for near in _around(_difference(whole, rest)))
    fitting = (pair for pair in chain(as_asked, shifted) if sum_of(*pair) == whole)
    return next(fitting, (part, rests[0]))


def _difference(whole: float, part: float) -> float:
    return rounded(exact(whole) - exact(part))


def _around(value: float) -> tuple[float, float, float]:
    """The value and the doubles next to it."""
    return value, math.nextafter(value, math.inf), math.nextafter(value, -math.inf)


def cut(record: _R, at: Fraction) -> tuple[_R, _R]:
    """The record's part up to `at` (0…1 of the segment) and its part from there on."""
    first: dict[str, _End] = {}
    second: dict[str, _End] = {}
    for start_key, end_key in PAIRS[type(record)]:
        start, end = getattr(record, start_key), getattr(record, end_key)
        if end is not UNSET:
            middle = rounded(exact(start) + (exact(end) - exact(start)) * at)
            first[end_key] = second[start_key] = middle
    return structs.replace(record, **first), structs.replace(record, **second)


def united(first: _R, second: _R) -> _R:
    """One record from the first's start to the second's end; the reverse of `cut`."""
    changes: dict[str, _End] = {}
    for start_key, end_key in PAIRS[type(first)]:
        start, end = _united(
            (getattr(first, start_key), getattr(first, end_key)),
            (getattr(second, start_key), getattr(second, end_key)),
        )
        changes |= {start_key: start, end_key: end}
    return structs.replace(first, **changes)


def _united(first: Ends, second: Ends) -> Ends:
    (start, start_end), (last, last_end) = first, second
    if isinstance(start, UnsetType) or isinstance(last, UnsetType):
        return UNSET, UNSET  # known on one part only is not known on the whole
    if last_end is UNSET and start_end is UNSET and start == last:
        return start, UNSET
    return start, float(last) if isinstance(last_end, UnsetType) else last_end


def turned(record: _R) -> _R:
    """The record seen from the segment's other end."""
    changes: dict[str, _End] = {}
    for start_key, end_key in PAIRS[type(record)]:
        end = getattr(record, end_key)
        if end is not UNSET:
            # plain float: an end that says 0 must be written, or it would follow the new start
            changes |= {start_key: end, end_key: float(getattr(record, start_key))}
    return structs.replace(record, **changes)
