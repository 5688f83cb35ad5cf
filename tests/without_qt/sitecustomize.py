"""Put this folder on PYTHONPATH and no Python started from there can import Qt: a server without it."""

from __future__ import annotations

import sys
from importlib.abc import MetaPathFinder
from importlib.machinery import ModuleSpec

BLOCKED = frozenset({"PySide6", "shiboken6", "pyqtgraph"})


class NoQt(MetaPathFinder):
    """Finds nothing and refuses the blocked packages."""

    def find_spec(self, name: str, path: object = None, target: object = None) -> ModuleSpec | None:
        if name.partition(".")[0] in BLOCKED:
            raise ModuleNotFoundError(f"No module named {name!r} (blocked by tests/without_qt)", name=name)
        return None


sys.meta_path.insert(0, NoQt())
