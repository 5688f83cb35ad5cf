"""What the tooltips of the drawing say: all that a dropped label would have said, and a little more."""

from __future__ import annotations

from app.drawing.bonded import bonded_text
from app.drawing.companions import companion_tip
from app.drawing.laterals import lateral_lines
from app.drawing.member import Member
from app.drawing.shapes import OF_COMPANION, OF_JOINT, OF_SEGMENT, Part
from app.drawing.shoulders import shoulder_label
from app.drawing.words import (
    bedding_text,
    distributed_text,
    fit_text,
    gravity_text,
    section_text,
    signed_text,
    value_text,
    warmth_text,
)
from app.support_entry import supports_text
from app.words import tr
from solver.model import end_of, supports_of


def tip(member: Member, part: Part) -> str:
    """The tooltip of a part."""
    if part.kind in OF_COMPANION:
        return companion_tip(member, part.index)
    if part.kind in OF_SEGMENT:
        return _segment_tip(member, part.index)
    if part.kind in OF_JOINT:
        return _joint_tip(member, part.index)
    return "" if member.loads is None else gravity_text(float(member.loads.gravity[0]), member.system)


def _segment_tip(member: Member, index: int) -> str:
    """Mark, section, length and material of a segment, and what acts on it."""
    segment = member.project.segments[index]
    first = tr("Segment {mark}: {section}, {length}, {material}").format(
        mark=segment.mark,
        section=section_text(segment.section, member.system),
        length=value_text(segment.length, "length", member.system),
        material=segment.material,
    )
    bedding = bedding_text(segment.bedding, end_of(segment.bedding, segment.bedding_end), member.system)
    bonded = bonded_text(segment.bonded, member.system)
    return _lines(first, bonded, *_on_segment(member, index), bedding)


def _on_segment(member: Member, index: int) -> tuple[str, ...]:
    if member.loads is None:
        return ()
    loads, system = member.loads, member.system
    first, last = loads.distributed[0, index].tolist()
    load = distributed_text(first, last, system, signed=True)
    warm_first, warm_last = loads.temperature[0, index].tolist()
    return (
        tr("load {value}").format(value=load) if load else "",
        warmth_text(warm_first, warm_last, system),
        fit_text(float(loads.lack_of_fit[0, index]), system),
        gravity_text(float(loads.gravity[0]), system),
    )


def _joint_tip(member: Member, index: int) -> str:
    """Mark, position and support of a joint, and what acts on it."""
    joint = member.project.joints[index]
    first = tr("Joint {mark} at {position}").format(
        mark=joint.mark, position=value_text(member.position[index], "length", member.system)
    )
    supports = supports_of(joint)
    held = supports_text(supports, member.system) if supports else ""
    shoulders = (shoulder_label(notch, member.project) for notch in member.shoulders if notch.joint == index)
    sideways = lateral_lines(joint, member.system)
    return _lines(first, held, next(shoulders, ""), *sideways, *_on_joint(member, index))


def _on_joint(member: Member, index: int) -> tuple[str, ...]:
    if member.loads is None:
        return ()
    force, movement = float(member.loads.joint_force[0, index]), float(member.loads.movement[0, index])
    return (
        tr("force {value}").format(value=signed_text(force, "force", member.system)) if force else "",
        tr("moved {value}").format(value=signed_text(movement, "displacement", member.system))
        if movement
        else "",
    )


def _lines(*lines: str) -> str:
    return "\n".join(line for line in lines if line)
