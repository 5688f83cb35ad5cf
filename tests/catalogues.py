"""`python -m tests.catalogues`: brings every catalogue up to date with the sources and names what is missing.

Extraction walks the syntax tree, because the usual extractors read tokens and miss a message in an f-string.
Nothing is guessed from similar messages: a new one is empty until it is translated, one that is gone is gone.
Without gettext's tools, which are not on every machine; what they read and write is the same.
"""

from __future__ import annotations

import ast
import sys
from collections.abc import Iterator
from functools import cache
from pathlib import Path
from typing import NamedTuple

from app.catalogue import Catalogue, Key, read_catalogue
from app.words import LANGUAGES, SOURCE, catalogue_path

ROOT = Path(__file__).resolve().parent.parent
ROOMS = ("app", "solver")
TRANSLATIONS = tuple(language for language in LANGUAGES if language != SOURCE)


class Found(NamedTuple):
    """A message in the sources."""

    message: str
    many: str
    context: str
    file: str


def messages_of(text: str, file: str) -> Iterator[Found]:
    """The messages of one module in the order in which they stand there."""
    calls = [node for node in ast.walk(ast.parse(text)) if isinstance(node, ast.Call)]
    for node in sorted(calls, key=lambda call: (call.lineno, call.col_offset)):
        if not isinstance(node.func, ast.Name):
            continue
        texts = [part.value for part in node.args if isinstance(part, ast.Constant)]
        match node.func.id, texts:
            case "tr" | "later", [str(message)] if message:
                yield Found(message, "", "", file)
            case "trc", [str(context), str(message)]:
                yield Found(message, "", context, file)
            case "trn", [str(one), str(many), *_]:
                yield Found(one, many, "", file)


def sources() -> Iterator[Found]:
    """The messages of all rooms."""
    for room in ROOMS:
        for path in sorted((ROOT / room).rglob("*.py")):
            yield from messages_of(path.read_text("utf-8"), path.relative_to(ROOT).as_posix())


@cache
def wanted() -> dict[Key, Found]:
    """Every message once, at the first place where it stands."""
    found: dict[Key, Found] = {}
    for one in sources():
        found.setdefault((one.context, one.message), one)
    return found


def written(found: Found, texts: tuple[str, ...]) -> str:
    """One entry of a catalogue."""
    lines = [f"#: {found.file}"]
    lines += [f"msgctxt {quoted(found.context)}"] if found.context else []
    lines.append(f"msgid {quoted(found.message)}")
    if found.many:
        lines.append(f"msgid_plural {quoted(found.many)}")
        lines += [f"msgstr[{number}] {quoted(text)}" for number, text in enumerate(texts or ("", ""))]
    else:
        lines.append(f"msgstr {quoted(texts[0] if texts else '')}")
    return "\n".join(lines)


def quoted(text: str) -> str:
    """A text as a catalogue has it; one of several lines is written in several."""
    escaped = text.replace("\\", "\\\\").replace('"', '\\"').replace("\t", "\\t")
    lines = escaped.splitlines(keepends=True)
    parts = [f'"{line}"'.replace("\n", "\\n") for line in lines]
    return parts[0] if len(parts) == 1 else "\n".join(['""', *parts])


def updated(text: str, catalogue: Catalogue) -> str:
    """The text of a catalogue, its head as it is, with the messages of the sources and their known words."""
    head = text.split("\n\n", 1)[0]
    known = catalogue.messages
    return (
        "\n\n".join([head, *(written(found, known.get(key, ())) for key, found in wanted().items())]) + "\n"
    )


def missing(language: str) -> list[str]:
    """The messages without words in that language."""
    known = read_catalogue(catalogue_path(language)).messages
    return [message for context, message in wanted() if (context, message) not in known]


def main() -> int:
    """Update all; 1 where something is left to translate."""
    left = 0
    for language in TRANSLATIONS:
        path = catalogue_path(language)
        path.write_text(updated(path.read_text("utf-8"), read_catalogue(path)), "utf-8")
        for message in missing(language):
            sys.stdout.write(f"{language}: {message}\n")
            left += 1
    return 1 if left else 0


if __name__ == "__main__":
    sys.exit(main())
