"""`python -m app` is the same as the command `barwright`."""

import sys

from app.cli import main

if __name__ == "__main__":
    sys.exit(main())
