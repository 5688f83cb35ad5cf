"""The packaged sample projects: members from the works of an invented small harbour, Skarvik."""

from __future__ import annotations

from importlib import resources
from pathlib import Path

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


def read_sample(name: str = FIRST) -> bytes:
    """The bytes of a sample's project file; KeyError where there is none of that name."""
    return sample_path(name).read_bytes()
