"""The shapes of the findings. Texts are in the user's language and display units; bare numbers are SI."""

from __future__ import annotations

from dataclasses import dataclass

from app.findings.subjects import Subject
from solver.checks import Reason, Status, Verdict
from solver.model import CompanionAction
from solver.results import StateKind


@dataclass(frozen=True, slots=True)
class Band:
    """The little scale of a segment: its range of stress between the allowables, all in Pa with their sign.

    Where combinations have different allowable factors every stress is taken at the factor of the governing
    one (σ · its factor / own factor), so that the bar leaves the scale exactly when a check fails. None for
    an allowable that the material does not have; the texts are the scale's labels.
    """

    low: float
    high: float
    compression: float | None  # the allowable, negative
    tension: float | None  # the allowable, positive
    compression_text: str
    tension_text: str


@dataclass(frozen=True, slots=True)
class SegmentFinding:
    """The worst made check of stress in one segment."""

    subject: Subject
    segment: int  # along the chain, or among the segments of all companions
    mark: str
    sentence: str  # the whole: "C: 129 of 160 MPa in tension, 0.80, at 760 mm, Hot start"
    short: str  # without mark and utilisation, which stand beside it: "129 of 160 MPa in tension, at 760 mm"
    state: str
    utilisation: float
    utilisation_text: str
    status: Status
    position: float
    band: Band
    beside: bool = False  # whether it is a companion's segment


@dataclass(frozen=True, slots=True)
class LimitFinding:
    """The worst made check of one limit, peak stress or fatigue.

    `joints` are one index, or two for a relative displacement; of fatigue away from shoulders `segments` is,
    or `companions`.
    """

    subject: Subject
    joints: tuple[int, ...]
    segments: tuple[int, ...]
    sentence: str
    state: str
    utilisation: float
    utilisation_text: str
    status: Status
    position: float | None
    companions: tuple[int, ...] = ()  # among the segments of all companions


@dataclass(frozen=True, slots=True)
class NotMade:
    """Checks that were not made for one reason: what, and what to enter for it."""

    reason: Reason
    material: str
    sentence: str
    remedy: str
    count: int
    marks: tuple[str, ...]  # of segments and joints
    segments: tuple[int, ...]
    joints: tuple[int, ...]
    companions: tuple[int, ...] = ()  # among the segments of all companions


@dataclass(frozen=True, slots=True)
class CompanionState:
    """A companion in one checked state; forces in N, tension positive, at the joints that it lies between."""

    name: str
    kind: StateKind
    force_from: float
    force_to: float
    separated: bool
    gap: float  # m
    text: str  # the force with its unit, or that it has parted


@dataclass(frozen=True, slots=True)
class CompanionFinding:
    """A companion over the checked states; `sentence` tells its least clamp force, empty where it is tied."""

    at: int
    mark: str
    acts: CompanionAction
    segments: tuple[int, ...]  # among the segments of all companions
    position: float  # of its far end
    sentence: str
    clamp: float | None  # N, the least
    clamp_text: str
    clamp_state: str
    parts: bool  # whether it parts in some checked state
    states: tuple[CompanionState, ...]


@dataclass(frozen=True, slots=True)
class ContactFinding:
    """What one stop does over the states; `number` is its place among the supports of its joint."""

    joint: int
    mark: str
    number: int
    sentence: str  # "Joint 3, stop + 0.2 mm: closed in Hot (12.4 kN); open in Cold (0.13 mm left)"
    position: float


@dataclass(frozen=True, slots=True)
class SupportPart:
    """What one of the supports of a joint does, both in words: the support, its force or what is left."""

    name: str
    text: str


@dataclass(frozen=True, slots=True)
class JointReaction:
    """The force of the supports of a joint on the member along +x.

    `parts` tells them apart where there are several, and says what a stop does.
    """

    joint: int
    mark: str
    value: float
    text: str  # with unit
    parts: tuple[SupportPart, ...] = ()


@dataclass(frozen=True, slots=True)
class StateBooks:
    """One state's sum of forces along x, and its energies; the texts have their units."""

    name: str
    kind: StateKind
    reactions: tuple[JointReaction, ...]
    reactions_text: str  # their sum
    loads_text: str  # all applied loads, self-weight included
    bedding_text: str  # what the bedding exerts; empty for a member without bedding
    residual: float
    residual_text: str  # what is left of loads + reactions + bedding
    strain_text: str
    potential_text: str
    numerical_error: str  # beside a name of its own: "at most 3·10⁻¹¹ …"


@dataclass(frozen=True, slots=True)
class JointDisplacement:
    """The largest displacement of one joint over the checked states, with its sign."""

    joint: int
    mark: str
    value: float
    text: str  # with unit
    state: str


@dataclass(frozen=True, slots=True)
class Findings:
    """Everything that is said about a solved member; over checked states only."""

    verdict: Verdict
    headline: str
    detail: str
    segments: tuple[SegmentFinding, ...]  # the worst first
    limits: tuple[LimitFinding, ...]  # the worst first
    not_made: tuple[NotMade, ...]
    contacts: tuple[ContactFinding, ...]  # of stops, along the chain
    companions: tuple[CompanionFinding, ...]  # in the order of the file
    notes: tuple[str, ...]
    books: tuple[StateBooks, ...]  # in the states' order
    displacements: tuple[JointDisplacement, ...]  # along the chain
    largest_displacement: JointDisplacement
    mass_text: str
    numerical_error: str  # of the worst state
