"""The joints on paper: where they are, what holds them along the axis and, for stability, sideways."""

from __future__ import annotations

from msgspec import UnsetType

from app.lateral_entry import hold_entry
from app.sheet.blocks import Block, column, table
from app.sheet.readings import Readings
from app.sheet.shoulders import shoulder_words
from app.words import tr
from solver.model import AnySupport, FixedSupport, Joint, Project, SpringSupport, StopSupport, supports_of
from solver.results import Results


def _holds(joint: Joint, say: Readings) -> list[str]:
    """What holds a joint sideways, for stability."""
    return [hold_entry(joint.lateral, key, say.units) for key in ("translation", "rotation")]


def joint_inputs(project: Project, results: Results, say: Readings) -> Block:
    """The table of joints; what holds them sideways only where something does."""
    lateral = any(not isinstance(joint.lateral, UnsetType) for joint in project.joints)
    shouldered = any(joint.shoulder for joint in project.joints)
    columns = [
        column(tr("Joint"), align="left"),
        column("x", say.unit("length")),
        column(tr("Support"), align="left"),
        *([column(tr("Shoulder"), align="left")] if shouldered else []),
        *([column(tr("Held sideways"), align="left")] if lateral else []),
        *([column(tr("Held against turning"), align="left")] if lateral else []),
    ]
    rows = [
        [
            joint.mark,
            say.plain(x, "length"),
            supports_words(joint, say),
            *([shoulder_words(joint, say)] if shouldered else []),
            *(_holds(joint, say) if lateral else ()),
        ]
        for joint, x in zip(project.joints, results.position.tolist(), strict=True)
    ]
    return table(tr("Joints and supports"), columns, rows)


def supports_words(joint: Joint, say: Readings) -> str:
    """All supports of a joint in words."""
    return "; ".join(support_words(support, say) for support in supports_of(joint)) or tr("free")


def support_words(support: AnySupport, say: Readings) -> str:
    """One support in words."""
    match support:
        case FixedSupport():
            return tr("fixed")
        case SpringSupport(stiffness=stiffness):
            return tr("spring, {stiffness}").format(stiffness=say.exact(stiffness, "spring", unit=True))
        case StopSupport(side=side, clearance=clearance, stiffness=stiffness):
            parts = {
                "sense": "+x" if side == "plus" else "−x",
                "gap": say.exact(clearance, "displacement", unit=True),
            }
            if isinstance(stiffness, UnsetType):
                return tr("stop against {sense}, clearance {gap}, rigid").format(**parts)
            words = tr("stop against {sense}, clearance {gap}, stiffness {stiffness}")
            return words.format(**parts, stiffness=say.exact(stiffness, "spring", unit=True))
