"""What the tooltips of the drawing say: all that a dropped label would have said, and a little more."""

from __future__ import annotations

from app.gui.drawing.member import Member
from app.section_entry import section_label
from app.units import format_value
from app.words import tr


def segment_tip(member: Member, index: int) -> str:
    """Mark, section, length and material of a segment."""
    segment = member.project.segments[index]
    return tr("Segment {mark}: {section}, {length}, {material}").format(
        mark=segment.mark,
        section=section_label(segment.section, member.system),
        length=format_value(segment.length, "length", member.system, strip=True, with_unit=True),
        material=segment.material,
    )


def joint_tip(member: Member, index: int) -> str:
    """Mark and position of a joint."""
    position = format_value(member.position[index], "length", member.system, strip=True, with_unit=True)
    return tr("Joint {mark} at {position}").format(mark=member.project.joints[index].mark, position=position)
