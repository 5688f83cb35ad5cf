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


def beyond_window(window, item, end: int) -> bool:
    """Whether an item paints anything beyond one end of what the ruler shows."""
    ruler, places = window.sheet.ruler, window.sheet.places
    low, high = sorted((ruler.begin, ruler.end))
    span = (high + 3.0, high + 30.0) if end > 0 else (low - 30.0, low - 3.0)
    room = places.axes.rect(span, places.axes.across_of(places.drawing)).toRect()
    seen = window.sheet.viewport().grab(room).toImage()
    item.setOpacity(0.0)
    without = window.sheet.viewport().grab(room).toImage()
    item.setOpacity(1.0)
    return seen != without
