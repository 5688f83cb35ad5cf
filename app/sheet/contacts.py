"""Stops on the sheet: what each support of a joint does, where there are several or a stop; how stops act."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import chain

from app.contacts import has_stops
from app.sheet.blocks import Block, column, table
from app.sheet.joint_inputs import support_words
from app.sheet.readings import NOTHING, Readings
from app.words import tr
from solver.model import Project, StopSupport, supports_of
from solver.outcomes import Contact, support_outcomes
from solver.results import Results


def contact_blocks(results: Results, state: int, say: Readings) -> Iterator[Block]:
    """The table of supports that a joint's reaction alone does not tell; nothing where it does."""
    rows = list(chain.from_iterable(_rows(results, state, joint, say) for joint in _told(results)))
    if not rows:
        return
    columns = [
        column(tr("Joint"), align="left"),
        column(tr("Support"), align="left"),
        column(tr("Contact"), align="left"),
        column(tr("Force on the member"), say.unit("force")),
        column(tr("Clearance left"), say.unit("displacement")),
    ]
    yield table(tr("Supports one by one"), columns, rows)


def contact_word(contact: Contact | None) -> str:
    """Whether a stop is open or closed; a dash for another support."""
    return NOTHING if contact is None else tr("closed") if contact == "closed" else tr("open")


def _told(results: Results) -> Iterator[int]:
    for index, joint in enumerate(results.project.joints):
        supports = supports_of(joint)
        if len(supports) > 1 or any(isinstance(support, StopSupport) for support in supports):
            yield index


def _rows(results: Results, state: int, joint: int, say: Readings) -> Iterator[list[str]]:
    of = results.project.joints[joint]
    largest = abs(float(results.solution.reaction[state, joint]))
    for support, found in zip(supports_of(of), support_outcomes(results, state, joint), strict=True):
        left = NOTHING
        if found.contact == "open" and found.clearance is not None:
            left = say.read(found.clearance, "displacement")
        force = say.read(found.force, "force", beside=largest)
        yield [of.mark, support_words(support, say), contact_word(found.contact), force, left]


def stop_assumptions(project: Project) -> list[str]:
    """What holds for stops, as the basis says it; nothing without one."""
    if not has_stops(project):
        return []
    return [
        tr(
            "A stop only pushes. On side s = +1 or −1 with clearance c it leaves the joint free while"
            " s (u − δ) < c and is open; it is closed where it pushes with a force F > 0, and then"
            " s (u − δ) = c, plus F / k where it has a stiffness k."
        ),
        tr(
            "Which stops are closed is found exactly in every combination by itself: superposition is not"
            " valid, the results of load cases must not be added up. No factor applies to a clearance."
        ),
    ]
