"""Companions on paper: what was entered, their forces in a state, and the clamp force that is left."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from app.action_entry import action_text
from app.beside import beside
from app.findings import findings
from app.sheet.blocks import Block, bullets, column, heading, table
from app.sheet.readings import NOTHING, Readings
from app.sheet.section_words import area_words, section_words
from app.words import tr
from solver.model import Companion, Project
from solver.results import CompanionResults, Results


def companion_inputs(project: Project, say: Readings) -> Iterator[Block]:
    """The companions with their segments, where there are any."""
    if not project.companions:
        return
    columns = [
        column(tr("Companion"), align="left"),
        column(tr("From – to"), align="left"),
        column(tr("Acts"), align="left"),
        column(tr("Segment"), align="left"),
        column(tr("Length"), say.unit("length")),
        column(tr("Section"), say.unit("size"), align="left"),
        column(tr("Area"), say.unit("area")),
        column(tr("Material"), align="left"),
    ]
    rows = [
        [
            *_own(of.companion, first=of.number == 0),
            of.segment.mark,
            say.exact(of.segment.length, "length"),
            section_words(of.segment.section, say),
            area_words(of.segment.section, say),
            of.segment.material,
        ]
        for of in beside(project)
    ]
    yield table(tr("Companions beside the member, each along +x"), columns, rows)


def _own(companion: Companion, *, first: bool) -> list[str]:
    """What is the whole companion's, in its first row alone."""
    if not first:
        return ["", "", ""]
    return [companion.mark, f"{companion.start} – {companion.end}", action_text(companion.action)]


def companion_forces(results: Results, index: int, say: Readings) -> Iterator[Block]:
    """The forces of one state, where there are companions."""
    found = results.companions
    if found is None:
        return
    columns = [
        column(tr("Companion"), align="left"),
        column(tr("N at start"), say.unit("force")),
        column(tr("N at end"), say.unit("force")),
        column(tr("Far end"), align="left"),
        column(tr("Gap"), say.unit("displacement")),
    ]
    largest = float(np.max(np.abs([found.force_from[index], found.force_to[index]])))
    rows = [
        [
            companion.mark,
            say.read(float(found.force_from[index, at]), "force", beside=largest),
            say.read(float(found.force_to[index, at]), "force", beside=largest),
            *_far_end(found, index, at, companion, say),
        ]
        for at, companion in enumerate(results.project.companions)
    ]
    yield table(tr("Companions: axial force, and whether the far end has parted"), columns, rows)


def _far_end(found: CompanionResults, index: int, at: int, companion: Companion, say: Readings) -> list[str]:
    if companion.action == "both":
        return [tr("tied"), NOTHING]
    if not found.separated[index, at]:
        return [tr("taut") if companion.action == "tension" else tr("pressed"), NOTHING]
    words = tr("slack") if companion.action == "tension" else tr("separated")
    return [words, say.read(float(found.gap[index, at]), "displacement")]


def clamp_blocks(results: Results, say: Readings) -> Iterator[Block]:
    """The least clamp force of each companion that can part, over the checked states."""
    said = [one.sentence for one in findings(results, say.units).companions if one.sentence]
    if said:
        yield heading(tr("Clamp force left in companions"), 2)
        yield bullets(said)
