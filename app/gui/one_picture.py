"""A step of a pull is one picture: the sheet waits a moment for the results that follow, and paints once.

Most results are there within the moment, and painting the sheet twice takes longer than they do. Where they
take longer the drawing goes ahead, so that what is pulled stays under the pointer.
"""

from __future__ import annotations

from PySide6.QtCore import QObject, Qt, QTimer
from PySide6.QtWidgets import QGraphicsView

MOMENT = 8  # ms, half a frame


class OnePicture(QObject):
    """Keeps a view from painting what changes, for a moment at most."""

    def __init__(self, view: QGraphicsView) -> None:
        super().__init__(view)
        self._view = view
        self._mode = view.viewportUpdateMode()
        self._moment = QTimer(self)
        self._moment.setSingleShot(True)
        self._moment.setTimerType(Qt.TimerType.PreciseTimer)
        self._moment.setInterval(MOMENT)
        self._moment.timeout.connect(self.paint)

    @property
    def waits(self) -> bool:
        """Whether changes are kept back."""
        return self._moment.isActive()

    def wait(self) -> None:
        """What changes now belongs together with the results that come of it."""
        if not self.waits:
            self._view.setViewportUpdateMode(QGraphicsView.ViewportUpdateMode.NoViewportUpdate)
            self._moment.start()

    def paint(self) -> None:
        """Paint what was kept back: the results are there, or late."""
        if self._view.viewportUpdateMode() != self._mode:
            self._moment.stop()
            self._view.setViewportUpdateMode(self._mode)
            self._view.viewport().update()
