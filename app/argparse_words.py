"""The words of the command line's own grammar, which argparse takes from gettext's default domain.

That domain has no catalogue here, so argparse is given ours by its own name for it. Only what a user of our
commands can meet is listed; a wording of another Python that is not stays English.
"""

from __future__ import annotations

import argparse
from typing import Final

from app.words import later, tr

MESSAGES: Final = (
    later("usage: "),
    later("positional arguments"),
    later("options"),
    later("show this help message and exit"),
    later("%(prog)s: error: %(message)s\n"),
    later("argument %(argument_name)s: %(message)s"),
    later("the following arguments are required: %s"),
    later("unrecognized arguments: %s"),
    later("expected one argument"),
    later("expected at most one argument"),
    later("expected at least one argument"),
    later("ignored explicit argument %r"),
    later("ambiguous option: %(option)s could match %(matches)s"),
    later("invalid choice: %(value)r (choose from %(choices)s)"),
)


def install() -> None:
    """Have argparse speak the language in use."""
    argparse._ = tr  # type: ignore[attr-defined]  # its name for gettext since it began
