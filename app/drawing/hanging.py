"""Where the supports of a joint are drawn: one on the axis beyond an end of the member, the others under
their joint, on levels of their own where they would overlap.
"""

from __future__ import annotations

from dataclasses import dataclass

from solver.model import AnySupport, FixedSupport, Project, SpringSupport, StopSupport, supports_of

BOTH_SIDES = frozenset((-1, 1))


@dataclass(frozen=True, slots=True)
class Drawn:
    """A support with its place: its number among those of its joint, and the level it hangs on.

    `end` is −1 before the member's start, 1 behind its end, 0 where it hangs.
    """

    joint: int
    number: int
    support: AnySupport
    end: int = 0
    level: int = 0

    @property
    def hangs(self) -> bool:
        """Whether it is drawn under its joint."""
        return self.end == 0


def side_of(stop: StopSupport) -> int:
    """+1 for a stop on the plus side, −1 on the other."""
    return 1 if stop.side == "plus" else -1


def drawn_supports(project: Project) -> tuple[Drawn, ...]:
    """All supports of all joints, along the chain."""
    last = len(project.joints) - 1
    found: list[Drawn] = []
    for index, joint in enumerate(project.joints):
        supports = supports_of(joint)
        if supports:
            end = -1 if index == 0 else 1 if index == last else 0
            found += _at(index, supports, end)
    return tuple(found)


def _at(joint: int, supports: tuple[AnySupport, ...], end: int) -> list[Drawn]:
    on_axis = _on_axis(supports, end) if end else -1
    taken: list[set[int]] = []  # the sides of every level
    found = []
    for number, support in enumerate(supports):
        if number == on_axis:
            found.append(Drawn(joint, number, support, end))
        else:
            found.append(Drawn(joint, number, support, level=_level(_sides(support), taken)))
    return found


def _on_axis(supports: tuple[AnySupport, ...], end: int) -> int:
    """The first wall or spring, else the first stop that the end can move against; −1 for none."""
    holding = (n for n, support in enumerate(supports) if not isinstance(support, StopSupport))
    outward = (n for n, s in enumerate(supports) if isinstance(s, StopSupport) and side_of(s) == end)
    return next(holding, next(outward, -1))


def _sides(support: AnySupport) -> frozenset[int]:
    """The sides of its joint, along the member, on which a hanging support lies."""
    if isinstance(support, FixedSupport):
        return BOTH_SIDES
    return frozenset((-1 if isinstance(support, SpringSupport) else side_of(support),))


def _level(sides: frozenset[int], taken: list[set[int]]) -> int:
    """The first level where these sides are free, which they then take."""
    level = next((n for n, there in enumerate(taken) if not sides & there), len(taken))
    if level == len(taken):
        taken.append(set())
    taken[level] |= sides
    return level
