"""`python3 -m app.start`: from a fresh clone to the open window, on a Python with nothing installed.

Makes the environment, then runs Barwright in it on a sample. Where no window can be opened, it says so in one
line and prints the sample's check in the terminal instead. Only the standard library is used here.
"""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

from app.environment import ROOT, SetupFailed, prepare
from app.qt_libraries import DRAWING, WINDOW, has_display, missing_packages
from app.samples import sample_path
from app.words import system_language, tr, use_language

TRY_A_WINDOW = "from PySide6.QtWidgets import QApplication; QApplication([])"
CHECK_PRINTED = (0, 1, 3)  # exit codes of `check` with the check on standard output


def main() -> int:
    """Set up, then open the window, or print the sample's check where there is none; gives the exit code."""
    use_language(system_language())
    try:
        python = prepare()
    except SetupFailed as failure:
        sys.stderr.write(f"{failure}\n")
        return 1
    reason = why_no_window(python)
    if reason:
        return print_check(python, reason)
    return run(python, "open", str(sample_path()))


def run(python: Path, *arguments: str) -> int:
    """Run Barwright in its environment from the checkout."""
    return subprocess.run([python, "-m", "app", *arguments], cwd=ROOT, check=False).returncode  # noqa: S603


def print_check(python: Path, reason: str) -> int:
    """Print the sample's check; 0 when it was printed, whatever its verdict."""
    sys.stdout.write(
        tr("No window here: {reason} The sample's check instead:").format(reason=reason) + "\n\n"
    )
    sys.stdout.flush()
    code = run(python, "check", str(sample_path()))
    return 0 if code in CHECK_PRINTED else code


def why_no_window(python: Path) -> str:
    """One sentence on why no window can be opened; empty where one can."""
    if not has_display():
        return tr("there is no display.")
    attempt = subprocess.run([python, "-c", TRY_A_WINDOW], capture_output=True, check=False)  # noqa: S603
    if attempt.returncode == 0:
        return ""
    packages = missing_packages(DRAWING | WINDOW)
    if packages:
        return tr("Qt misses system libraries (on Debian: {command}).").format(
            command="apt install " + " ".join(packages)
        )
    return tr("Qt cannot reach the display.")


if __name__ == "__main__":
    sys.exit(main())
