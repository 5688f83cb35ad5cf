"""A draw bolt in a stack of two sleeves, tightened by its nut: the member of the tests on companions."""

from __future__ import annotations

from msgspec.structs import replace

from solver.model import (
    FORMAT,
    VERSION,
    Combination,
    Companion,
    CompanionAction,
    CompanionSegment,
    FixedSupport,
    Joint,
    JointLoad,
    LoadCase,
    Material,
    Project,
    RoundSection,
    Segment,
    SegmentLoad,
    TubeSection,
)


def draw_bolt(acts: CompanionAction = "compression") -> Project:
    """Bolt A, B, C between joints 0 and 3; sleeves Sa and Sb beside B, made too long by a turn of the nut."""
    steel = Material("Steel", 2.1e11, 1.2e-5, 7850.0, 2.4e8, 2.4e8)
    brass = Material("Brass", 1.0e11, 2.0e-5, 8500.0, 1.2e8, 1.2e8)
    bolt = RoundSection(diameter=0.020)
    sleeves = (
        CompanionSegment("Sa", 0.14, "Steel", TubeSection(outer=0.036, inner=0.022)),
        CompanionSegment("Sb", 0.10, "Brass", TubeSection(outer=0.044, outer_end=0.040, inner=0.022)),
    )
    return Project(
        format=FORMAT,
        version=VERSION,
        title="Draw bolt",
        materials=(steel, brass),
        joints=(Joint("0", FixedSupport()), Joint("1"), Joint("2"), Joint("3")),
        segments=(
            Segment("A", 0.05, "Steel", bolt),
            Segment("B", 0.24, "Steel", bolt),
            Segment("C", 0.06, "Steel", bolt),
        ),
        companions=(Companion(mark="S", start="1", end="2", acts=acts, segments=sleeves),),
        load_cases=(
            LoadCase("Nut", segment_loads=(SegmentLoad("Sb", lack_of_fit=0.0003),)),
            LoadCase(
                "Pull",
                segment_loads=(SegmentLoad("Sa", temperature_start=20.0, temperature_end=40.0),),
                joint_loads=(JointLoad("3", force=30e3),),
            ),
        ),
        combinations=(
            Combination("Tight", {"Nut": 1.0}),
            Combination("Pulled", {"Nut": 1.0, "Pull": 1.0}),
        ),
    )


def overpulled() -> Project:
    """The bolt under a pull at which the sleeves separate."""
    project = draw_bolt()
    apart = Combination("Apart", {"Nut": 1.0, "Pull": 8.0})
    return replace(project, combinations=(*project.combinations, apart))
