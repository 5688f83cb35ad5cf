"""What fills the marks in pages of help: keys and menus from the table of commands, words of the window."""

from __future__ import annotations

from collections.abc import Mapping

from app.gui.actions import COMMANDS, Command, keyboard_text, shortcuts_of
from app.gui.help import key_groups
from app.help.markup import Filler
from app.words import tr


def fillers() -> Mapping[str, Filler]:
    """For each kind of mark what it stands for; KeyError where there is no such command or no key for it."""
    return {"key": key_of, "menu": place_of, "word": word}


def _command(key: str) -> Command:
    found = [command for command in COMMANDS if key and command.key == key]
    if not found:
        raise KeyError(key)
    return found[0]


def key_of(key: str) -> str:
    """The key of a command, as it is written on this system."""
    texts = [text for sequence in shortcuts_of(_command(key)) if (text := keyboard_text(sequence))]
    if not texts:
        raise KeyError(key)
    return f"**{texts[0]}**"


def place_of(key: str) -> str:
    """Menu and entry of a command."""
    command = _command(key)
    parts = (_plain(command.menu), _plain(command.text))
    return "*{} > {}*".format(*parts)


def word(message: str) -> str:
    """A word of the window in the user's language."""
    return f"*{tr(message)}*"


def _plain(text: str) -> str:
    return tr(text).replace("&", "").rstrip("…")


def keys_page() -> str:
    """The page of keys as Markdown, a table for each pane."""
    parts = [f"# {tr('Keys')}"]
    for title, keys in key_groups():
        head = f"| {tr('Key')} | {tr('Does')} |\n| --- | --- |"
        rows = "\n".join(f"| {_cell(key)} | {_cell(words)} |" for key, words in keys)
        parts.append(f"## {title}\n\n{head}\n{rows}")
    return "\n\n".join(parts) + "\n"


def _cell(text: str) -> str:
    return text.replace("|", r"\|")
