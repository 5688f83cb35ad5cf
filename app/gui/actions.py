"""Every command of the window in one table: menu, words, key, tip. Menus, top bar and help walk it."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Final

from PySide6.QtCore import QObject
from PySide6.QtGui import QAction, QKeySequence
from PySide6.QtWidgets import QMenu, QMenuBar

from app.words import later, tr

Key = QKeySequence.StandardKey | str | None
Role = QAction.MenuRole
KEYS = QKeySequence.StandardKey


@dataclass(frozen=True, slots=True)
class Command:
    """One command: `key` names it, `text` with its mnemonic stands in `menu`, `bar` in the top bar."""

    key: str
    menu: str
    text: str
    shortcut: Key = None
    bar: str = ""
    tip: str = ""
    role: Role = Role.NoRole
    also: str = ""  # a key beside the standard ones, on every system
    fallback: str = ""  # a key where the system names none for the standard one


SEPARATOR: Final = Command("", "", "")
MENUS: Final = (later("&File"), later("&Edit"), later("&Member"), later("&View"), later("&Help"))
RECENT: Final = "recent"  # submenus filled when they open
SAMPLES: Final = "samples"
TYPICAL: Final = "typical"
COLUMNS: Final = "columns"
LANGUAGE: Final = "language"
STRIPS: Final = "strips"
DRAWING: Final = "drawing"
SUBMENUS: Final = (RECENT, SAMPLES, TYPICAL, COLUMNS, LANGUAGE, STRIPS, DRAWING)

COMMANDS: Final[tuple[Command, ...]] = (
    Command("new", "&File", later("&New"), KEYS.New, later("New"), later("Start an empty project")),
    Command("open", "&File", later("&Open…"), KEYS.Open, later("Open"), later("Open a project file")),
    Command(RECENT, "&File", later("Open &recent")),
    Command(SAMPLES, "&File", later("Open a sa&mple")),
    Command("save", "&File", later("&Save"), KEYS.Save, later("Save"), later("Save the project")),
    Command("save_as", "&File", later("Save &as…"), KEYS.SaveAs, fallback="Ctrl+Shift+S"),
    SEPARATOR,
    Command("title_block", "&File", later("&Title block…"), "Ctrl+T"),
    Command(
        "sheet",
        "&File",
        later("&Calc sheet…"),
        KEYS.Print,
        later("Calc sheet"),
        later("Write the calc sheet as PDF"),
    ),
    SEPARATOR,
    Command("quit", "&File", later("&Quit"), KEYS.Quit, role=Role.QuitRole, fallback="Ctrl+Q"),
    Command("undo", "&Edit", later("&Undo"), KEYS.Undo, later("Undo")),
    Command(
        "redo", "&Edit", later("&Redo"), KEYS.Redo, later("Redo"), fallback="Ctrl+Shift+Z", also="Ctrl+Y"
    ),
    SEPARATOR,
    Command("copy", "&Edit", later("&Copy"), KEYS.Copy),
    Command("copy_with_headings", "&Edit", later("Copy with &headings"), "Ctrl+Shift+C"),
    Command("paste", "&Edit", later("&Paste"), KEYS.Paste),
    Command("fill_down", "&Edit", later("Fill &down"), "Ctrl+D"),
    Command("clear", "&Edit", later("C&lear cells")),
    Command("delete_rows", "&Edit", later("Delete ro&ws"), "Ctrl+Backspace"),
    SEPARATOR,
    Command("copy_numbers", "&Edit", later("Copy strips as &numbers"), "Ctrl+Alt+C"),
    Command("copy_picture", "&Edit", later("Copy sheet as p&icture"), "Ctrl+Alt+P"),
    Command("save_numbers", "&Edit", later("Save strips as nu&mbers…")),
    Command("save_picture", "&Edit", later("Save sheet as pic&ture…")),
    Command("insert_before", "&Member", later("Insert segment &before"), "Ctrl+Shift+B"),
    Command("insert_after", "&Member", later("Insert segment &after"), "Ctrl+B"),
    Command("delete_segments", "&Member", later("&Delete segments"), "Ctrl+Delete"),
    Command("move_up", "&Member", later("Move segments to&wards the start"), "Ctrl+Shift+Up"),
    Command("move_down", "&Member", later("Move segments towards the &end"), "Ctrl+Shift+Down"),
    SEPARATOR,
    Command("split", "&Member", later("&Split segment in the middle"), "Ctrl+Shift+D"),
    Command("join", "&Member", later("&Join segments"), "Ctrl+J"),
    Command("split_at_cursor", "&Member", later("Insert joint at the &cursor"), "Ctrl+I"),
    Command("join_equal", "&Member", later("Join all e&qual neighbours"), "Ctrl+Shift+J"),
    Command("repeat", "&Member", later("Re&peat segments"), "Ctrl+R"),
    Command("mirror", "&Member", later("&Mirror the half")),
    Command("reverse", "&Member", later("&Reverse the member")),
    Command("fit_companions", "&Member", later("Make companions &fit"), "Ctrl+E"),
    Command("number_joints", "&Member", later("Number the joints in &order")),
    SEPARATOR,
    Command(TYPICAL, "&Member", later("Add &typical material")),
    Command("choose_case", "&Member", later("Edit &loads of another case"), "Ctrl+L"),
    Command(COLUMNS, "&View", later("&Columns of the table")),
    SEPARATOR,
    *(
        Command(f"table_{number}", "&View", text, f"Ctrl+{number}")
        for number, text in enumerate(
            (
                later("&1 Segments"),
                later("&2 Joints"),
                later("&3 Loads"),
                later("&4 Combinations"),
                later("&5 Materials"),
                later("&6 Limits"),
                later("&7 Companions"),
            ),
            1,
        )
    ),
    SEPARATOR,
    Command("next_pane", "&View", later("&Next pane"), "F6"),
    Command("previous_pane", "&View", later("&Previous pane"), "Shift+F6"),
    SEPARATOR,
    Command(STRIPS, "&View", later("&Strips")),
    Command(DRAWING, "&View", later("D&rawing")),
    Command("fit", "&View", later("Show the &whole member"), "Ctrl+0"),
    Command("zoom_to_selection", "&View", later("&Zoom to the selection"), "Ctrl+9"),
    SEPARATOR,
    Command("there_and_back", "&View", later("From a finding to its cell and &back"), "Ctrl+G"),
    Command("findings_of_selected", "&View", later("Findings of what is selecte&d"), "Ctrl+Shift+F"),
    Command("all_findings", "&View", later("&All findings"), "Ctrl+Shift+A"),
    SEPARATOR,
    Command(
        "keep_reference",
        "&View",
        later("&Keep as reference"),
        "Ctrl+K",
        later("Keep"),
        later("Keep these results as a reference, to see later ones against them"),
    ),
    Command("forget_reference", "&View", later("&Forget reference"), "Ctrl+Shift+K"),
    SEPARATOR,
    Command(LANGUAGE, "&View", later("&Language")),
    Command("help", "&Help", later("&Help on this pane"), KEYS.HelpContents, fallback="F1"),
    Command("keys", "&Help", later("&Keys")),
    Command("log", "&Help", later("Where the &log is")),
    Command("about", "&Help", later("&About Barwright"), role=Role.AboutRole),
)


def shortcuts_of(command: Command) -> list[QKeySequence]:
    """The command's keys on this system, the one to show first; empty where it has none."""
    if command.shortcut is None:
        return []
    if isinstance(command.shortcut, str):
        return [QKeySequence(command.shortcut)]
    keys = QKeySequence.keyBindings(command.shortcut) or [QKeySequence(command.fallback)]
    more = [QKeySequence(command.also)] if command.also else []
    return keys + [key for key in more if key not in keys]


def make_actions(parent: QObject, handlers: Mapping[str, Callable[[], None]]) -> dict[str, QAction]:
    """An action for each command that is not a submenu, connected to its handler."""
    made = {}
    for command in COMMANDS:
        if command.key in ("", *SUBMENUS):
            continue
        action = QAction(tr(command.text), parent)
        action.setShortcuts(shortcuts_of(command))
        action.setMenuRole(command.role)
        plain = tr(command.tip) if command.tip else action.text().replace("&", "").rstrip("…")
        action.setToolTip(_with_key(plain, action.shortcut()))
        action.triggered.connect(lambda _checked=False, handle=handlers[command.key]: handle())
        made[command.key] = action
    return made


def _with_key(text: str, key: QKeySequence) -> str:
    shown = key.toString(QKeySequence.SequenceFormat.NativeText)
    return f"{text} ({shown})" if shown else text


def fill_menus(bar: QMenuBar, actions: Mapping[str, QAction], submenus: Mapping[str, QMenu]) -> None:
    """Menus in the order of the table."""
    menus = {title: bar.addMenu(tr(title)) for title in MENUS}
    current = menus[MENUS[0]]
    for command in COMMANDS:
        if command is SEPARATOR:
            current.addSeparator()
            continue
        current = menus[command.menu]
        if command.key in submenus:
            submenus[command.key].setTitle(tr(command.text))
            current.addMenu(submenus[command.key])
        else:
            current.addAction(actions[command.key])


def command_keys() -> tuple[tuple[str, str], ...]:
    """Each command that has keys: the keys, and what it is called."""
    found = []
    for command in COMMANDS:
        keys = [text for key in shortcuts_of(command) if (text := keyboard_text(key))]
        if keys:
            found.append((", ".join(keys), tr(command.text).replace("&", "").rstrip("…")))
    return tuple(found)


def keyboard_text(key: QKeySequence) -> str:
    """The key as it is written; empty for one of old workstations or media keyboards, which Qt lists too."""
    last = key.toString(QKeySequence.SequenceFormat.PortableText).split("+")[-1]
    known = re.fullmatch(r".?|F[1-9]|F1[0-2]|Ins|Del|Backspace|Up|Down", last)
    return key.toString(QKeySequence.SequenceFormat.NativeText) if known else ""
