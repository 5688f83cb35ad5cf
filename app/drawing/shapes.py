"""The drawing as plain values: strokes and texts in pixels, and what can be pointed at.

A picture is made by `layout`, and painted by the window's drawing and by the calc sheet. Its parts are
structs: hundreds are made for every edit, and they are made faster than dataclasses.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal, TypeAlias, get_args

from msgspec import Struct

HAIR = 1e-6  # px
Point: TypeAlias = tuple[float, float]  # (x, y), y downward
Face: TypeAlias = Literal["plain", "strong", "small", "small_strong", "mark"]
Anchor: TypeAlias = Literal["start", "middle", "end"]
SegmentPart: TypeAlias = Literal[
    "segment",
    "mark",
    "length",
    "section",
    "distributed",
    "distributed_end",
    "warmth",
    "fit",
    "bedding",
    "bonded",
]
JointPart: TypeAlias = Literal["joint", "support", "shoulder", "lateral", "turning", "force", "movement"]
CompanionPart: TypeAlias = Literal[  # of its segments, counted over all companions
    "companion",
    "companion_mark",
    "companion_length",
    "companion_section",
    "companion_load",
    "companion_name",
]
PartKind: TypeAlias = Literal[SegmentPart, JointPart, CompanionPart, "gravity", "note"]
OF_SEGMENT: frozenset[PartKind] = frozenset(get_args(SegmentPart))
OF_JOINT: frozenset[PartKind] = frozenset(get_args(JointPart))
OF_COMPANION: frozenset[PartKind] = frozenset(get_args(CompanionPart))
LOADS: frozenset[PartKind] = frozenset(  # of the shown state
    ("distributed", "distributed_end", "warmth", "fit", "force", "movement", "gravity", "companion_load")
)
Ink: TypeAlias = Literal["ink", "quiet", "joint", "select"]
Fill: TypeAlias = Literal["", "body_fill", "band_fill", "select_fill", "load_fill", "paper", "ink"]


class Box(Struct, frozen=True, gc=False):
    """A rectangle; `left` ≤ `right` and `top` ≤ `bottom`."""

    left: float
    top: float
    right: float
    bottom: float

    @classmethod
    def around(cls, centre: Point, width: float, height: float) -> Box:
        """The box of a size around its centre."""
        left, top = centre[0] - 0.5 * width, centre[1] - 0.5 * height
        return cls(left, top, left + width, top + height)

    @property
    def centre(self) -> Point:
        """The point in its middle."""
        return 0.5 * (self.left + self.right), 0.5 * (self.top + self.bottom)

    def contains(self, point: Point) -> bool:
        """Whether a point lies inside or on an edge."""
        return self.left <= point[0] <= self.right and self.top <= point[1] <= self.bottom

    def meets(self, other: Box) -> bool:
        """Whether two boxes share more than an edge, whose place is rounded."""
        return (
            self.left < other.right - HAIR
            and other.left < self.right - HAIR
            and self.top < other.bottom - HAIR
            and other.top < self.bottom - HAIR
        )


class Part(Struct, frozen=True, gc=False):
    """What a point of the drawing stands for: `index` along the chain, of segments or of joints, or of the
    segments of all companions in the order of the file.

    A label that stands for neighbours alike has the first one's index. `number` tells the supports of one
    joint apart, in their order.
    """

    kind: PartKind
    index: int
    number: int = 0


def body_of(part: Part) -> Part:
    """The segment, the companion's segment or the joint that a part belongs to."""
    if part.kind in OF_COMPANION:
        return Part("companion", part.index)
    return Part("segment" if part.kind in OF_SEGMENT else "joint", part.index)


class Stroke(Struct, frozen=True, gc=False):
    """A line through points, closed or not; `fill` names a colour of the theme, empty for none."""

    points: tuple[Point, ...]
    ink: Ink = "ink"
    width: float = 1.0
    closed: bool = False
    fill: Fill = ""
    dash: tuple[float, ...] = ()
    part: Part | None = None
    clip: bool = True  # to the window of the ruler
    pairs: bool = False  # every two points are a line of their own


class Circle(Struct, frozen=True, gc=False):
    """A circle on paper around a mark."""

    centre: Point
    radius: float


class Text(Struct, frozen=True, gc=False):
    """A text centred in its box."""

    box: Box
    text: str
    face: Face = "plain"
    ink: Ink = "ink"
    part: Part | None = None
    anchor: Anchor = "middle"  # which end keeps its place where a font runs narrower than was measured


class Target(Struct, frozen=True, gc=False):
    """Where a part can be pointed at."""

    box: Box
    part: Part


@dataclass(slots=True)
class Picture:
    """All of a drawing; later targets lie over earlier ones."""

    factor: float = 1.0  # how much larger the drawing is across the axis than along it
    chain_edge: float = 0.0  # across the axis: where joint lines begin
    axis: float = 0.0  # the pixel across of the member's axis
    scale: float = 0.0  # pixels per metre across
    legend: Box | None = None  # kept free for the scale of colours
    strokes: list[Stroke] = field(default_factory=list)
    circles: list[Circle] = field(default_factory=list)
    left_out: int = 0  # labels that found no room
    texts: list[Text] = field(default_factory=list)
    targets: list[Target] = field(default_factory=list)
    contact_strokes: list[Stroke] = field(default_factory=list)  # of results, as stale as they are
    contact_texts: list[Text] = field(default_factory=list)

    def target_at(self, point: Point) -> Target | None:
        """The topmost target at a point, or None."""
        for target in reversed(self.targets):
            if target.box.contains(point):
                return target
        return None

    def label_at(self, point: Point) -> Target | None:
        """The label at a point, else the topmost target: what is typed in place there."""
        for text in self.texts:
            if text.part is not None and text.part.kind != "note" and text.box.contains(point):
                return Target(text.box, text.part)
        return self.target_at(point)

    def box_of(self, part: Part) -> Box | None:
        """Where a part's label stands, else where it is pointed at; None where it is not drawn."""
        texts = (text.box for text in self.texts if text.part == part)
        targets = (target.box for target in reversed(self.targets) if target.part == part)
        return next(texts, next(targets, None))
