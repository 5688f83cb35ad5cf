"""What is read beside the work: pages of help, where the log is, about the program, the report of a fault."""

from __future__ import annotations

from typing import TYPE_CHECKING, Final

from PySide6.QtWidgets import QWidget

from app.gui import dialogs, settings
from app.gui.actions import command_keys
from app.gui.hand.keys import HAND_KEYS
from app.version import VERSION
from app.words import later, tr

if TYPE_CHECKING:
    from app.gui.help_window import HelpWindow

SHEET_KEYS: Final[tuple[tuple[str, str], ...]] = (
    ("← →", later("Move the cursor along the member (↑ ↓ where it is upright)")),
    (later("Ctrl+← Ctrl+→"), later("Cursor to the next joint")),
    (later("Home, End"), later("Cursor to the first or last joint")),
    (later("Space"), later("Select the joint or segment at the cursor")),
    (later("Shift+← →, Ctrl+Shift+← →"), later("Select the segments that the cursor goes over")),
    (later("Ctrl+A"), later("Select all")),
    (later("F2, Enter"), later("Type what is selected in place; Tab goes on to its next cell")),
    (
        later("F S R V L D T K B G"),
        later("Put a symbol on what is selected, or take it in hand: its letter is in the tip"),
    ),
    (later("Shift+F10"), later("The menu of what is selected")),
    (later("Delete"), later("Delete the selected segments, or take the supports of joints off")),
    ("+ −", later("Zoom in and out")),
    ("0", later("Show the whole member")),
)
TABLE_KEYS: Final[tuple[tuple[str, str], ...]] = (
    (later("Enter, Shift+Enter"), later("Take in what is typed, one cell down or up")),
    (later("Tab, Shift+Tab"), later("The next cell or the one before, and out of the table at its ends")),
    ("F2", later("Edit the cell")),
    ("Home, End", later("The first or last cell of the row")),
    (later("Ctrl+← → ↑ ↓ Home End"), later("To the edge of the table")),
    (later("Shift+← → ↑ ↓"), later("Choose cells")),
    ("↓ ↑", later("While a cell is edited: go through the names that it offers")),
    (later("Ctrl+Enter"), later("Take in what is typed, in all chosen cells of the column")),
    (
        "Alt+↑, Alt+↓",
        later("Run the cell's number up or down, with Shift in larger steps; Ctrl and the wheel too"),
    ),
    ("Esc", later("Leave the cell as it was")),
    (later("Delete"), later("Clear cells")),
    (later("Ctrl+1 … Ctrl+7"), later("A table; once more: the next one beside it")),
)
FINDINGS_KEYS: Final[tuple[tuple[str, str], ...]] = (
    (later("Tab, Shift+Tab"), later("The next finding or the one before")),
    ("Space", later("Show the finding's place in the sheet")),
    ("Enter", later("Show it and go on to the cell that would be changed")),
)


KeyGroup = tuple[str, tuple[tuple[str, str], ...]]


def key_groups() -> tuple[KeyGroup, ...]:
    """The keys of the commands and of each pane, with their words, under a title each."""
    panes = (
        (tr("In the sheet"), SHEET_KEYS + HAND_KEYS),
        (tr("In the tables"), TABLE_KEYS),
        (tr("In the findings"), FINDINGS_KEYS),
    )
    own = tuple((title, tuple((tr(key), tr(words)) for key, words in keys)) for title, keys in panes)
    return ((tr("Everywhere"), command_keys()), *own)


class Help:
    """Shows the texts over a window."""

    def __init__(self, window: QWidget) -> None:
        self._window = window
        self._fault_told = False
        self._pages: HelpWindow | None = None

    def show_page(self, page: str, heading: str = "") -> None:
        """A page of help, in a window of its own that stays open beside the work."""
        from app.gui.help_window import HelpWindow

        if self._pages is None:
            self._pages = HelpWindow(self._window)
        self._pages.show_page(page, heading)
        self._pages.show()
        self._pages.activateWindow()

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
