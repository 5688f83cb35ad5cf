"""`python3 -m tests`: from a fresh clone to the whole suite, on a Python with nothing installed.

Without arguments the tests are shared among the processors. Arguments go to pytest as they are:
`python3 -m tests -k tie_rod`. Only the standard library is used here.
"""

from __future__ import annotations

import os
import subprocess
import sys

from app.environment import ROOT, SetupFailed, prepare
from app.qt_libraries import DRAWING, missing_packages

MOST_PROCESSES = 8  # each collects all tests first, so that many more gain nothing


def main(arguments: list[str]) -> int:
    """Set up with everything the tests need, then run pytest; gives its exit code."""
    try:
        require_libraries()
        python = prepare(extra="dev")
    except SetupFailed as failure:
        sys.stderr.write(f"{failure}\n")
        return 1
    environment = {"QT_QPA_PLATFORM": "offscreen"} | os.environ
    command = [python, "-m", "pytest", *(arguments or shared())]
    return subprocess.run(command, cwd=ROOT, env=environment, check=False).returncode


def shared() -> list[str]:
    """The whole suite, a part on each processor; benchmarks need one for themselves and are not in it."""
    return ["--numprocesses", str(min(os.cpu_count() or 1, MOST_PROCESSES)), "--benchmark-disable"]


def require_libraries() -> None:
    """Name the system libraries that Qt misses, before a test fails on one."""
    packages = missing_packages(DRAWING)
    if packages:
        raise SetupFailed(
            "The window's tests need system libraries of Qt that are missing here. On Debian: "
            f"apt install {' '.join(packages)}"
        )


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
