"""The first of a row of values that passes, asking as seldom as may be.

Passing need not be monotone: a larger section draws more force. So the row is looked through in growing
strides for one that passes; between it and the last one that did not, the row is halved. What comes out
passes, and its neighbour before it does not. Where no stride lands on one that passes there is no answer.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator


def first_passing(count: int, passes: Callable[[int], bool]) -> int | None:
    """The index below `count` found to pass; the last True asked for is of it."""
    failed = -1
    for index in strides(count):
        if passes(index):
            return _halved(failed, index, passes)
        failed = index
    return None


def strides(count: int) -> Iterator[int]:
    """0, 2, 5, 9 … and the last."""
    index = 0
    while index < count - 1:
        yield index
        index += 2 + index // 2
    if count:
        yield count - 1


def _halved(failed: int, passed: int, passes: Callable[[int], bool]) -> int:
    while passed - failed > 1:
        middle = (failed + passed) // 2
        if passes(middle):
            passed = middle
        else:
            failed = middle
    return passed
