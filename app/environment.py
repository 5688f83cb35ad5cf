"""The project's own virtual environment: made beside pyproject.toml, filled once, remembered by a hash.

Runs on a bare Python, so only the standard library is used. What was installed is noted in the environment
only after it succeeded: an installation that broke off is simply done again.
"""

from __future__ import annotations

import hashlib
import importlib.util
import json
import os
import subprocess
import sys
import venv
from pathlib import Path

from app.words import tr

ROOT = Path(__file__).resolve().parent.parent
LEAST_PYTHON = (3, 11)
NOTE = "barwright-installed.json"


class SetupFailed(Exception):  # noqa: N818 - read by a person, worded as one would say it
    """The environment cannot be made; the message says why and what to do."""


def environment_folder(root: Path) -> Path:
    """Where the environment of the checkout at `root` lies."""
    return root / ".venv"


def environment_python(root: Path) -> Path:
    """The interpreter of the checkout's environment."""
    inside = Path("Scripts", "python.exe") if os.name == "nt" else Path("bin", "python")
    return environment_folder(root) / inside


def fingerprint(root: Path) -> str:
    """What an installation depends on, as a hash: pyproject.toml, the Python, and where the checkout lies."""
    digest = hashlib.sha256((root / "pyproject.toml").read_bytes())
    digest.update(f"\0{sys.version}\0{root}".encode("utf-8", "surrogateescape"))
    return digest.hexdigest()


def prepare(root: Path = ROOT, *, extra: str = "") -> Path:
    """Make or refresh the environment with the project and `extra` in it; gives its interpreter.

    Raises SetupFailed in words for the user.
    """
    require_python()
    require_checkout(root)
    wanted = fingerprint(root)
    python = environment_python(root)
    if not is_installed(root, wanted, extra):
        ensure_environment(root, python)
        install(root, python, extra)
        write_note(root, wanted, extra)
    return python


def require_python() -> None:
    """Refuse a Python that is too old."""
    if sys.version_info < LEAST_PYTHON:
        found = ".".join(str(part) for part in sys.version_info[:2])
        raise SetupFailed(tr("Python 3.11 or later is needed; this is Python {found}.").format(found=found))


def require_checkout(root: Path) -> None:
    """Refuse to set up an installed copy, which has its dependencies already."""
    if not (root / "pyproject.toml").is_file():
        raise SetupFailed(
            tr("There is no pyproject.toml in {folder}: this command is for a clone of the source.").format(
                folder=root
            )
        )


def read_note(root: Path) -> dict[str, object]:
    """What was installed last; empty where nothing was, or where the note is unreadable."""
    try:
        note = json.loads((environment_folder(root) / NOTE).read_text("utf-8"))
    except (OSError, ValueError):
        return {}
    return note if isinstance(note, dict) else {}


def is_installed(root: Path, wanted: str, extra: str) -> bool:
    """Whether the environment works and holds the project as pyproject.toml now has it."""
    note = read_note(root)
    extras = note.get("extras", [])
    holds_extra = not extra or (isinstance(extras, list) and extra in extras)
    return note.get("fingerprint") == wanted and holds_extra and runs(environment_python(root))


def write_note(root: Path, installed: str, extra: str) -> None:
    """Remember what was installed."""
    note = {"fingerprint": installed, "extras": [extra] if extra else []}
    (environment_folder(root) / NOTE).write_text(json.dumps(note), "utf-8")


def runs(python: Path) -> bool:
    """Whether the interpreter starts (a moved checkout or a removed Python leaves one that does not)."""
    try:
        return subprocess.run([python, "-c", ""], capture_output=True, check=False).returncode == 0  # noqa: S603
    except OSError:
        return False


def ensure_environment(root: Path, python: Path) -> None:
    """An environment that runs; an existing one that does is kept."""
    if runs(python):
        return
    folder = environment_folder(root)
    say(tr("Making a virtual environment in {folder} …").format(folder=folder))
    try:
        venv.create(folder, clear=folder.exists(), with_pip=has_module("ensurepip"), symlinks=os.name != "nt")
    except (OSError, subprocess.CalledProcessError) as error:
        raise SetupFailed(no_environment(error)) from error


def no_environment(error: Exception) -> str:
    """Why no environment could be made."""
    return tr("The virtual environment could not be made: {reason}. On Debian: {command}").format(
        reason=error, command=f"apt install {venv_package()}"
    )


def venv_package() -> str:
    """The Debian package with the venv module's own pip for this Python."""
    return f"python{sys.version_info[0]}.{sys.version_info[1]}-venv"


def has_module(name: str) -> bool:
    """Whether this Python has the module."""
    return importlib.util.find_spec(name) is not None


def pip_command(python: Path) -> list[str]:
    """How to call pip for the environment: its own, else this Python's (Debian splits ensurepip off)."""
    own = subprocess.run([python, "-m", "pip", "--version"], capture_output=True, check=False)  # noqa: S603
    if own.returncode == 0:
        return [str(python), "-m", "pip"]
    if has_module("pip"):
        return [sys.executable, "-m", "pip", "--python", str(python)]
    command = f"apt install {venv_package()}"
    raise SetupFailed(tr("This Python has no pip. On Debian: {command}").format(command=command))


def install(root: Path, python: Path, extra: str) -> None:
    """Install the project, editable, with `extra`, from the package index that pip is set to."""
    say(tr("Installing Barwright and what it needs; this is done once and takes a minute or two …"))
    wanted = f"{root}[{extra}]" if extra else str(root)
    options = ["install", "--quiet", "--disable-pip-version-check", "--editable", wanted]
    if subprocess.run([*pip_command(python), *options], check=False).returncode != 0:  # noqa: S603
        raise SetupFailed(tr("pip could not install the project; its own words are above."))


def say(line: str) -> None:
    """Tell what is going on, on standard error, so that standard output stays the result."""
    sys.stderr.write(line + "\n")
    sys.stderr.flush()
