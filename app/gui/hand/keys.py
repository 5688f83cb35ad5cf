"""The keys of the hand in one table: what they do on the sheet, for the code and for the help alike."""

from __future__ import annotations

from typing import Final

from PySide6.QtCore import Qt

from app.words import later

NEXT_HANDLE: Final = Qt.Key.Key_H  # with Shift the one before
GIVE_UP: Final = Qt.Key.Key_Escape
NUDGE: Final = Qt.KeyboardModifier.AltModifier
NUDGE_COARSE: Final = NUDGE | Qt.KeyboardModifier.ShiftModifier
TOTAL_STAYS: Final = Qt.Key.Key_Shift
FREE: Final = Qt.Key.Key_Control

# The unit vector (x, y) of each arrow on the sheet
ARROWS: Final = {
    Qt.Key.Key_Left: (-1.0, 0.0),
    Qt.Key.Key_Right: (1.0, 0.0),
    Qt.Key.Key_Up: (0.0, -1.0),
    Qt.Key.Key_Down: (0.0, 1.0),
}

HAND_KEYS: Final[tuple[tuple[str, str], ...]] = (
    (later("H, Shift+H"), later("Take the next or previous handle of what is selected in hand")),
    ("Alt+← → ↑ ↓", later("Nudge the handle in hand by a step, or the selected segment's length and size")),
    (later("Alt+Shift+← → ↑ ↓"), later("Nudge by ten steps")),
    ("0 … 9", later("While or after something is dragged or nudged: type its exact value, Enter takes it")),
    (later("Shift"), later("While a joint is dragged: the total stays, the next segment gives")),
    (later("Ctrl"), later("While something is dragged: free of the round steps")),
    ("Esc", later("While something is dragged or typed: as it was before")),
)
