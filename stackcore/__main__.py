"""``python -m stackcore``: the commands that need no window."""

import sys

from stackcore.cli import main

if __name__ == "__main__":
    sys.exit(main())
