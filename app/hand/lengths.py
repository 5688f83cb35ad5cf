"""Joints in the hand. Two ways: what lies beyond moves along, or the total stays and the next segment gives.

The first joint stands where x is 0; its place is no number of the project, so it cannot be pulled.
"""

from __future__ import annotations

from collections.abc import Callable

from msgspec.structs import replace

from app import edits
from app.drawing.ruler import Ruler
from app.edits.linear import parted, sum_of
from app.hand.grip import Grip
from app.units import input_text, symbol
from app.words import tr
from solver.model import Project, UnitSystemName


def joint_grip(project: Project, joint: int, ruler: Ruler, *, total_stays: bool = False) -> Grip:
    """The length of the segment before a joint (1…n); at the last joint there is only one way."""
    segment = project.segments[joint - 1]
    whole = sum_of(segment.length, project.segments[joint].length) if joint < len(project.segments) else 0.0
    kept = total_stays and joint < len(project.segments)
    put = _total_kept(project, joint, whole) if kept else _beyond_moved(project, joint)
    return Grip(
        name=tr("Length of {mark}").format(mark=segment.mark),
        quantity="length",
        system=project.display.unit_system,
        value=segment.length,
        at=length_at(project, joint, ruler),
        put=put,
        tell=lambda value: _told(project, joint, value, whole if kept else None),
        above=0.0,
        below=whole if kept else float("inf"),
    )


def length_at(project: Project, joint: int, ruler: Ruler) -> Callable[[float], float]:
    """The length with which the joint is so many pixels further along +x."""
    start = sum(segment.length for segment in project.segments[: joint - 1])
    end = start + project.segments[joint - 1].length
    forward = 1.0 if ruler.end > ruler.begin else -1.0

    def at(pixels: float) -> float:
        pixel = ruler.pixel(end) + forward * pixels
        held = ruler.position_at(pixel)  # within the member; what is beyond goes on as the sheet does
        return held + (pixel - ruler.pixel(held)) / ruler.scale - start

    return at


def _beyond_moved(project: Project, joint: int) -> Callable[[float], Project]:
    return lambda value: edits.set_value(project, ("segments", joint - 1, "length"), value)


def _total_kept(project: Project, joint: int, whole: float) -> Callable[[float], Project]:
    def put(value: float) -> Project:
        length, rest = parted(whole, value)
        segments = list(project.segments)
        segments[joint - 1] = replace(segments[joint - 1], length=length)
        segments[joint] = replace(segments[joint], length=rest)
        return edits.set_value(project, ("segments",), tuple(segments))

    return put


def _told(project: Project, joint: int, value: float, whole: float | None) -> str:
    system, mark = project.display.unit_system, project.segments[joint - 1].mark
    length = input_text(value, "length", system)
    unit = symbol("length", system)
    if joint == len(project.segments):
        return tr("{mark} {length} {unit}, the member ends there").format(mark=mark, length=length, unit=unit)
    if whole is None:
        return tr("{mark} {length} {unit}, what lies beyond moves along").format(
            mark=mark, length=length, unit=unit
        )
    return tr("{mark} {length} and {next} {rest} {unit}, the total stays").format(
        mark=mark,
        length=length,
        next=project.segments[joint].mark,
        rest=_rest(whole, value, system),
        unit=unit,
    )


def _rest(whole: float, value: float, system: UnitSystemName) -> str:
    return input_text(parted(whole, value)[1], "length", system)
