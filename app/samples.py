"""The packaged sample projects: members from the works of an invented small harbour, Skarvik.

Finding them takes the standard library alone, because `app.start` does so before anything is installed.
"""

from __future__ import annotations

from importlib import resources
from pathlib import Path
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from solver.model import Project

SUFFIX = ".barwright.json"
FIRST = "hoist_shaft"  # opened where nothing else is asked for; it passes
_FOLDER = Path(str(resources.files("sample_projects")))


def names() -> tuple[str, ...]:
    """The samples' names, the one opened first at the front, then by alphabet."""
    found = sorted(path.name.removesuffix(SUFFIX) for path in _FOLDER.glob(f"*{SUFFIX}"))
    return tuple(sorted(found, key=lambda name: name != FIRST))


def sample_path(name: str = FIRST) -> Path:
    """The file of a sample; KeyError where there is none of that name."""
    if name not in names():
        raise KeyError(name)
    return _FOLDER / f"{name}{SUFFIX}"


def read_sample(name: str = FIRST) -> Project:
    """A sample as a project; KeyError where there is none of that name."""
    from app.project_file import read

    return read(sample_path(name))
