"""A whole window under test: wait for its results, find and finish its dialogs, end it."""

from shiboken6 import isValid


def solved(qtbot, window):
    """Wait until what is shown is current."""
    qtbot.waitUntil(lambda: window.showing.current, timeout=5000)


def end(qtbot, window):
    """Close without a question, and see it go."""
    if isValid(window):
        window._closing = True
        with qtbot.waitSignal(window.destroyed, timeout=2000):
            window.close()


def dialog_of(window, kind):
    """The dialog that is open."""
    (found,) = [dialog for dialog in window.findChildren(kind) if dialog.isVisible()]
    return found


def finish(qtbot, dialog, act):
    """End a dialog by what `act` does."""
    with qtbot.waitSignal(dialog.finished, timeout=2000):
        act()
