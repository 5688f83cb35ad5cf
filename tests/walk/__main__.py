"""`python -m tests.walk FOLDER`: builds the hoist shaft by hand on the real window, a picture a step.

The pictures are for looking at: numbered, in the folder, listed in `index.html`. `QT_SCALE_FACTOR=2` in the
environment shows the window on a screen of twice the density; `--size` is in the units of the screen.
"""

from __future__ import annotations

import argparse
import os
import sys
import tempfile
from pathlib import Path

from app.words import LANGUAGES, SOURCE, use_language

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")

from PySide6.QtCore import QCoreApplication, QEvent

from app.gui.files import blank_project
from app.gui.main import application
from app.gui.settings import Settings
from app.gui.window import Window
from tests.screenshots import dark_palette, size_of
from tests.walk.camera import Camera
from tests.walk.chapters import walk
from tests.walk.hands import Hands
from tests.walk.steps import Steps


def main(arguments: list[str]) -> int:
    """Walk, and say how many pictures there are."""
    options = parser().parse_args(arguments)
    use_language(options.language)
    app = application()
    if options.dark:
        app.setPalette(dark_palette())
    with tempfile.TemporaryDirectory() as folder:
        store = Settings(Path(folder) / "settings.ini")
        window = Window(blank_project(store.units), store, Path(folder) / "recovery")
        window.resize(size_of(options.size))
        window.show()
        hands = Hands(window)
        hands.activate()
        camera = Camera(options.folder, hands)
        steps = Steps(window, camera)
        try:
            walk(hands, steps, upright=options.upright)
        except BaseException:
            camera.take(window, len(steps.done) + 1, "fell", "Here the walk ended")
            raise
        finally:
            window.hide()
            window._closing = True
            window.close()
            QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete)
    sys.stdout.write(f"{len(steps.done)} steps: {options.folder / 'index.html'}\n")
    return 0


def parser() -> argparse.ArgumentParser:
    """What can be asked for."""
    asked = argparse.ArgumentParser(prog="python -m tests.walk", description=__doc__)
    asked.add_argument("folder", type=Path)
    asked.add_argument("--size", default="1280x800", metavar="WIDTHxHEIGHT")
    asked.add_argument("--dark", action="store_true", help="with a dark palette")
    asked.add_argument("--upright", action="store_true", help="with the member upright while it is built")
    asked.add_argument("--language", default=SOURCE, choices=LANGUAGES)
    return asked


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
