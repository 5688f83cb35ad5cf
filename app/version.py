"""Name and version of the program, as results and calc sheets carry them; packaging reads it here."""

from __future__ import annotations

VERSION = "0.1.0"
PROGRAM = f"barwright {VERSION}"
