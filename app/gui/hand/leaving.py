"""When the loss of the keyboard means that a field is left: not for a menu of its own, nor another window."""

from __future__ import annotations

from PySide6.QtCore import QEvent, Qt
from PySide6.QtGui import QFocusEvent

PASSING = (Qt.FocusReason.PopupFocusReason, Qt.FocusReason.ActiveWindowFocusReason)


def keyboard_is_gone(event: QEvent) -> bool:
    """Whether the field that lost the keyboard has been left for another one."""
    return not (isinstance(event, QFocusEvent) and event.reason() in PASSING)
