"""What the panel lists, row by row, from `app.findings`: no window, no words of its own but headings."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass, replace
from typing import Literal, TypeAlias

from app.findings import (
    Band,
    Change,
    CompanionFinding,
    Comparison,
    ContactFinding,
    Findings,
    LimitFinding,
    NotMade,
    SegmentFinding,
    StateBooks,
)
from app.findings.subjects import Subject, SubjectKind
from app.gui.view import Shown
from app.hand.cells import Cell
from app.units import unbroken
from app.words import tr

Tone: TypeAlias = Literal["pass", "fail", "not_made", "problem", "note"]
RowKind: TypeAlias = SubjectKind | Literal["fails", "not_made", "contact", "companion", "note", "problem"]


@dataclass(frozen=True, slots=True)
class Row:
    """One finding: what it says, and where choosing it leads (nowhere where there is no index)."""

    tone: Tone
    kind: RowKind
    mark: str
    text: str
    spoken: str  # the whole sentence, for those who hear it
    value: str = ""
    remedy: str = ""
    band: Band | None = None
    band_named: bool = False  # whether the ends of the scale carry their numbers
    position: float | None = None
    segments: frozenset[int] = frozenset()
    joints: frozenset[int] = frozenset()
    companions: frozenset[int] = frozenset()  # among the segments of all companions
    marks: frozenset[str] = frozenset()  # of the segments and joints it is about
    about: Subject | NotMade | Cell | None = None

    @property
    def leads_somewhere(self) -> bool:
        """Whether choosing the row shows something."""
        return bool(self.segments or self.joints or self.companions)


@dataclass(frozen=True, slots=True)
class Line:
    """One line of a block: a name and a value."""

    name: str
    value: str
    quiet: bool = False


@dataclass(frozen=True, slots=True)
class Block:
    """A heading and its lines."""

    title: str
    lines: tuple[Line, ...]


def rows(findings: Findings) -> tuple[Row, ...]:
    """Checks, the worst first, what was not checked, what stops do, what the calculation does not say."""
    found = [*map(_segment_row, findings.segments), *map(_limit_row, findings.limits)]
    checked = sorted(found, key=lambda pair: -pair[0])
    not_made = [_not_made_row(item) for item in findings.not_made]
    beside = [_companion_row(item) for item in findings.companions if item.sentence]
    notes = [Row("note", "note", "!", unbroken(text), text) for text in findings.notes]
    contacts = map(_contact_row, findings.contacts)
    return with_named_scales((*(row for _, row in checked), *not_made, *contacts, *beside, *notes))


def with_named_scales(listed: Iterable[Row]) -> tuple[Row, ...]:
    """The rows as they are listed: a scale's numbers stand only where they differ from those above."""
    found: list[Row] = []
    above: tuple[str, str] | None = None
    for row in listed:
        if row.band is None:
            found.append(row)
            continue
        ends = row.band.compression_text, row.band.tension_text
        found.append(replace(row, band_named=ends != above))
        above = ends
    return tuple(found)


def _segment_row(item: SegmentFinding) -> tuple[float, Row]:
    row = Row(
        tone=item.status,
        kind="stress",
        marks=frozenset(item.subject.marks),
        about=item.subject,
        mark=item.mark,
        text=unbroken(item.short),
        spoken=item.sentence,
        value=item.utilisation_text,
        band=item.band,
        position=item.position,
        segments=frozenset(() if item.beside else (item.segment,)),
        companions=frozenset((item.segment,) if item.beside else ()),
    )
    return item.utilisation, row


def _limit_row(item: LimitFinding) -> tuple[float, Row]:
    row = Row(
        tone=item.status,
        kind=item.subject.kind,
        marks=frozenset(item.subject.marks),
        about=item.subject,
        mark="",
        text=unbroken(item.sentence),
        spoken=item.sentence,
        value=item.utilisation_text,
        position=item.position,
        segments=frozenset(item.segments),
        joints=frozenset(item.joints),
        companions=frozenset(item.companions),
    )
    return item.utilisation, row


def _not_made_row(item: NotMade) -> Row:
    return Row(
        tone="not_made",
        kind="not_made",
        marks=frozenset(item.marks),
        about=item,
        mark="!",
        text=unbroken(item.sentence),
        spoken=f"{item.sentence}. {item.remedy}",
        remedy=item.remedy,
        segments=frozenset(item.segments),
        joints=frozenset(item.joints),
        companions=frozenset(item.companions),
    )


def _companion_row(item: CompanionFinding) -> Row:
    """What remains of a clamping; a companion that has parted wears the sign of what is to be looked at."""
    return Row(
        tone="note",
        kind="companion",
        mark="!" if item.parts else item.mark,
        text=unbroken(item.sentence),
        spoken=item.sentence,
        value="" if item.parts else item.clamp_text,
        position=item.position,
        companions=frozenset(item.segments),
        marks=frozenset((item.mark,)),
    )


def _contact_row(item: ContactFinding) -> Row:
    return Row(
        tone="note",
        kind="contact",
        marks=frozenset((item.mark,)),
        about=Cell("joints", item.joint, "support"),
        mark="",
        text=unbroken(item.sentence),
        spoken=item.sentence,
        position=item.position,
        joints=frozenset((item.joint,)),
    )


def problem_rows(problems: tuple[str, ...]) -> tuple[Row, ...]:
    """Why there are no results."""
    return tuple(Row("problem", "problem", "!", unbroken(text), text) for text in problems)


def blocks(findings: Findings, shown: Shown) -> tuple[Block, ...]:
    """Reactions of the shown state (of all for the envelope), displacements, the rest of the books."""
    chosen = [b for b in findings.books if (b.kind, b.name) == (shown.kind, shown.name)]
    reactions = [_reactions(book) for book in chosen or findings.books]
    moved = tuple(
        Line(tr("joint {mark}, {state}").format(mark=m.mark, state=m.state), m.text)
        for m in findings.displacements
    )
    beside = _companions(findings, shown)
    rest = Block(tr("Largest displacements"), moved), _rest(findings, chosen or findings.books)
    return (*reactions, *beside, *rest)


def overall_block(compared: Comparison) -> Block:
    """What has changed as a whole against a reference, and what could not be compared."""
    lines = (*map(_change, compared.overall), *(_change(note, quiet=True) for note in compared.notes))
    return Block(tr("Against {name}").format(name=compared.name), lines)


def detail_blocks(compared: Comparison) -> tuple[Block, ...]:
    """The displacements and reactions that changed most against a reference."""
    parts = (
        (tr("Displacements against {name}"), compared.displacements),
        (tr("Reactions against {name}"), compared.reactions),
    )
    nothing = (Line(tr("none has changed"), "", quiet=True),)
    return tuple(
        Block(title.format(name=compared.name), tuple(_two_lines(changes)) or nothing)
        for title, changes in parts
    )


def _two_lines(changes: tuple[Change, ...]) -> Iterator[Line]:
    """A place and two values are too long for one line of a narrow panel."""
    for change in changes:
        yield Line(change.name, "", quiet=True)
        yield Line("", change.text)


def _change(change: Change, *, quiet: bool = False) -> Line:
    return Line(change.name, change.text, quiet=quiet)


def _reactions(book: StateBooks) -> Block:
    lines = []
    for reaction in book.reactions:
        lines.append(Line(tr("joint {mark}").format(mark=reaction.mark), reaction.text))
        lines += [Line(part.name, part.text, quiet=True) for part in reaction.parts]
    lines.append(Line(tr("loads"), book.loads_text, quiet=True))
    if book.bedding_text:
        lines.append(Line(tr("bedding"), book.bedding_text, quiet=True))
    lines.append(Line(tr("sum of all forces"), book.residual_text, quiet=True))
    return Block(tr("Reactions, {state}").format(state=book.name), tuple(lines))


def _companions(findings: Findings, shown: Shown) -> tuple[Block, ...]:
    """The forces of the companions in the shown state; in every checked one for the envelope."""
    states = list(dict.fromkeys((s.kind, s.name) for one in findings.companions for s in one.states))
    chosen = [state for state in states if state == (shown.kind, shown.name)] or states
    return tuple(
        Block(
            tr("Force in companions, {state}").format(state=name),
            tuple(
                Line(one.mark, s.text)
                for one in findings.companions
                for s in one.states
                if (s.kind, s.name) == (kind, name)
            ),
        )
        for kind, name in chosen
    )


def _rest(findings: Findings, books: tuple[StateBooks, ...] | list[StateBooks]) -> Block:
    lines = [Line(tr("strain energy, {state}").format(state=b.name), b.strain_text) for b in books]
    return Block(tr("Energy and mass"), (*lines, Line(tr("mass"), findings.mass_text)))
