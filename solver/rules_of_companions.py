"""Rules of companions: between which joints they lie, of what they are made, and how long they must be.

A length that does not fit keeps the project from being solved, not from being opened: the member beside it is
still being changed. A mismatch that is wanted is a lack of fit.
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from decimal import Decimal

from solver.faults import Fault, Place, place_text
from solver.model import Companion, Project
from solver.readable import names, records, text

LENGTH_TOLERANCE = 1e-6  # of the distance that a companion spans


def companion_segments(project: Project) -> Iterator[tuple[Place, object]]:
    """Every segment of every companion that could be read, with its place in the file."""
    for index, companion in records(project.companions):
        for number, segment in records(getattr(companion, "segments", None)):
            yield ("companions", index, "segments", number), segment


def companion_faults(project: Project) -> Iterator[Fault]:
    """A companion has segments and lies between two joints of the member, the first before the second."""
    order = {mark: index for index, mark in enumerate(names(project.joints, "mark") or ())}
    for index, companion in records(project.companions):
        if getattr(companion, "segments", None) == ():
            yield Fault(place_text(("companions", index, "segments")), "no_companion_segments")
        start, end = text(companion, "start"), text(companion, "end")
        place = place_text(("companions", index, "to"))
        if start is not None and start == end:
            yield Fault(place, "same_joint", {"joint": end})
        elif start in order and end in order and order[start] > order[end]:
            yield Fault(place, "companion_order", {"from": start, "to": end})


def spanned(project: Project, companion: Companion) -> float:
    """The distance (m) between the joints of a companion of a well-formed project."""
    order = {joint.mark: index for index, joint in enumerate(project.joints)}
    between = project.segments[order[companion.start] : order[companion.end]]
    return math.fsum(segment.length for segment in between)


def length_faults(project: Project) -> Iterator[Fault]:
    """The lengths of a companion add up to the distance it spans."""
    for index, companion in enumerate(project.companions):
        span = spanned(project, companion)
        length = math.fsum(segment.length for segment in companion.segments)
        if abs(length - span) > LENGTH_TOLERANCE * span:
            kind = "too_long" if length > span else "too_short"
            facts: dict[str, object] = {"companion": companion.mark, "kind": kind}
            whole = Decimal(repr(float(span)))
            own = sum(Decimal(repr(float(segment.length))) for segment in companion.segments)
            facts |= {"length": float(own), "span": float(whole), "difference": float(abs(own - whole))}
            last = ("companions", index, "segments", len(companion.segments) - 1, "length")
            yield Fault(place_text(last), "companion_length", facts)
