"""Rows and blocks of the findings that lead to companions."""

from __future__ import annotations

from app.findings import findings
from app.gui.findings.content import blocks, rows
from app.shown import Shown
from solver.solve import solve
from tests.sleeves import overpulled

UNITS = "mm-N-MPa"


def test_rows_and_blocks_of_the_panel_lead_to_the_companion():
    found = findings(solve(overpulled()), UNITS)
    (note,) = [row for row in rows(found) if row.kind == "companion"]
    assert note.mark == "!"
    assert note.companions == {0, 1}
    assert note.leads_somewhere
    (block,) = [b for b in blocks(found, Shown("combination", "Pulled")) if "companions" in b.title]
    assert [(line.name, line.value[0]) for line in block.lines] == [("S", "−")]
