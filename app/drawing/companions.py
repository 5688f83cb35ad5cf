"""Companions beside the member: lanes parallel to the axis on the far side of the loads, tied at both ends.

Companions that lie beside one another have a lane each, those one behind the other share one. A lane's bodies
have a scale of their own across, in which the thickest section of all companions fills it. An end that can
part is drawn as a plate at its joint with a gap before it.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import accumulate

from msgspec.structs import replace

from app.action_entry import action_text
from app.beside import Beside, beside
from app.drawing.body import SAMPLES, edge_at
from app.drawing.member import Acting, Member
from app.drawing.placing import CLEAR, STACKED, TIGHT, Span, Wish, fits, place
from app.drawing.shapes import Box, Fill, Part, PartKind, Stroke, Text
from app.drawing.sketch import Lane, Sketch
from app.drawing.words import distributed_text, fit_text, section_text, value_text, warmth_text
from app.units import format_value
from app.words import tr
from solver.model import AreaSection, Companion, TubeSection, UnitSystemName
from solver.sections import outline

GAP = 6.0  # between lanes, px
CLOSE = 3.0  # between a body and its labels
PART = 7.0  # of an end that can part from its joint, px
LEAST_HALF = 2.0
SHARE = 0.45  # of the room across that lanes may take
MOST_ROWS = 3  # of labels of a lane


@dataclass(frozen=True, slots=True)
class Piece:
    """A companion's segment as it is drawn: its index among all, its lane, its ends along the axis, px."""

    index: int
    of: Beside
    lane: int
    ends: tuple[float, float]

    @property
    def part(self) -> Part:
        """What it is pointed at as."""
        return Part("companion", self.index)


def lanes_of(member: Member) -> tuple[int, ...]:
    """The lane of each companion: the nearest to the member in which no other lies beside it."""
    taken: list[list[tuple[int, int]]] = []
    found = []
    for companion in member.project.companions:
        low, high = joints_of(member, companion)
        free = (
            lane
            for lane, spans in enumerate(taken)
            if all(high <= start or end <= low for start, end in spans)
        )
        lane = next(free, len(taken))
        taken += [[]] if lane == len(taken) else []
        taken[lane].append((low, high))
        found.append(lane)
    return tuple(found)


def joints_of(member: Member, companion: Companion) -> tuple[int, int]:
    """The indices of the joints that a companion lies between."""
    marks = [joint.mark for joint in member.project.joints]
    return marks.index(companion.start), marks.index(companion.end)


def pieces_of(sketch: Sketch) -> list[Piece]:
    """All segments of companions; where they do not add up to the span they are drawn as if they did."""
    member = sketch.member
    if not member.project.companions:
        return []
    lanes, found, index = lanes_of(member), [], 0
    for at, companion in enumerate(member.project.companions):
        low, high = (member.position[joint] for joint in joints_of(member, companion))
        lengths = [segment.length for segment in companion.segments]
        scale = (high - low) / sum(lengths)
        places = [low, *(low + scale * x for x in accumulate(lengths))]
        pixels = [sketch.frame.ruler.pixel(x) for x in places]
        for number, segment in enumerate(companion.segments):
            of = Beside(at, number, companion, segment)
            found.append(Piece(index, of, lanes[at], (pixels[number], pixels[number + 1])))
            index += 1
    return found


def shown_of(sketch: Sketch, piece: Piece) -> Span | None:
    """The pixels of a segment inside the window, growing; None where it is outside."""
    low, high = max(min(piece.ends), sketch.window[0]), min(max(piece.ends), sketch.window[1])
    return (low, high) if high - low > 0.5 else None


# Room


def companion_wishes(sketch: Sketch) -> list[list[Wish]]:
    """The labels of each lane, the nearest first: names, lengths, sections, and what acts."""
    pieces = pieces_of(sketch)
    found: list[list[Wish]] = [[] for _ in range(max((piece.lane + 1 for piece in pieces), default=0))]
    if not sketch.frame.detail.dimensions:
        return found
    for piece in pieces:
        span = shown_of(sketch, piece)
        if span is not None:
            found[piece.lane] += _wishes(sketch, piece, span)
    return found


def _wishes(sketch: Sketch, piece: Piece, span: Span) -> Iterator[Wish]:
    """The labels of a segment, each at its share of the length, so that all lanes have one order."""
    system, segment = sketch.member.system, piece.of.segment
    length, slide = span[1] - span[0], 0.5 * (span[1] - span[0])

    def wish(text: str, kind: PartKind, rank: int, share: float) -> Wish:
        made = sketch.wish(text, span[0] + share * length, Part(kind, piece.index), rank=rank, slide=slide)
        half = min(0.5 * made.extent, slide)  # inside its own segment, where it is not longer
        along = min(max(made.along, span[0] + half), span[1] - half)
        return replace(made, along=along, slide=min(along - span[0], span[1] - along) - half)

    named = piece.of.number == 0
    if named:
        yield wish(name_text(piece.of.companion), "companion_name", 0, 0.15)
    if acts := acting_text(sketch.member, piece.index):
        yield wish(acts, "companion_load", 0, 0.45 if named else 0.25)
    section = section_text(segment.section, system)
    shown = section.replace("→", "\n→") if sketch.frame.upright else section
    yield wish(shown, "companion_section", 1, 0.7 if named else 0.55)
    yield wish(format_value(segment.length, "length", system, strip=True), "companion_length", 2, 0.9)


def name_text(companion: Companion) -> str:
    """A companion's mark, and how it acts where that is one way only."""
    if companion.action == "both":
        return companion.mark
    return tr("{mark}, {acts}").format(mark=companion.mark, acts=action_text(companion.action))


def acting_text(member: Member, index: int) -> str:
    """What acts on a companion's segment in the shown state; empty where nothing does."""
    if index >= len(member.beside):
        return ""
    acting, system = member.beside[index], member.system
    return ", ".join(filter(None, _acting_words(acting, system)))


def _acting_words(acting: Acting, system: UnitSystemName) -> Iterator[str]:
    yield distributed_text(*acting.load, system, signed=True)
    yield warmth_text(*acting.heat, system)
    yield fit_text(acting.fit, system)


def lane_rows(
    sketch: Sketch, wishes: list[list[Wish]], foot: float, room: float, *, labelled: bool
) -> tuple[tuple[Lane, ...], float]:
    """The lanes, the last of which ends at `foot`, and where the room of the member ends then.

    Where there is no room, labels give way before lanes, and the farthest first; without `labelled` there are
    no labels.
    """
    body = sketch.frame.measure("0", "strong")[1] + 2.0
    depths = [_label_rows(sketch, lane) if labelled else [] for lane in wishes]
    while depths and sum(body + sum(rows) + GAP for rows in depths) > SHARE * room:
        rows = next(filter(None, reversed(depths)), None)
        depths.pop() if rows is None else rows.pop()
    lanes: list[Lane] = []
    for rows in reversed(depths):
        foot -= GAP
        spans: list[Span] = []
        for depth in reversed(rows):
            spans.insert(0, (foot - depth, foot))
            foot -= depth
        foot -= CLOSE if rows else 0.0
        lanes.insert(0, Lane((foot - body, foot), tuple(spans)))
        foot -= body
    return tuple(lanes), foot - (GAP if lanes else 0.0)


def _label_rows(sketch: Sketch, wishes: list[Wish]) -> list[float]:
    """The depths of as many rows as the labels of a lane need; upright one column."""
    if not wishes:
        return []
    depth, count = max(wish.depth for wish in wishes), 1
    while not sketch.frame.upright and count < MOST_ROWS and not fits(wishes, count, sketch.room):
        count += 1
    return [depth] * count


# Drawing


def draw_companions(sketch: Sketch, wishes: list[list[Wish]]) -> None:
    """All companions in their lanes, the farthest first, so that nearer ones lie over their ties."""
    pieces = pieces_of(sketch)
    outers = [_outer(piece) for piece in pieces]
    if not pieces or not sketch.rows.lanes:
        sketch.picture.left_out += sum(map(len, wishes)) + len(pieces)
        return
    for lane in reversed(range(len(wishes))):
        if lane >= len(sketch.rows.lanes):
            sketch.picture.left_out += len(wishes[lane]) + sum(piece.lane == lane for piece in pieces)
            continue
        room = sketch.rows.lanes[lane]
        scale = 0.5 * (room.body[1] - room.body[0]) / max(outers)
        for piece in (one for one in pieces if one.lane == lane):
            _draw_ties(sketch, piece, room)
            if shown_of(sketch, piece) is not None:
                _draw_body(sketch, piece, room, scale)
        sketch.put(wishes[lane], room.labels, "low", STACKED if sketch.frame.upright else CLEAR)
    _draw_marks(sketch, pieces)


def _outer(piece: Piece) -> float:
    return max(outline(piece.of.segment.section, at).outer for at in (0.0, 1.0))


def _parts(piece: Piece) -> bool:
    """Whether the segment has the end at which its companion can part."""
    companion = piece.of.companion
    return companion.action != "both" and piece.of.number == len(companion.segments) - 1


def _body_ends(piece: Piece) -> tuple[float, float]:
    """Where the body begins and ends, short of a joint that it can part from."""
    start, end = piece.ends
    return (
        (start, end - min(PART / abs(end - start), 0.25) * (end - start)) if _parts(piece) else (start, end)
    )


def _draw_ties(sketch: Sketch, piece: Piece, room: Lane) -> None:
    """From the member's edge at a joint to the lane, with a plate at the end."""
    joints = joints_of(sketch.member, piece.of.companion)
    ends = ((0, joints[0]), (len(piece.of.companion.segments) - 1, joints[1]))
    for number, joint in ends:
        if piece.of.number != number or not sketch.holds(joint):
            continue
        along, (near, far) = sketch.along(joint), room.body
        edge = sketch.rows.axis + edge_at(sketch, joint)
        sketch.line((along, edge), (along, far), width=2.4, part=piece.part)
        if joint == joints[1] and piece.of.companion.action == "tension":
            _draw_slack(sketch, piece, 0.5 * (near + far))


def _draw_slack(sketch: Sketch, piece: Piece, middle: float) -> None:
    """A link that hangs through: what a rope is tied with."""
    (_, start), end = _body_ends(piece), piece.ends[1]
    sag = 0.5 * (start + end), middle + 5.0
    sketch.line((start, middle), sag, (end, middle), width=1.3, part=piece.part)


def _draw_body(sketch: Sketch, piece: Piece, room: Lane, scale: float) -> None:
    section, middle = piece.of.segment.section, 0.5 * (room.body[0] + room.body[1])
    bare = isinstance(section, AreaSection)
    fractions = [i / SAMPLES for i in range(SAMPLES + 1)] if bare else [0.0, 1.0]
    start, end = _body_ends(piece)
    halves = [
        (start + s * (end - start), max(outline(section, s).outer * scale, LEAST_HALF)) for s in fractions
    ]
    upper = [(along, middle - half) for along, half in halves]
    lower = [(along, middle + half) for along, half in reversed(halves)]
    fill: Fill = "band_fill" if bare else "body_fill"
    dash = (5.0, 3.0) if bare else ()
    sketch.line(*upper, *lower, width=1.3, fill=fill, closed=True, dash=dash, part=piece.part, clip=True)
    if isinstance(section, TubeSection):
        inner = [outline(section, s).inner * scale for s in (0.0, 1.0)]
        for side in (-1.0, 1.0):
            ends = [(a, middle + side * h) for a, h in zip((start, end), inner, strict=True)]
            sketch.line(*ends, ink="quiet", dash=(4.0, 3.0), clip=True)
    sketch.target(shown_of(sketch, piece) or (start, end), room.body, piece.part)


def _draw_marks(sketch: Sketch, pieces: list[Piece]) -> None:
    """The segments' marks in the middle of their bodies, where they fit."""
    lanes = sketch.rows.lanes
    for number, lane in enumerate(lanes):
        wishes = []
        for piece in pieces:
            span = shown_of(sketch, piece)
            if piece.lane == number and span is not None:
                part = Part("companion_mark", piece.index)
                wishes.append(
                    sketch.wish(piece.of.segment.mark, 0.5 * (span[0] + span[1]), part, face="strong")
                )
        placed = place(wishes, 1, sketch.room, TIGHT)
        sketch.picture.left_out += len(wishes) - len(placed)
        for label in placed:
            centre = sketch.point(label.wish.along, 0.5 * (lane.body[0] + lane.body[1]))
            size = sketch.frame.measure(label.wish.text, "strong")
            box = Box.around(centre, *size)
            corners = (box.left - 2.0, box.top), (box.right + 2.0, box.top)
            under = (box.right + 2.0, box.bottom), (box.left - 2.0, box.bottom)
            tag = Stroke((*corners, *under), "quiet", 0.8, closed=True, fill="paper")
            sketch.picture.strokes.append(tag)
            sketch.picture.texts.append(Text(box, label.wish.text, "strong", "ink", label.wish.part))


def companion_tip(member: Member, index: int) -> str:
    """Mark, section, length and material of a companion's segment, whose it is, and what acts on it."""
    of = beside(member.project)[index]
    first = tr("Segment {mark}: {section}, {length}, {material}").format(
        mark=of.segment.mark,
        section=section_text(of.segment.section, member.system),
        length=value_text(of.segment.length, "length", member.system),
        material=of.segment.material,
    )
    whole = tr("of companion {mark} beside joints {start} to {end}, {acts}").format(
        mark=of.companion.mark,
        start=of.companion.start,
        end=of.companion.end,
        acts=action_text(of.companion.action),
    )
    return "\n".join(filter(None, (first, whole, acting_text(member, index))))
