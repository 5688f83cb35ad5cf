"""Opens the window: application, settings, log, recovery copies, and the end of all of them."""

from __future__ import annotations

import gc
import os
import sys
from pathlib import Path

from PySide6.QtCore import QCoreApplication, QLibraryInfo, QLocale, QTimer, QTranslator
from PySide6.QtWidgets import QApplication

from app import samples
from app.gui import dialogs, log, settings
from app.gui.files import blank_project, read_or_say
from app.gui.recovery import Recovered, left_behind
from app.gui.settings import Settings
from app.gui.window import Window
from app.words import SOURCE, language, system_language, tr, use_language


def name_application() -> None:
    """The name that decides where settings and log lie."""
    QCoreApplication.setApplicationName("barwright")


def application() -> QApplication:
    """The application in the language in use, with the names that settings and desktops know it by."""
    existing = QApplication.instance()
    made = existing if isinstance(existing, QApplication) else QApplication(sys.argv[:1])
    name_application()
    made.setApplicationDisplayName("Barwright")
    made.setDesktopFileName("barwright")
    speak(made)
    return made


def speak(app: QApplication) -> None:
    """Have Qt's own buttons, menus and file dialogs speak the language in use, as far as Qt has it."""
    QLocale.setDefault(QLocale(language()))
    translator = QTranslator(app)
    folder = QLibraryInfo.path(QLibraryInfo.LibraryPath.TranslationsPath)
    if language() != SOURCE and translator.load(f"qtbase_{language()}", folder):
        app.installTranslator(translator)


def open_window(path: str | os.PathLike[str] | None, store: Settings, recovery_folder: Path) -> Window:
    """A window on the file, or on a new project."""
    named = None if path is None else Path(path)
    project, faults = (None, ()) if named is None else read_or_say(named)
    held = None if project is None or named is None or is_sample(named) else named
    window = Window(project or blank_project(store.units), store, recovery_folder, held)
    window.show()
    if held is not None:
        window.files.remember(held)
    if faults and named is not None:
        window.files.show_faults(named, faults)
    return window


def is_sample(path: Path) -> bool:
    """Whether the file is a packaged sample, which is opened as a new project and never written over."""
    name = path.name.removesuffix(samples.SUFFIX)
    return name in samples.names() and path.resolve() == samples.sample_path(name).resolve()


def offer_recovery(window: Window, found: tuple[Recovered, ...]) -> None:
    """Ask about copies left behind, one after the other."""
    if not found:
        return
    first, rest = found[0], found[1:]
    name = first.path.name if first.path else first.snapshot.project.title or tr("new project")

    def on_answer(answer: bool | None) -> None:
        if answer:
            window.files.when_safe(take_over)
            return  # the window holds one project; other copies are offered at the next start
        if answer is False:
            first.discard()
        offer_recovery(window, rest)

    def take_over() -> None:
        window.files.recover(first.snapshot, first.path)
        if window.recovery.write():  # the old copy goes only once there is a new one
            first.discard()

    dialogs.ask_recover(window, name, on_answer)


def set_aside(window: Window) -> None:
    """With the first results all libraries are there: what stays to the end is not searched for cycles again.

    A search through all of it takes several frames, and would come while a hand pulls.
    """

    def on_shown() -> None:
        if window.showing.current:
            window.showing.shown.disconnect(on_shown)
            gc.freeze()

    window.showing.shown.connect(on_shown)


def run(path: str | os.PathLike[str] | None = None, asked: str = "") -> int:
    """Open the window on a file or on a new project; returns the exit code when it is closed.

    `asked` is a language that goes before the one chosen in the window and that of the system.
    """
    name_application()
    folder = settings.folder()
    log.start(folder)
    store = Settings()
    use_language(asked or store.language or system_language())
    app = application()
    recovery_folder = folder / "recovery"
    found = left_behind(recovery_folder)
    window = open_window(path, store, recovery_folder)
    set_aside(window)
    errors = log.UncaughtErrors(window.help.show_fault)
    errors.install()
    QTimer.singleShot(0, window, lambda: offer_recovery(window, found))
    try:
        return app.exec()
    finally:
        errors.remove()
        log.stop()
