"""Texts to read and copy: the keys, where the log is, about the program, the report of a fault."""

from __future__ import annotations

from typing import Final

from PySide6.QtWidgets import QWidget

from app.gui import dialogs, settings
from app.gui.actions import keys_text
from app.version import VERSION
from app.words import later, tr

SHEET_KEYS: Final[tuple[tuple[str, str], ...]] = (
    ("← →", later("Move the cursor along the member (↑ ↓ where it is upright)")),
    ("Ctrl+← Ctrl+→", later("Cursor to the next joint")),
    ("Home, End", later("Cursor to the first or last joint")),
    ("Space", later("Select the segment under the cursor")),
    ("+ −", later("Zoom in and out")),
    ("0", later("Show the whole member")),
)
TABLE_KEYS: Final[tuple[tuple[str, str], ...]] = (
    ("Enter, Shift+Enter", later("Take in what is typed, one cell down or up")),
    ("Tab, Shift+Tab", later("The next cell or the one before, and out of the table at its ends")),
    ("F2", later("Edit the cell")),
    ("↓ ↑", later("While a cell is edited: go through the names that it offers")),
    ("Esc", later("Leave the cell as it was")),
    ("Delete", later("Clear cells")),
)
FINDINGS_KEYS: Final[tuple[tuple[str, str], ...]] = (
    ("Tab, Shift+Tab", later("The next finding or the one before")),
    ("Enter", later("Show the finding's place in the sheet")),
)


def all_keys() -> str:
    """The keys of the commands and of each pane, a line each."""
    parts = [f"{tr('Everywhere')}\n{keys_text()}"]
    for title, keys in (
        (tr("In the sheet"), SHEET_KEYS),
        (tr("In the tables"), TABLE_KEYS),
        (tr("In the findings"), FINDINGS_KEYS),
    ):
        parts.append("\n".join([title, *(f"{key}\t{tr(words)}" for key, words in keys)]))
    return "\n\n".join(parts)


class Help:
    """Shows the texts over a window."""

    def __init__(self, window: QWidget) -> None:
        self._window = window
        self._fault_told = False

    def show_keys(self) -> None:
        """The keys."""
        dialogs.show_text(self._window, tr("Keys"), tr("Keys of the commands and the panes"), all_keys())

    def show_log(self) -> None:
        """Where the log is."""
        dialogs.show_text(
            self._window,
            tr("Log"),
            tr("What goes wrong inside the program is written to:"),
            str(settings.folder()),
        )

    def show_about(self) -> None:
        """Versions and licences."""
        from app.gui.about import about_text

        dialogs.show_text(self._window, tr("About Barwright"), f"Barwright {VERSION}", about_text())

    def show_fault(self, report: str) -> None:
        """An exception that nobody caught, with its report to copy; others wait in the log meanwhile."""
        if self._fault_told:
            return
        self._fault_told = True
        dialog = dialogs.show_text(
            self._window,
            tr("A fault of the program"),
            tr("Something went wrong inside Barwright. Your project is kept; save it under another name."),
            report,
        )
        dialog.finished.connect(self._on_fault_read)

    def _on_fault_read(self, _result: int) -> None:
        self._fault_told = False
