"""The project: frozen msgspec structs with exactly the keys of the project file, in its order.

A key that was left out stays left out when the project is saved, one that was written stays, even where it
says what the default says. So a default is a value that knows it was never written (`AbsentNumber` and its
kin): it computes and compares like the plain value, and only the writer asks. For a whole record (`sheet`,
`display`, `limits`) it is one object (`ABSENT_SHEET` and so on) that the writer knows by identity; replacing
anything in it makes another object, which is written. The rejected alternatives were
`value | None` in every field, which every reader would have to resolve again, and dropping written defaults,
which changes a file that nobody edited. `*_end` keys are different: absent means "follows the start", so they
are UNSET and resolved by `end_of`.

The constraints here (sizes greater than zero, and so on) are those of a single value; what concerns several
(marks, inner below outer) is in `validation`.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Annotated, Final, Literal, TypeAlias

from msgspec import UNSET, Meta, Struct, UnsetType, field

from solver.absent import absent_list, absent_one, absent_table, absent_text, absent_zero

FORMAT: Final = "barwright-project"
VERSION: Final = 1


Number: TypeAlias = float
Positive: TypeAlias = Annotated[float, Meta(gt=0)]
NotNegative: TypeAlias = Annotated[float, Meta(ge=0)]
AtLeastOne: TypeAlias = Annotated[float, Meta(ge=1)]
Name: TypeAlias = Annotated[str, Meta(min_length=1)]


class Record(Struct, frozen=True, gc=False, forbid_unknown_fields=True):
    """Base of everything that stands in a project file."""


class Section(Record, frozen=True, kw_only=True, tag_field="shape"):
    """A cross-section; each dimension varies linearly from its start to its `_end`."""


class AreaSection(Section, frozen=True, kw_only=True, tag="area"):
    """A section known by its area (m²) alone, with the second moment (m⁴) where stability needs it."""

    area: Positive
    area_end: Positive | UnsetType = UNSET
    second_moment: Positive | UnsetType = UNSET
    second_moment_end: Positive | UnsetType = UNSET


class RoundSection(Section, frozen=True, kw_only=True, tag="round"):
    """A solid round bar, diameters in m."""

    diameter: Positive
    diameter_end: Positive | UnsetType = UNSET


class TubeSection(Section, frozen=True, kw_only=True, tag="tube"):
    """A round tube, outside and inside diameters in m; inner is below outer everywhere."""

    outer: Positive
    outer_end: Positive | UnsetType = UNSET
    inner: NotNegative
    inner_end: NotNegative | UnsetType = UNSET


class RectangleSection(Section, frozen=True, kw_only=True, tag="rectangle"):
    """A solid rectangle, width and depth in m; the drawing shows the depth."""

    width: Positive
    width_end: Positive | UnsetType = UNSET
    depth: Positive
    depth_end: Positive | UnsetType = UNSET


AnySection: TypeAlias = AreaSection | RoundSection | TubeSection | RectangleSection


def end_of(start: float, end: float | UnsetType) -> float:
    """The value at the segment's end: an absent `*_end` follows its start."""
    return start if isinstance(end, UnsetType) else end


class Endurance(Record, frozen=True, kw_only=True):
    """The straight line of fatigue, both in Pa: amplitude alone at one end, mean alone at the other.

    The amplitude is the one of the part: size, finish and reliability are in it already.
    """

    amplitude: Positive
    ultimate: Positive


class Material(Record, frozen=True):
    """Modulus in Pa, expansion in 1/K, density in kg/m³, allowables in Pa (all positive).

    `allowable_peak` is for the peak stress at shoulders, either sign.
    """

    name: Name
    modulus: Positive
    expansion: Number = field(default_factory=absent_zero)
    density: NotNegative = field(default_factory=absent_zero)
    allowable_tension: Positive | UnsetType = UNSET
    allowable_compression: Positive | UnsetType = UNSET
    allowable_peak: Positive | UnsetType = UNSET
    endurance: Endurance | UnsetType = UNSET


class Support(Record, frozen=True, kw_only=True, tag_field="kind"):
    """What holds a joint along the axis."""


class FixedSupport(Support, frozen=True, kw_only=True, tag="fixed"):
    """Holds the joint at its movement (0 without one)."""


class SpringSupport(Support, frozen=True, kw_only=True, tag="spring"):
    """Pulls the joint back with `stiffness` (N/m) times its displacement from the support's movement."""

    stiffness: Positive


class StopSupport(Support, frozen=True, kw_only=True, tag="stop"):
    """One-sided: blocks motion beyond `clearance` (m) to its side; rigid without a stiffness (N/m)."""

    side: Literal["plus", "minus"]
    clearance: NotNegative
    stiffness: Positive | UnsetType = UNSET


AnySupport: TypeAlias = FixedSupport | SpringSupport | StopSupport


class Shoulder(Record, frozen=True, kw_only=True):
    """A step between two segments that raises the stress; exactly one of the two is given.

    `fillet_radius` in m for steps from round to round, `factor` the stress concentration factor Kt.
    """

    fillet_radius: Positive | UnsetType = UNSET
    factor: AtLeastOne | UnsetType = UNSET


LateralHold: TypeAlias = Literal["free", "fixed"] | Positive


class Lateral(Record, frozen=True, kw_only=True):
    """What holds a joint sideways, for stability: free where left out, or a stiffness (N/m; N m/rad)."""

    translation: LateralHold | UnsetType = UNSET
    rotation: LateralHold | UnsetType = UNSET


class Joint(Record, frozen=True):
    """An end of a segment; free where it has no support.

    `support` holds one support, `supports` several in their order; never both (see `supports_of`).
    """

    mark: Name
    support: AnySupport | UnsetType = UNSET
    supports: tuple[AnySupport, ...] = field(default_factory=absent_list)
    shoulder: Shoulder | UnsetType = UNSET
    lateral: Lateral | UnsetType = UNSET


def supports_of(joint: Joint) -> tuple[AnySupport, ...]:
    """All supports of a joint, however the file writes them; empty for a free joint."""
    return joint.supports if isinstance(joint.support, UnsetType) else (joint.support,)


class BondedPart(Record, frozen=True):
    """A part that shares the strain of a segment, beside the segment's own material and section."""

    material: Name
    section: AnySection


class Segment(Record, frozen=True):
    """A part between two joints: length in m, bedding in N/m² (force per length and displacement)."""

    mark: Name
    length: Positive
    material: Name
    section: AnySection
    bedding: NotNegative = field(default_factory=absent_zero)
    bedding_end: NotNegative | UnsetType = UNSET
    bonded: tuple[BondedPart, ...] = field(default_factory=absent_list)


def parts_of(segment: Segment) -> tuple[BondedPart, ...]:
    """All parts of a segment that share its strain, its own material and section first."""
    return (BondedPart(segment.material, segment.section), *segment.bonded)


class CompanionSegment(Record, frozen=True):
    """A part of a companion; its mark is unique over the member and all companions."""

    mark: Name
    length: Positive
    material: Name
    section: AnySection


CompanionAction: TypeAlias = Literal["both", "compression", "tension"]
DEFAULT_ACTION: Final[CompanionAction] = "both"


class Companion(Record, frozen=True, kw_only=True, rename={"start": "from", "end": "to"}):
    """A second chain beside the member, from one of its joints to a later one; the file's keys: `from`, `to`.

    One that acts in compression or tension only is tied at `from` and parts at `to`.
    """

    mark: Name
    start: Name
    end: Name
    acts: CompanionAction | UnsetType = UNSET
    segments: tuple[CompanionSegment, ...]

    @property
    def action(self) -> CompanionAction:
        """How it acts, both ways where the file says nothing."""
        return self.acts or DEFAULT_ACTION


class SegmentLoad(Record, frozen=True):
    """Load on a segment: N/m along +x and K above the stress-free state, both linear; lack of fit in m."""

    segment: Name
    load_start: Number = field(default_factory=absent_zero)
    load_end: Number | UnsetType = UNSET
    temperature_start: Number = field(default_factory=absent_zero)
    temperature_end: Number | UnsetType = UNSET
    lack_of_fit: Number = field(default_factory=absent_zero)


class JointLoad(Record, frozen=True):
    """Load at a joint: force in N along +x, movement of its support in m along +x."""

    joint: Name
    force: Number = field(default_factory=absent_zero)
    movement: Number = field(default_factory=absent_zero)


class LoadCase(Record, frozen=True):
    """Loads that come together; gravity is the component of the acceleration along +x, in m/s²."""

    name: Name
    gravity: Number = field(default_factory=absent_zero)
    segment_loads: tuple[SegmentLoad, ...] = field(default_factory=absent_list)
    joint_loads: tuple[JointLoad, ...] = field(default_factory=absent_list)


class Combination(Record, frozen=True):
    """Factors by load case (a case not named counts 0); `allowable_factor` scales allowable stresses only."""

    name: Name
    factors: Mapping[str, Number] = field(default_factory=absent_table)
    allowable_factor: Positive = field(default_factory=absent_one)


class FatigueRange(Record, frozen=True, rename={"start": "from", "end": "to"}):
    """Stress that goes back and forth between two combinations; the file's keys are `from` and `to`."""

    start: Name
    end: Name


class DisplacementLimit(Record, frozen=True):
    """|u| at a joint stays within `limit` (m)."""

    joint: Name
    limit: Positive


class RelativeLimit(Record, frozen=True, rename={"start": "from", "end": "to"}):
    """|u_to − u_from| stays within `limit` (m); the file's keys are `from` and `to`."""

    start: Name
    end: Name
    limit: Positive


class ReactionLimit(Record, frozen=True):
    """|R| of the support at a joint stays within `limit` (N)."""

    joint: Name
    limit: Positive


class Waiver(Record, frozen=True):
    """A check that the engineer does without, with the reason; it is shown as waived, never as passed."""

    check: Literal["stability"]
    reason: Name


class Limits(Record, frozen=True):
    """What the member must keep within beside the allowable stresses.

    `stability_factor` is the least factor between the loads and the elastic critical load; below 1 a member
    that buckles under its own loads would pass.
    """

    displacement: tuple[DisplacementLimit, ...] = field(default_factory=absent_list)
    relative: tuple[RelativeLimit, ...] = field(default_factory=absent_list)
    reaction: tuple[ReactionLimit, ...] = field(default_factory=absent_list)
    stability_factor: AtLeastOne | UnsetType = UNSET
    waived: tuple[Waiver, ...] = field(default_factory=absent_list)


ABSENT_LIMITS: Final = Limits()


def absent_limits() -> Limits:
    """Limits that were never written."""
    return ABSENT_LIMITS


class SheetTexts(Record, frozen=True):
    """Texts of the calc sheet's title block."""

    job: str = field(default_factory=absent_text)
    author: str = field(default_factory=absent_text)
    checker: str = field(default_factory=absent_text)
    revision: str = field(default_factory=absent_text)
    date: str = field(default_factory=absent_text)


ABSENT_SHEET: Final = SheetTexts()


def absent_sheet() -> SheetTexts:
    """Sheet texts that were never written."""
    return ABSENT_SHEET


UnitSystemName: TypeAlias = Literal["mm-N-MPa", "mm-kN-MPa", "m-kN-MPa", "in-lbf-psi", "in-kip-ksi"]
Orientation: TypeAlias = Literal["horizontal", "vertical"]

DEFAULT_UNITS: Final[UnitSystemName] = "mm-N-MPa"
DEFAULT_ORIENTATION: Final[Orientation] = "horizontal"


class Display(Record, frozen=True):
    """How the project is shown; never changes what it stores."""

    # read through the properties, which resolve what was left out

    units: UnitSystemName | UnsetType = UNSET
    orientation: Orientation | UnsetType = UNSET

    @property
    def unit_system(self) -> UnitSystemName:
        """The display unit system, `mm-N-MPa` where the file names none."""
        return self.units or DEFAULT_UNITS

    @property
    def layout(self) -> Orientation:
        """The orientation of the drawing, horizontal where the file names none."""
        return self.orientation or DEFAULT_ORIENTATION


ABSENT_DISPLAY: Final = Display()


def absent_display() -> Display:
    """A display that was never written."""
    return ABSENT_DISPLAY


class Project(Record, frozen=True, kw_only=True):
    """A whole project; n segments in a chain between n + 1 joints, companions beside them."""

    format: Literal["barwright-project"]
    version: Literal[1]
    title: str = field(default_factory=absent_text)
    notes: str = field(default_factory=absent_text)
    sheet: SheetTexts = field(default_factory=absent_sheet)
    display: Display = field(default_factory=absent_display)
    materials: tuple[Material, ...] = field(default_factory=absent_list)
    joints: tuple[Joint, ...]
    segments: tuple[Segment, ...]
    companions: tuple[Companion, ...] = field(default_factory=absent_list)
    load_cases: tuple[LoadCase, ...] = field(default_factory=absent_list)
    combinations: tuple[Combination, ...] = field(default_factory=absent_list)
    fatigue: tuple[FatigueRange, ...] = field(default_factory=absent_list)
    limits: Limits = field(default_factory=absent_limits)
