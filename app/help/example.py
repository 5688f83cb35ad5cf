"""The small member in the pictures of help: the screw of a cider press, invented, its names translated."""

from __future__ import annotations

from app.words import tr
from solver.model import (
    FORMAT,
    VERSION,
    Combination,
    DisplacementLimit,
    Display,
    FixedSupport,
    Joint,
    JointLoad,
    Limits,
    LoadCase,
    Material,
    Project,
    RoundSection,
    Segment,
    SegmentLoad,
    SpringSupport,
    TubeSection,
)


def example() -> Project:
    """Four segments between a wall and a spring, pressed and warmed; one of its checks fails."""
    pressing, warm, steel = tr("Pressing"), tr("Warm"), tr("Steel")
    return Project(
        format=FORMAT,
        version=VERSION,
        title=tr("Cider press, screw"),
        display=Display(units="mm-kN-MPa"),
        materials=(Material(steel, 210e9, 12e-6, 7850.0, 160e6, 140e6),),
        joints=(
            Joint("0", FixedSupport()),
            *(Joint(mark) for mark in "123"),
            Joint("4", SpringSupport(stiffness=250e6)),
        ),
        segments=(
            Segment("A", 0.16, steel, RoundSection(diameter=0.045)),
            Segment("B", 0.34, steel, RoundSection(diameter=0.032)),
            Segment("C", 0.06, steel, RoundSection(diameter=0.032, diameter_end=0.05)),
            Segment("D", 0.24, steel, TubeSection(outer=0.05, inner=0.02)),
        ),
        load_cases=(_pressing(pressing), _warm(warm)),
        combinations=(
            Combination(tr("Pressing, cold"), {pressing: 1.0}),
            Combination(tr("Pressing, warm"), {pressing: 1.0, warm: 1.0}),
        ),
        limits=Limits(displacement=(DisplacementLimit("2", 0.4e-3),)),
    )


def _pressing(name: str) -> LoadCase:
    return LoadCase(
        name,
        segment_loads=(SegmentLoad("D", load_start=-180e3, load_end=-120e3),),
        joint_loads=(JointLoad("2", force=205e3),),
    )


def _warm(name: str) -> LoadCase:
    rises = (("A", 10.0, 10.0), ("B", 10.0, 30.0), ("C", 30.0, 30.0), ("D", 30.0, 20.0))
    return LoadCase(
        name,
        segment_loads=tuple(
            SegmentLoad(mark, temperature_start=start, temperature_end=end) for mark, start, end in rises
        ),
    )
