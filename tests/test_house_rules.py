"""Rules of this house that no linter knows: what must not stand in any tracked text file."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parent.parent
LEFT_OUT = {".git", ".venv", ".hypothesis", ".benchmarks", ".mypy_cache", ".ruff_cache", ".pytest_cache"}
MADE = {"__pycache__", "build", "dist", "screenshots"}
TEXT = {".py", ".md", ".toml", ".json", ".typ", ".po", ".pot", ".svg", ""}

# What must not stand there, and what to do instead. This file alone may name it.
RULES = {
    r"/(work|home|root|Users|tmp/v)/": "no path of one machine: build it from the checkout's root",
    r"\b(TODO|FIXME|XXX)\b": "finish it, or open an issue for it",
    r"breakpoint\(\)|\bpdb\b": "take the debugger out",
    r"pytest\.(skip|xfail)|mark\.(skip|xfail)": "no test is put aside: mend it or take it out",
    r"time\.sleep\(|qWait\(": "wait for what is to happen, not for a time",
}


def texts() -> list[Path]:
    found = (path for path in ROOT.rglob("*") if path.is_file() and path.suffix in TEXT)
    kept = (path for path in found if not set(path.relative_to(ROOT).parts) & (LEFT_OUT | MADE))
    return sorted(path for path in kept if path != Path(__file__).resolve())


@pytest.mark.parametrize("pattern", RULES, ids=RULES.values())
def test_no_text_breaks_the_rule(pattern: str) -> None:
    rule = re.compile(pattern)
    hits = [
        f"{path.relative_to(ROOT)}:{number}: {line.strip()[:80]}"
        for path in texts()
        for number, line in enumerate(path.read_text("utf-8").splitlines(), 1)
        if rule.search(line)
    ]
    assert not hits, f"{RULES[pattern]}\n" + "\n".join(hits)


def test_every_package_and_module_says_what_it_is_for() -> None:
    silent = [
        str(path.relative_to(ROOT))
        for folder in ("app", "solver", "sample_projects", "tests")
        for path in (ROOT / folder).rglob("*.py")
        if (text := path.read_text("utf-8").lstrip()) and not text.startswith(('"""', 'r"""'))
    ]
    assert not silent


def sources() -> list[Path]:
    return [path for folder in ("app", "solver") for path in (ROOT / folder).rglob("*.py")]


def test_a_message_is_filled_in_after_it_was_translated() -> None:
    """`tr(f"…")` can never be found in a catalogue."""
    hits = [path.name for path in sources() if re.search(r"\btrn?\(\s*f[\"']", path.read_text("utf-8"))]
    assert not hits


LONG_FOR_A_REASON = {"solver/model.py"}  # every record of the project file, and nothing else


def test_no_module_has_grown_two_jobs() -> None:
    """Three hundred lines are the aim; beyond four hundred a module is split."""
    lines = {path: len(path.read_text("utf-8").splitlines()) for path in sources()}
    long = {path.relative_to(ROOT).as_posix() for path, count in lines.items() if count > 400}
    assert long <= LONG_FOR_A_REASON
