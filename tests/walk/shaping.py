"""First chapters of the walk: a bar becomes the stepped shaft, on the drawing."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from app.drawing.shapes import Part
from app.gui.title_block import TitleBlockDialog
from app.title_fields import TITLE_FIELDS
from solver.model import Project
from tests.gui.pointer import CTRL, LEFT, SHIFT
from tests.gui.windows import dialog_of
from tests.walk.hands import Hands
from tests.walk.steps import Steps

KEY = Qt.Key


def a_new_bar(hands: Hands, steps: Steps, sample: Project) -> None:
    """From nothing to one bar with its name on it."""
    hands.command("File", "New")
    steps.end("new", "File > New: one bar of steel, held at its start", undo=None)
    hands.pick(hands.window.top_bar.units_picker, "mm · kN · MPa")
    steps.end("units", "Units at the top: mm, kN, MPa")
    hands.command("File", "Title block")
    dialog = dialog_of(hands.window, TitleBlockDialog)
    fields = dialog.title, *(dialog.fields[key] for key, _words in TITLE_FIELDS)
    texts = sample.title, *(getattr(sample.sheet, key) for key, _words in TITLE_FIELDS)
    for field, text in zip(fields, texts, strict=True):
        QTest.mouseClick(field, LEFT)
        QTest.keyClicks(field, text)
    QTest.mouseClick(dialog.notes.viewport(), LEFT)
    QTest.keyClicks(dialog.notes, sample.notes)
    steps.end("title-block", "Title, job, author, revision, date and notes are filled in")
    dialog.accept()
    hands.activate()
    steps.end("title-block-taken", "OK", undo="Title block")


def the_first_segments(hands: Hands, steps: Steps) -> None:
    """A to E: typed in place, dragged, typed while dragged."""
    hands.double_click(hands.box_at(Part("length", 0)))
    steps.end("length-opened", "Double click on the length of the bar")
    hands.type("5x")
    steps.end("length-wrong", "A slip: 5x cannot be read", stale=True)
    hands.press(KEY.Key_Escape)
    steps.end("length-given-up", "Escape: as it was")
    hands.retype(Part("length", 0), "50")
    steps.end("length-typed", "Typed over: 50 mm", undo="Length of A")
    hands.retype(Part("section", 0), "d40")
    steps.end("section-typed", "Double click on the section, d40", undo="Section of A")
    after(hands, 0)
    steps.end("segment-added", "Ctrl+B: another segment behind the last", undo="Insert segment")
    hands.take("joint", 2, "end", 120)
    steps.end("joint-pulled", "The far joint is dragged; what is beyond it would move along")
    hands.press_sheet(KEY.Key_Escape)
    hands.pointer.let_go()
    steps.end("joint-escaped", "Escape: the length is as it was", undo="Insert segment")
    hands.drag_to("joint", 2, "end", 120, "85")
    steps.end("joint-typed", "Dragged again, 85 typed meanwhile", undo="Length of B")
    hands.take("edge", 1, "both", 12)
    steps.end("edge-pulled", "The edge of B is dragged in its middle")
    hands.pointer.let_go()
    steps.end("edge-let-go", "Let go: the value stays in hand", undo="Diameter of B")
    hands.type("45")
    steps.end("edge-typing", "45 typed afterwards for the exact value")
    hands.press(KEY.Key_Return)
    steps.end("edge-typed", "Enter: one step with the drag", undo="Diameter of B")
    after(hands, 1)
    hands.retype(Part("length", 2), "110")
    hands.reshape(2, "d55")
    steps.end("shaft-c", "Another segment, 110 mm of d55", undo="Section of C")
    after(hands, 2)
    hands.drag_to("joint", 4, "end", -30, "50")
    hands.take("edge", 3, "end", 12)
    steps.end("taper-pulled", "The edge of D is dragged near its end: a taper")
    hands.exact("80")
    steps.end("taper-typed", "80 typed while dragging", undo="Diameter of D")
    after(hands, 3)
    hands.retype(Part("length", 4), "130")
    steps.end("shaft-e", "E goes on with the 80 mm of the taper's end, 130 mm", undo="Length of E")


def after(hands: Hands, segment: int) -> None:
    """Select a segment on the drawing, and insert one behind it."""
    hands.click(hands.middle(segment))
    hands.press(KEY.Key_B, CTRL)


def zoom_to(hands: Hands, segment: int) -> None:
    """Let a segment fill the sheet: the ends of a short one are too near each other to take one of them."""
    hands.click(hands.middle(segment, 0.25))
    hands.press(KEY.Key_9, CTRL)


def the_worm(hands: Hands, steps: Steps) -> None:
    """E to G: one segment repeated, the middle one shaped by dragging."""
    hands.click(hands.middle(4))
    hands.press(KEY.Key_R, CTRL)
    hands.type("2")
    steps.end("repeat-asked", "Ctrl+R on E: how many times? The drawing shows it meanwhile")
    hands.press(KEY.Key_Return)
    steps.end("repeated", "Twice: F and G like E", undo="Repeat segments")
    hands.take("joint", 6, "end", 40, SHIFT)
    steps.end("total-stays", "The joint behind F dragged with Shift: the total stays")
    hands.pointer.let_go(SHIFT)
    steps.end("total-stayed", "Let go", undo="Length of F")
    hands.press(KEY.Key_Z, CTRL)
    steps.end("undone", "Ctrl+Z", undo="Repeat segments")
    hands.press(KEY.Key_Z, CTRL | SHIFT)
    steps.end("redone", "Ctrl+Shift+Z", undo="Length of F")
    hands.press(KEY.Key_Z, CTRL)
    hands.drag_to("joint", 6, "end", 60, "380")
    steps.end("worm-long", "Undone again, and dragged without Shift to 380", undo="Length of F")
    hands.drag_to("edge", 5, "both", 14, "96")
    steps.end("worm-thick", "Its edge to 96", undo="Diameter of F")


def the_hollow_end(hands: Hands, steps: Steps) -> None:
    """H and I: a tube, a joint put in by the menu, edges and bore to a taper."""
    after(hands, 6)
    hands.retype(Part("length", 7), "370")
    hands.reshape(7, "d80 bore 45")
    steps.end("tube", "H: 370 mm, typed as d80 bore 45", undo="Section of H")
    menu = hands.open_menu(hands.middle(7, 0.7))
    steps.end("menu", "The right mouse button on H")
    hands.choose(menu, "Insert joint here")
    steps.end("joint-inserted", "Insert joint here: H and I", undo="Insert joint")
    hands.retype(Part("length", 7), "290")
    hands.retype(Part("length", 8), "80")
    steps.end("tube-lengths", "Their lengths typed, 290 and 80", undo="Length of I")
    zoom_to(hands, 8)
    hands.drag_to("edge", 8, "end", -14, "60")
    steps.end("outside-taper", "The edge of I near its end, 60", undo="Outside diameter of I")
    hands.take("bore", 8, "end", -12)
    steps.end("bore-pulled", "And its bore, the dashed line")
    hands.exact("25")
    hands.press(KEY.Key_0, CTRL)
    steps.end("bore-taper", "25", undo="Inside diameter of I")


def the_marks_in_order(hands: Hands, steps: Steps) -> None:
    """Joints put in later have the next free mark; in the table of joints they get the one of their place."""
    hands.tab(2)
    marks = [str(place) for place in range(len(hands.window.document.project.joints))]
    hands.enter("joints", 5, "mark", *(f"n{mark}" for mark in marks[5:]))
    hands.enter("joints", 5, "mark", *marks[5:])
    steps.end("marks", "The joints numbered along the member, in their table", undo=f"Mark of n{marks[-1]}")
    hands.tab(1)


def the_far_end(hands: Hands, steps: Steps) -> None:
    """J to L: a round bar again, three alike, one of them tapered."""
    after(hands, 8)
    hands.retype(Part("length", 9), "150")
    hands.reshape(9, "d60")
    steps.end("shaft-j", "J: 150 mm of d60", undo="Section of J")
    hands.click(hands.middle(9))
    hands.press(KEY.Key_R, CTRL)
    hands.type("2")
    hands.press(KEY.Key_Return)
    hands.retype(Part("length", 10), "95")
    steps.end(
        "two-at-once",
        "J twice more; both are selected, a length typed is for both",
        undo="Length of K, for 2 segments",
    )
    zoom_to(hands, 10)
    hands.take("edge", 10, "end", -14)
    steps.end("zoomed-to-taper", "Ctrl+9 on K, for its ends are too near each other: now one is dragged")
    hands.exact("45")
    hands.press(KEY.Key_0, CTRL)
    hands.drag_to("joint", 11, "end", -12, "50")
    hands.reshape(11, "d45")
    steps.end("shaft-whole", "K tapers to 45 over 50 mm, L is d45", undo="Section of L")
