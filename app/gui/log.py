"""The log file, and what becomes of an exception that nobody caught: logged, told once, never swallowed."""

from __future__ import annotations

import contextlib
import faulthandler
import logging
import sys
import traceback
from collections.abc import Callable
from logging.handlers import RotatingFileHandler
from pathlib import Path
from types import TracebackType

LOGGER = logging.getLogger("barwright")
SIZE = 500_000  # bytes of one log file; one older one is kept

Tell = Callable[[str], None]


def start(folder: Path) -> Path:
    """Log to a file in `folder`; gives the file. Where none can be written, the work goes on without."""
    with contextlib.suppress(OSError):
        folder.mkdir(parents=True, exist_ok=True)
    path = folder / "barwright.log"
    handler = RotatingFileHandler(path, maxBytes=SIZE, backupCount=1, encoding="utf-8", delay=True)
    handler.setFormatter(logging.Formatter("%(asctime)s %(levelname)s %(message)s"))
    LOGGER.addHandler(handler)
    LOGGER.setLevel(logging.INFO)
    return path


def stop() -> None:
    """Close the log file."""
    for handler in list(LOGGER.handlers):
        LOGGER.removeHandler(handler)
        handler.close()


def report_of(error: BaseException) -> str:
    """The exception with its traceback, for the log and for a person to copy."""
    return "".join(traceback.format_exception(error))


def log_error(where: str, error: BaseException) -> str:
    """Log an exception; gives the report."""
    report = report_of(error)
    LOGGER.error("%s\n%s", where, report)
    return report


class UncaughtErrors:
    """Takes the place of `sys.excepthook` while it is installed: log, then tell the window."""

    def __init__(self, tell: Tell) -> None:
        self._tell = tell
        self._before = sys.excepthook

    def install(self) -> None:
        """From now on, what escapes a slot is logged and told."""
        self._before = sys.excepthook
        sys.excepthook = self.on_error
        if sys.stderr is not None and not faulthandler.is_enabled():
            faulthandler.enable()

    def remove(self) -> None:
        """Back to what was before."""
        sys.excepthook = self._before

    def on_error(self, kind: type[BaseException], error: BaseException, trace: TracebackType | None) -> None:
        """One uncaught exception."""
        if isinstance(error, KeyboardInterrupt):
            self._before(kind, error, trace)
            return
        self._tell(log_error("uncaught", error))
