"""Whether there is a screen to open a window on. No toolkit: Qt ends the process when it finds none."""

import os
import sys


def display_missing() -> bool:
    """Return whether there is no screen to open a window on, as far as the environment tells."""
    if not sys.platform.startswith("linux") or os.environ.get("QT_QPA_PLATFORM"):
        return False
    return not (os.environ.get("DISPLAY") or os.environ.get("WAYLAND_DISPLAY"))
