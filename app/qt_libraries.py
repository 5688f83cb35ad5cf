"""What a window needs from the system: a display, and the libraries of Qt that no wheel brings along.

Read before anything is installed, so only the standard library is used. The libraries come from the NEEDED
entries of the PySide6 6.11 libraries and of their platform plugins (`objdump -p`).
"""

from __future__ import annotations

import ctypes
import os
import sys

# What Qt needs even without a display, by soname.
DRAWING = {
    "libEGL.so.1": "libegl1",
    "libGL.so.1": "libgl1",
    "libX11.so.6": "libx11-6",
    "libfontconfig.so.1": "libfontconfig1",
    "libfreetype.so.6": "libfreetype6",
    "libglib-2.0.so.0": "libglib2.0-0",
    "libxkbcommon.so.0": "libxkbcommon0",
}

# What a window on an X server needs beyond that.
WINDOW = {
    "libX11-xcb.so.1": "libx11-xcb1",
    "libdbus-1.so.3": "libdbus-1-3",
    "libxcb-cursor.so.0": "libxcb-cursor0",
    "libxcb-icccm.so.4": "libxcb-icccm4",
    "libxcb-image.so.0": "libxcb-image0",
    "libxcb-keysyms.so.1": "libxcb-keysyms1",
    "libxcb-randr.so.0": "libxcb-randr0",
    "libxcb-render-util.so.0": "libxcb-render-util0",
    "libxcb-render.so.0": "libxcb-render0",
    "libxcb-shape.so.0": "libxcb-shape0",
    "libxcb-shm.so.0": "libxcb-shm0",
    "libxcb-sync.so.1": "libxcb-sync1",
    "libxcb-util.so.1": "libxcb-util1",
    "libxcb-xfixes.so.0": "libxcb-xfixes0",
    "libxcb-xkb.so.1": "libxcb-xkb1",
    "libxkbcommon-x11.so.0": "libxkbcommon-x11-0",
}


def has_display() -> bool:
    """Whether a display is to be expected; QT_QPA_PLATFORM says that the user has chosen one."""
    if not sys.platform.startswith("linux"):
        return True
    return any(os.environ.get(name) for name in ("DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM"))


def loads(soname: str) -> bool:
    """Whether the system's loader finds the library."""
    try:
        ctypes.CDLL(soname)
    except OSError:
        return False
    return True


def missing_packages(table: dict[str, str]) -> tuple[str, ...]:
    """The Debian packages of the libraries in `table` that do not load; none on systems other than Linux."""
    if not sys.platform.startswith("linux"):
        return ()
    return tuple(package for soname, package in table.items() if not loads(soname))


if __name__ == "__main__":  # for .ci/run, which installs what is missing
    sys.stdout.write(" ".join(missing_packages(DRAWING | WINDOW)) + "\n")
