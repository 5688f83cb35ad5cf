"""From a handle of the drawing to the number it holds: which grip, or why the hand cannot take it."""

from __future__ import annotations

from collections.abc import Callable
from typing import Final

from app.drawing.handles import Handle
from app.drawing.shapes import Part, PartKind
from app.drawing.sketch import Sketch
from app.hand.grip import Grip, Refusal
from app.hand.lengths import joint_grip
from app.hand.loads import Aim, aim_at, distributed_grip, force_grip
from app.hand.owners import why_not_here
from app.hand.sections import edge_grip
from app.hand.stops import stop_grip
from app.shown import Shown


def take(
    handle: Handle, sketch: Sketch, shown: Shown, case: str | None, *, total_stays: bool = False
) -> Grip | Refusal:
    """The grip of a handle, for the project and the loads that were sketched and the case that is edited."""
    project = sketch.member.project
    if handle.kind == "joint":
        return joint_grip(project, handle.index, sketch.frame.ruler, total_stays=total_stays)
    if handle.kind in ("edge", "bore"):
        inner = handle.kind == "bore"
        return edge_grip(project, handle.index, handle.where, 1.0 / sketch.scale, inner=inner)
    if handle.kind == "stop":
        return stop_grip(project, handle.index, handle.number)
    aim = aim_at(project, shown, case)
    if isinstance(aim, Refusal):
        return aim
    edited = project.load_cases.index(aim.case)
    part = part_of(handle)
    elsewhere = "" if part is None else why_not_here(part, project, shown, edited)
    return Refusal(elsewhere) if elsewhere else _LOADS[handle.kind](handle, sketch, aim)


def part_of(handle: Handle) -> Part | None:
    """The load or the stop that a handle is of; None for one of the member itself."""
    kind = _PARTS.get(handle.kind)
    return None if kind is None else Part(kind, handle.index, handle.number)


def _force(handle: Handle, sketch: Sketch, aim: Aim) -> Grip:
    loads = sketch.member.loads
    total = 0.0 if loads is None else float(loads.joint_force[0, handle.index])
    return force_grip(sketch.member.project, handle.index, aim, total)


def _distributed(handle: Handle, sketch: Sketch, aim: Aim) -> Grip:
    loads = sketch.member.loads
    start, end = (0.0, 0.0) if loads is None else loads.distributed[0, handle.index].tolist()
    return distributed_grip(sketch.member.project, handle.index, handle.where, aim, (start, end))


_PARTS: Final[dict[str, PartKind]] = {"stop": "support", "force": "force", "distributed": "distributed"}
_LOADS: Final[dict[str, Callable[[Handle, Sketch, Aim], Grip]]] = {
    "force": _force,
    "distributed": _distributed,
}
