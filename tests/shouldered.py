"""A stepped bar with two shoulders and a range of fatigue, for tests: what is checked, what is not."""

from __future__ import annotations

from msgspec import UNSET
from msgspec.structs import replace

from solver.model import (
    Combination,
    Endurance,
    FatigueRange,
    FixedSupport,
    JointLoad,
    Limits,
    Project,
    Shoulder,
    TubeSection,
    Waiver,
)
from tests.members import Part, case, member, round_bar

FILLET = Shoulder(fillet_radius=0.002)
FACTOR = Shoulder(factor=1.8)


def spindle() -> Project:
    """⌀50, ⌀40 with a fillet between, a tube behind with an entered factor; fatigue at both does not pass."""
    parts = [
        Part(0.30, round_bar(0.05), allowable_tension=160e6, allowable_compression=160e6),
        Part(0.25, round_bar(0.04), allowable_tension=160e6, allowable_compression=160e6),
        Part(
            0.35, TubeSection(outer=0.045, inner=0.025), allowable_tension=160e6, allowable_compression=160e6
        ),
    ]
    pull = case("Pull", on_joints=[JointLoad("3", force=110e3)])
    push = case("Push", on_joints=[JointLoad("3", force=-60e3)])
    combinations = [Combination("Pulling", {"Pull": 1.0}), Combination("Pushing", {"Push": 1.0})]
    project = member(parts, {0: FixedSupport()}, [pull, push], combinations)
    return replace(
        with_shoulders(project, {1: FILLET, 2: FACTOR}),
        materials=tuple(
            replace(m, allowable_peak=300e6, endurance=Endurance(amplitude=140e6, ultimate=600e6))
            for m in project.materials
        ),
        fatigue=(FatigueRange("Pulling", "Pushing"),),
        limits=Limits(waived=(Waiver("stability", "short and stocky"),)),
    )


def with_shoulders(project: Project, shoulders: dict[int, Shoulder]) -> Project:
    """The project with these shoulders and no others."""
    joints = tuple(replace(j, shoulder=shoulders.get(i, UNSET)) for i, j in enumerate(project.joints))
    return replace(project, joints=joints)


def without_strength(project: Project) -> Project:
    """The project whose materials say nothing of peak stresses and fatigue."""
    bare = (replace(m, allowable_peak=UNSET, endurance=UNSET) for m in project.materials)
    return replace(project, materials=tuple(bare))
