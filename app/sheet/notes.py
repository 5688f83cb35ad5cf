"""What a reader must know beside the numbers: what this version does not cover, and the numerical error."""

from __future__ import annotations

from collections.abc import Iterator

from app.phrases import numerical_error_sentence
from app.phrases.checks import has_compression
from app.phrases.notes import BEDDING, BUCKLING
from app.sheet.blocks import Block, bullets, heading
from app.words import tr
from solver.results import Results


def note_blocks(results: Results) -> Iterator[Block]:
    """The closing chapter before the sign-off."""
    yield heading(tr("Notes"))
    yield bullets(list(_notes(results)))


def _notes(results: Results) -> Iterator[str]:
    if has_compression(results.checks):
        yield tr(BUCKLING)
    if results.chain.bedding.any():
        yield tr(BEDDING)
    checked = [index for index, state in enumerate(results.states) if state.checked]
    yield numerical_error_sentence(float(results.solution.error_bound[checked].max()))
    yield tr(
        "The project file this sheet was made from is attached to this PDF; its SHA-256 is on the first page."
    )
