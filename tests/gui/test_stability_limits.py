"""The row of stability in the Limits tab, typed into on the real window."""

from __future__ import annotations

from app.samples import read_sample
from solver.model import Waiver
from tests.gui.windows import solved
from tests.walk.hands import Hands


def test_factor_and_waiver_are_typed_and_cleared(qtbot, window):
    window.document.load(read_sample("quay_pile"), None)
    solved(qtbot, window)
    hands = Hands(window)
    hands.tab(6)
    hands.enter("limits stability", 0, "stability_factor", "5")
    assert window.document.project.limits.stability_factor == 5.0
    hands.enter("limits stability", 0, "waived", "held by the ground")
    assert window.document.project.limits.waived == (Waiver("stability", "held by the ground"),)
    solved(qtbot, window)
    assert window.showing.outcome.findings.headline == "Passes"  # what is checked needs no waiver
    hands.tab(2)
    for joint in range(6):
        hands.enter("joints", joint, "lateral_translation", "free")
    solved(qtbot, window)
    assert window.showing.outcome.findings.headline == "Passes; stability waived"
    hands.enter("joints", 1, "lateral_translation", "20 kN/mm")
    assert window.document.project.joints[1].lateral.translation == 2e7


def test_a_factor_below_one_would_pass_a_member_that_buckles_and_is_refused(qtbot, window):
    window.document.load(read_sample("loft_column"), None)
    solved(qtbot, window)
    hands = Hands(window)
    hands.tab(6)
    hands.enter("limits stability", 0, "stability_factor", "0.5")
    assert window.document.project.limits.stability_factor == 4.0
    qtbot.waitUntil(lambda: "must be at least 1" in window.status.solver.text())
    assert not window.showing.current  # what stands beside the entry is said to be out of date
