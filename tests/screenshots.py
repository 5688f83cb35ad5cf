"""`python -m tests.screenshots FOLDER`: the real window of each sample in each unit system and size, as PNG.

For looking at, not for comparing: fonts and rasters differ between machines. The names say what is shown.
"""

from __future__ import annotations

import argparse
import os
import sys
import tempfile
from pathlib import Path

from msgspec.structs import replace

from app import samples
from app.units import SYSTEM_NAMES
from app.words import LANGUAGES, SOURCE, use_language
from solver.model import Project, UnitSystemName

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")

from PySide6.QtCore import QCoreApplication, QDeadlineTimer, QEvent, QEventLoop, QSize
from PySide6.QtGui import QColor, QPalette

from app.gui.main import application
from app.gui.settings import Settings
from app.gui.view import Shown
from app.gui.window import Window

SIZES = ("1280x800", "2560x1440")
LONGEST_WAIT = 20_000  # ms for a solve; a sample takes a few


def main(arguments: list[str]) -> int:
    """Take the pictures asked for and name each file."""
    options = parser().parse_args(arguments)
    options.folder.mkdir(parents=True, exist_ok=True)
    use_language(options.language)
    app = application()
    if options.dark:
        app.setPalette(dark_palette())
    for name in options.sample:
        for units in options.units:
            for size in options.size:
                target = options.folder / f"{name}-{units}-{size}{kind_of(options)}.png"
                project = in_units(samples.read_sample(name), units)
                if options.upright:
                    project = upright(project)
                take(project, size_of(size), target, options.show)
                sys.stdout.write(f"{target}\n")
    return 0


def parser() -> argparse.ArgumentParser:
    """What can be asked for; without anything, every combination in light."""
    asked = argparse.ArgumentParser(prog="python -m tests.screenshots", description=__doc__)
    asked.add_argument("folder", type=Path)
    asked.add_argument("--sample", nargs="+", default=samples.names(), choices=samples.names())
    asked.add_argument("--units", nargs="+", default=SYSTEM_NAMES, choices=SYSTEM_NAMES)
    asked.add_argument("--size", nargs="+", default=SIZES, metavar="WIDTHxHEIGHT")
    asked.add_argument("--dark", action="store_true", help="with a dark palette")
    asked.add_argument("--language", default=SOURCE, choices=LANGUAGES)
    asked.add_argument("--upright", action="store_true", help="with the member upright")
    asked.add_argument("--show", metavar="COMBINATION", help="show this one instead of the one that governs")
    return asked


def size_of(text: str) -> QSize:
    """A size such as 1280x800."""
    width, _, height = text.partition("x")
    return QSize(int(width), int(height))


def kind_of(options: argparse.Namespace) -> str:
    """What sets the picture apart from the plain one, for its file's name."""
    language = "" if options.language == SOURCE else f"-{options.language}"
    return f"{'-dark' * options.dark}{'-upright' * options.upright}{language}"


def upright(project: Project) -> Project:
    """The project with its member upright."""
    return replace(project, display=replace(project.display, orientation="vertical"))


def in_units(project: Project, units: UnitSystemName) -> Project:
    """The project shown in another unit system."""
    return replace(project, display=replace(project.display, units=units))


def dark_palette() -> QPalette:
    """Light text on dark, as a dark desktop gives it."""
    palette = QPalette(QColor("#2b3036"), QColor("#14191d"))
    palette.setColor(QPalette.ColorRole.WindowText, QColor("#e8e6e0"))
    palette.setColor(QPalette.ColorRole.Text, QColor("#e8e6e0"))
    return palette


def take(project: Project, size: QSize, target: Path, combination: str | None = None) -> None:
    """Open the window on a project, wait for its results, and grab it."""
    with tempfile.TemporaryDirectory() as folder:
        window = Window(project, Settings(Path(folder) / "settings.ini"), Path(folder) / "recovery")
        window.resize(size)
        window.show()
        wait_for_results(window)
        if combination is not None:
            window.view.set_shown(Shown("combination", combination))
            QCoreApplication.processEvents()
        window.grab().save(str(target))
        window.close()
        QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete)


def wait_for_results(window: Window) -> None:
    """Let the window work until it shows current results, and paint once more."""
    deadline = QDeadlineTimer(LONGEST_WAIT)
    while not window.showing.current:
        if deadline.hasExpired():
            raise TimeoutError(window.windowTitle())
        QCoreApplication.processEvents(QEventLoop.ProcessEventsFlag.WaitForMoreEvents)
    QCoreApplication.processEvents()


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
