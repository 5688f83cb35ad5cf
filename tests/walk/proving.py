"""Chapters of the walk on what is proved: combinations and limits in their tables, findings beside them."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from tests.gui.pointer import CTRL, LEFT, SHIFT
from tests.walk.hands import Hands
from tests.walk.steps import Steps

KEY = Qt.Key


def combinations(hands: Hands, steps: Steps) -> None:
    """Which cases act together."""
    hands.tab(4)
    hands.enter("combinations", 0, "name", "Cold start", "Warm running", "Warm, brake snatch")
    steps.end("combinations-named", "Three combinations; each begins with every case")
    hands.cell("combinations", 0, "factor of Warm")
    hands.press(KEY.Key_Delete)
    hands.cell("combinations", 0, "factor of Brake snatch")
    hands.press(KEY.Key_Down, SHIFT)
    hands.press(KEY.Key_Delete)
    hands.enter("combinations", 2, "factor of Hoisting", "-0.35")
    hands.enter("combinations", 2, "factor of Brake snatch", "1.2")
    hands.enter("combinations", 2, "allowable_factor", "1.15")
    steps.end("factors", "Cases that take no part deleted, other factors typed")


def limits(hands: Hands, steps: Steps) -> None:
    """How far a joint may go and what the bearings may take."""
    hands.tab(6)
    hands.enter("limits displacement", 0, "joint", "6")
    steps.end("limit-begun", "A limit for joint 6: until its number is typed it does not pass")
    hands.enter("limits displacement", 0, "limit", "0.6")
    hands.enter("limits relative", 0, "start", "5 -> 6")
    hands.enter("limits relative", 0, "limit", "0.3")
    hands.enter("limits reaction", 0, "joint", "1", "12")
    hands.enter("limits reaction", 0, "limit", "240", "220")
    steps.end("limits", "Displacements and reactions are limited")
    hands.enter("limits stability", 0, "stability_factor", "3")
    hands.tab(2)
    hands.enter("joints", 1, "lateral_translation", "fixed")
    hands.enter("joints", 12, "lateral_translation", "fixed")
    steps.end("stability", "Both bearings hold the shaft sideways: stability is checked, the shaft is whole")
    hands.tab(1)


def findings(hands: Hands, steps: Steps) -> None:
    """Some of them, and the cell behind one."""
    marks = hands.window.findings.filter.marks
    QTest.mouseClick(marks, LEFT)
    hands.type("F, G")
    steps.end("findings-filtered", "Findings of F and G alone")
    hands.press(KEY.Key_A, CTRL | SHIFT)
    steps.end("findings-all", "Ctrl+Shift+A: all findings again")


def against_before(hands: Hands, steps: Steps) -> None:
    """A reference is kept, a diameter swept, held against it and taken back."""
    hands.press(KEY.Key_K, CTRL)
    steps.end("reference-asked", "Ctrl+K: a name for these results")
    hands.type_over("As drawn")
    steps.end("reference-kept", "As drawn: kept")
    hands.turn_wheel(hands.section_label(5), 6, CTRL)
    steps.end("swept", "Ctrl and the wheel over the section of the worm: it grows, all follows")
    QTest.keyRelease(hands.sheet, KEY.Key_Control)
    steps.end("sweep-taken", "Ctrl let go: one step", undo="Section of F")
    hands.press(KEY.Key_Z, CTRL)
    steps.end("sweep-undone", "Ctrl+Z")
    hands.press(KEY.Key_K, CTRL | SHIFT)
    steps.end("reference-forgotten", "Ctrl+Shift+K: forgotten")
