"""The text of About: versions and licences of what the program stands on."""

from __future__ import annotations

import platform
from importlib import metadata

from app.words import tr

LIBRARIES = ("PySide6-Essentials", "pyqtgraph", "numpy", "scipy", "msgspec", "pint", "typst")


def about_text() -> str:
    """What to copy into a report of a fault."""
    lines = [
        tr("Members under axial load: typed, solved with a bound on the numerical error, checked, printed."),
        tr("An aid to calculation: a competent engineer verifies; local codes and licensed practice govern."),
        "",
        f"Python {platform.python_version()}, {platform.platform()}",
        *(f"{name} {metadata.version(name)}" for name in LIBRARIES),
        "",
        tr("Barwright is under the MIT licence."),
        tr("Qt and PySide6 are used under the LGPL version 3 and can be replaced by other builds of them."),
    ]
    return "\n".join(lines)
