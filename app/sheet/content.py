"""The whole sheet as plain JSON-able values: what is said, in which order; `sheet.typ` gives it its looks."""

from __future__ import annotations

from collections.abc import Iterator

from app.phrases import caution, verdict_detail, verdict_line
from app.sheet.basis import basis_blocks
from app.sheet.blocks import Block, Value, facts, heading, paragraph, picture
from app.sheet.figures import member_figure
from app.sheet.inputs import input_blocks
from app.sheet.notes import note_blocks
from app.sheet.outcomes import outcome_blocks, state_title
from app.sheet.printable import shortened
from app.sheet.proof import proof_blocks
from app.sheet.readings import Readings
from app.sheet.stability import stability_blocks
from app.sheet.title import Origin, title_block
from app.words import language, tr, trc
from solver.model import Project
from solver.results import Results


def sheet_content(project: Project, results: Results, origin: Origin) -> dict[str, Value]:
    """Everything on the sheet; strings may hold any characters and are made printable when it is built."""
    units = project.display.unit_system
    say = Readings(units)
    return {
        "language": language(),
        "kind": tr("Calc sheet, member under axial load"),
        "figure": tr("Figure"),
        "attachment": _attachment(origin),
        "paper": "us-letter" if units.startswith("in-") else "a4",
        "title_block": title_block(project, origin),
        "verdict": verdict_line(results),
        "verdict_detail": verdict_detail(results),
        "failed": results.verdict == "fail",
        "caution": caution(),
        "page": tr("Page {page} of {pages}"),
        "running": shortened(project.title or origin.file_name or tr("not saved"), 70),
        "program": origin.program,
        "blocks": list(_blocks(project, results, say)),
        "signs": [tr("Made by"), tr("Checked by"), tr("Released by")],
        "sign_columns": [tr("Name"), tr("Date"), tr("Signature")],
        "sign_title": tr("Sign-off"),
        "math": _math_words(),
    }


def _attachment(origin: Origin) -> str:
    if origin.changed:
        return tr("The project of this sheet, as printed")
    return tr("The project of this sheet, as saved")


def _math_words() -> dict[str, Value]:
    """The words in formulas: indices, and what stands between two of them."""
    return {
        "left": trc("index in a formula", "left"),
        "right": trc("index in a formula", "right"),
        "tension": trc("index in a formula", "t,allow"),
        "compression": trc("index in a formula", "c,allow"),
        "limit": trc("index in a formula", "limit"),
        "peak": trc("index in a formula", "peak"),
        "allow": trc("index in a formula", "allow"),
        "from": trc("index in a formula", "from"),
        "required": trc("index in a formula", "required"),
        "critical": trc("index in a formula", "critical"),
        "to": trc("index in a formula", "to"),
        "or": trc("between two formulas", "or"),
    }


def _blocks(project: Project, results: Results, say: Readings) -> Iterator[Block]:
    yield from _member(project, results, say)
    yield from input_blocks(results, say)
    yield from basis_blocks(project)
    yield from outcome_blocks(results, say)
    yield from stability_blocks(results, say)
    yield from proof_blocks(results, say)
    yield from note_blocks(results, say)


def _member(project: Project, results: Results, say: Readings) -> Iterator[Block]:
    yield heading(tr("Member"))
    state = _shown_state(results)
    figure = member_figure(project, results.position, results.loads, state)
    caption = tr("The member with the loads of: {state}. {note}")
    yield picture(figure, caption.format(state=state_title(results.states[state]), note=figure.note))
    yield facts(
        [
            (tr("Length"), say.plain(float(results.position[-1]), "length", unit=True)),
            (tr("Mass"), say.read(results.mass, "mass", unit=True)),
            (tr("Units"), _units(say)),
        ]
    )
    if project.notes:
        yield paragraph(project.notes)


def _shown_state(results: Results) -> int:
    """The state of the governing check, else the first."""
    name = results.governing.combination if results.governing else results.states[0].name
    return next(index for index, state in enumerate(results.states) if state.checked and state.name == name)


def _units(say: Readings) -> str:
    shown = (
        (tr("length"), "length"),
        (tr("section and displacement"), "size"),
        (tr("force"), "force"),
        (tr("stress"), "stress"),
        (tr("distributed load"), "distributed"),
    )
    return ", ".join(f"{name} {say.unit(quantity)}" for name, quantity in shown)  # type: ignore[arg-type]
