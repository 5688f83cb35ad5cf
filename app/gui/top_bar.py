"""The top bar: plain words for the commands used most, and the pickers Against, Show, Units, Lay."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QAction
from PySide6.QtWidgets import QFrame, QHBoxLayout, QLabel, QSizePolicy, QToolButton, QWidget

from app.gui.actions import COMMANDS, SEPARATOR
from app.gui.against import AgainstBar
from app.gui.folding import FoldingRow
from app.gui.picker import Picker
from app.gui.view import Shown
from app.units import SYSTEM_NAMES
from app.words import later, tr
from solver.model import Orientation, Project, UnitSystemName

LAYOUTS: tuple[tuple[Orientation, str], ...] = (
    ("horizontal", later("Across")),
    ("vertical", later("Upright")),
)


def shown_text(shown: Shown) -> str:
    """A state in words."""
    if shown.kind == "envelope":
        return tr("Envelope")
    if shown.kind == "case":
        return tr("Case {name}").format(name=shown.name)
    return shown.name if shown.kind == "combination" else tr("Unloaded")


class TopBar(QWidget):
    """Buttons and pickers."""

    show_picked = Signal(object)  # Shown
    units_picked = Signal(object)  # UnitSystemName
    layout_picked = Signal(object)  # Orientation

    def __init__(
        self, actions: Mapping[str, QAction], against: AgainstBar, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self.setObjectName("top_bar")
        self.setAttribute(Qt.WidgetAttribute.WA_StyledBackground)
        self._row = QHBoxLayout(self)
        self._row.setContentsMargins(10, 4, 10, 4)
        self._row.setSpacing(4)
        self.commands = FoldingRow()
        self._row.addWidget(self.commands, 1)
        self._add_buttons(actions)
        self._row.addWidget(against)
        self.show_picker = self._add_picker(tr("Show"), 16)
        self.units_picker = self._add_picker(tr("Units"), 12)
        self.layout_picker = self._add_picker(tr("Lay"), 8)
        self.show_picker.picked.connect(self.show_picked)
        self.units_picker.picked.connect(self.units_picked)
        self.layout_picker.picked.connect(self.layout_picked)

    def _add_buttons(self, actions: Mapping[str, QAction]) -> None:
        pending_rule = False
        for command in COMMANDS:
            if command is SEPARATOR or (command.key == "undo"):
                pending_rule = True
            if not command.bar:
                continue
            if pending_rule and not self.commands.is_empty:
                self.commands.add(_rule())
            pending_rule = False
            action = actions[command.key]
            self.commands.add(_button(action, tr(command.bar)), action)

    def _add_picker(self, name: str, digits: int) -> Picker:
        picker = Picker(name, digits)
        label = QLabel(name)
        label.setBuddy(picker)
        label.setObjectName("quiet")
        self._row.addSpacing(10)
        self._row.addWidget(label)
        self._row.addWidget(picker)
        return picker

    def show_project(self, project: Project, states: Sequence[Shown], shown: Shown) -> None:
        """Offer what the project has."""
        self.show_picker.offer([(state, shown_text(state)) for state in states], shown)
        self.units_picker.offer(
            [(name, units_text(name)) for name in SYSTEM_NAMES], project.display.unit_system
        )
        self.layout_picker.offer([(value, tr(words)) for value, words in LAYOUTS], project.display.layout)


def units_text(name: UnitSystemName) -> str:
    """A unit system as it is offered."""
    return name.replace("-", " · ")


def _button(action: QAction, words: str) -> QToolButton:
    button = QToolButton()
    button.setAutoRaise(True)
    button.setToolButtonStyle(Qt.ToolButtonStyle.ToolButtonTextOnly)
    # Never by Tab: a space meant for a cell would be the command. Each command is in a menu, too.
    button.setFocusPolicy(Qt.FocusPolicy.NoFocus)
    button.setText(words)
    button.setAccessibleName(words)
    button.setToolTip(action.toolTip())
    button.setEnabled(action.isEnabled())
    button.clicked.connect(action.trigger)

    def follow() -> None:
        button.setEnabled(action.isEnabled())
        button.setToolTip(action.toolTip())

    action.changed.connect(follow)
    return button


def _rule() -> QFrame:
    rule = QFrame()
    rule.setFrameShape(QFrame.Shape.VLine)
    rule.setObjectName("rule")
    rule.setSizePolicy(QSizePolicy.Policy.Fixed, QSizePolicy.Policy.Expanding)
    return rule
