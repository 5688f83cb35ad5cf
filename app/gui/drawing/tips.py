"""What the tooltips of the drawing say: all that a dropped label would have said, and a little more."""

from __future__ import annotations

from app.gui.drawing.member import Member
from app.gui.drawing.words import bedding_text, distributed_text, fit_text, warmth_text
from app.section_entry import section_label
from app.units import format_value
from app.words import tr
from solver.model import end_of


def segment_tip(member: Member, index: int) -> str:
    """Mark, section, length and material of a segment, and what acts on it."""
    segment = member.project.segments[index]
    first = tr("Segment {mark}: {section}, {length}, {material}").format(
        mark=segment.mark,
        section=section_label(segment.section, member.system),
        length=format_value(segment.length, "length", member.system, strip=True, with_unit=True),
        material=segment.material,
    )
    bedding = bedding_text(segment.bedding, end_of(segment.bedding, segment.bedding_end), member.system)
    return "\n".join(line for line in (first, *_load_lines(member, index), bedding) if line)


def _load_lines(member: Member, index: int) -> tuple[str, ...]:
    if member.loads is None:
        return ()
    loads, system = member.loads, member.system
    return (
        distributed_text(*loads.distributed[0, index].tolist(), system, signed=True),
        warmth_text(*loads.temperature[0, index].tolist(), system),
        fit_text(float(loads.lack_of_fit[0, index]), system),
    )


def joint_tip(member: Member, index: int) -> str:
    """Mark and position of a joint."""
    position = format_value(member.position[index], "length", member.system, strip=True, with_unit=True)
    return tr("Joint {mark} at {position}").format(mark=member.project.joints[index].mark, position=position)
