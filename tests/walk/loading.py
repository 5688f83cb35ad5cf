"""Chapters of the walk on what holds and loads the shaft: symbols, menus, keys, dragged arrows, tables."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QApplication

from app.drawing.shapes import Part
from tests.gui.pointer import CTRL
from tests.walk.hands import Hands
from tests.walk.steps import Steps

KEY = Qt.Key
HEAT = (
    "8",
    "8->12",
    "12->20",
    "20->24",
    "24->34",
    "34->38",
    "38->30",
    "30->18",
    "18->16",
    "16->12",
    "12->11",
    "11->8",
)
WORM, WORM_START = 5, 5  # its segment, and its first joint


def materials(hands: Hands, steps: Steps) -> None:
    """The steel gets its name and what the code allows; it is in every segment by its name."""
    hands.tab(5)
    hands.enter("materials", 0, "name", "C45")
    steps.end("material-named", "The steel is called C45, in every segment too", undo="Name of Steel")
    hands.enter("materials", 0, "allowable_tension", "160")
    hands.enter("materials", 0, "allowable_compression", "140")
    steps.end("allowables", "Its allowable stresses")
    hands.tab(1)


def bearings(hands: Hands, steps: Steps) -> None:
    """Two springs, one by the strip of symbols, one by the menu; the first end is set free by a key."""
    hands.click(hands.on_paper())
    hands.symbol("spring")
    hands.hover(hands.joint(1))
    steps.end("spring-in-hand", "The spring of the strip of symbols, over joint 1")
    hands.click(hands.joint(1))
    steps.end(
        "spring-put-on", "A click puts it on; its stiffness waits to be typed", undo="Put on: Spring support"
    )
    hands.type_over("spring 600 kN/mm")
    steps.end("spring-typed", "600 kN/mm")
    menu = hands.open_menu(hands.joint(12))
    hands.choose(menu, "Put on", "Spring support")
    hands.type_over("spring 450 kN/mm")
    steps.end("spring-by-menu", "The far bearing by the menu at joint 12")
    hands.click(hands.joint(0))
    hands.press(KEY.Key_R)
    steps.end("set-free", "Joint 0 selected, R: free", undo="Take the support off")


def hoisting(hands: Hands, steps: Steps) -> None:
    """A force dragged and typed, a distributed load by the menu, dragged and typed."""
    hands.symbol("force")
    hands.click(hands.joint(0))
    steps.end(
        "force-put-on",
        "The force of the strip of symbols, clicked on joint 0: a load case is made for it",
        undo="Put on: Force at a joint",
    )
    hands.type_over("2")
    hands.take("force", 0, "both", -110)
    steps.end("force-pulled", "Its arrow is dragged through nothing to the other side")
    hands.exact("-6")
    steps.end("force-typed", "-6 typed meanwhile")
    hands.tab(3)
    hands.enter("load_cases", 0, "name", "Hoisting")
    hands.tab(1)
    menu = hands.open_menu(hands.middle(WORM, 0.25))
    hands.choose(menu, "Put on", "Distributed load")
    hands.type_over("-500 kN/m")
    steps.end("load-by-menu", "A distributed load on the worm by its menu, -500 kN/m")
    hands.drag_to("distributed", WORM, "start", 14, "-560")
    hands.take("distributed", WORM, "end", -14)
    steps.end("load-pulled", "Its edge dragged at the start, typed -560, and at the end")
    hands.exact("-400")
    steps.end("load-typed", "-400 typed")


def running_warm(hands: Hands, steps: Steps) -> None:
    """A case of temperatures for all segments at once, then pasted from a spreadsheet; a bearing moves."""
    hands.tab(3)
    hands.enter("load_cases", 1, "name", "Warm", "Brake snatch", "Weight")
    steps.end("cases", "Three more load cases")
    hands.tab(1)
    hands.edit_loads_of("Warm")
    hands.click(hands.on_paper())
    hands.press(KEY.Key_A, CTRL)
    hands.press(KEY.Key_T)
    steps.end(
        "warmth-on-all", "Ctrl+A, T: a temperature rise on all segments", undo="Put on: Temperature rise"
    )
    hands.type_over("25")
    steps.end("warmth-for-all", "25 K typed for all of them")
    QApplication.clipboard().setText("\n".join(HEAT))
    hands.cell("segments", 1, "heat")
    hands.press(KEY.Key_V, CTRL)
    steps.end("warmth-pasted", "The rise of each segment pasted from a spreadsheet", undo="Paste")
    hands.symbol("movement")
    hands.click(hands.joint(12))
    hands.type_over("0.08")
    steps.end("movement", "The far bearing moves by 0.08 mm")


def braking_and_weight(hands: Hands, steps: Steps) -> None:
    """The last two cases: a load by its key and by dragging, gravity by its symbol."""
    hands.edit_loads_of("Brake snatch")
    hands.click(hands.middle(WORM, 0.25))
    hands.press(KEY.Key_D)
    hands.type_over("300")
    hands.drag_to("distributed", WORM, "end", 16, "420")
    steps.end("brake", "D on the worm, 300 typed, its end dragged and typed to 420")
    hands.edit_loads_of("Weight")
    hands.symbol("weight")
    hands.type_over("0.8144")
    steps.end("weight", "Gravity along the slip by its symbol")
    hands.double_click(hands.box_at(Part("gravity", 0)))
    hands.press(KEY.Key_Escape)
    steps.end("weight-looked-at", "A double click opens it again; Escape leaves it")
