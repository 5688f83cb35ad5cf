"""Chapters of the walk that look at the whole: states, colours, displaced shape, zoom, the other lay."""

from __future__ import annotations

from PySide6.QtCore import Qt

from tests.gui.pointer import CTRL
from tests.walk.hands import Hands, said
from tests.walk.steps import Steps

KEY = Qt.Key


def results_on_the_drawing(hands: Hands, steps: Steps) -> None:
    """States, colours and the displaced shape."""
    hands.pick(hands.window.top_bar.show_picker, "Envelope")
    steps.end("envelope", "Show: the envelope")
    hands.pick(hands.window.top_bar.show_picker, "Warm running")
    steps.end("warm-running", "Show: Warm running")
    hands.command("View", "Drawing", "Colour: axial force")
    steps.end("force-as-colour", "View > Drawing: coloured by axial force")
    hands.command("View", "Drawing", "Displaced shape")
    steps.end("displaced-shape", "And the displaced shape")
    hands.hover(hands.joint(6))
    steps.end("over-a-joint", "The cursor at joint 6: both sides of it in the readout")


def near_and_far(hands: Hands, steps: Steps) -> None:
    """Zoom to some segments and back."""
    hands.click(hands.middle(2, 0.25))
    hands.press(KEY.Key_Right, CTRL)
    hands.press(KEY.Key_9, CTRL)
    steps.end("zoomed", "C selected, Ctrl+9: it fills the sheet")
    hands.press(KEY.Key_0, CTRL)
    steps.end("whole-again", "Ctrl+0: the whole member")
    hands.command("View", "Drawing", "No colour")
    hands.command("View", "Drawing", "Displaced shape")


def both_ways(hands: Hands, steps: Steps) -> None:
    """The other way round, and across as the sample lies."""
    picker = hands.window.top_bar.layout_picker
    for text, slug in (("Upright", "whole-upright"), ("Across", "whole-across")):
        if picker.currentText() != said(text):
            hands.pick(picker, text)
            steps.end(slug, f"Lay: {text.lower()}", undo="Lay")
