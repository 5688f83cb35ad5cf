"""What a reader must know beside numbers and checks: assumptions that may not hold, the numerical error."""

from __future__ import annotations

from collections.abc import Iterator

from app.findings import findings
from app.sheet.blocks import Block, bullets, heading
from app.sheet.readings import Readings
from app.words import tr
from solver.results import Results


def note_blocks(results: Results, say: Readings) -> Iterator[Block]:
    """The closing chapter before the sign-off."""
    found = findings(results, say.units)
    yield heading(tr("Notes"))
    yield bullets(
        [
            *found.notes,
            found.numerical_error,
            tr("The project of this sheet is attached to this PDF; its SHA-256 stands on the first page."),
        ]
    )
