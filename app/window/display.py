"""Whether there is a screen to open a window on. No toolkit: Qt ends the process when it finds none.

``python -m app.window.display`` prints why there is none, if so, and ends with 1.
"""

import os
import re
import socket
import sys
from collections.abc import Iterator
from pathlib import Path
from typing import Final

PATIENCE: Final = 5.0
"""Seconds to wait for a display on another machine."""

_X11_PORT: Final = 6000
_X11_NAME: Final = re.compile(r"(?:(?P<protocol>[a-z0-9]+)/)?(?P<host>.*?):(?P<number>\d{1,5})(?:\.\d+)?")

_Address = tuple[socket.AddressFamily, str | tuple[str, int]]


def display_fault() -> str:
    """Return why no window can be opened, as far as can be told without the toolkit, or an empty text.

    A name of a display that cannot be read is left to the toolkit.
    """
    if not sys.platform.startswith("linux") or os.environ.get("QT_QPA_PLATFORM"):
        return ""
    named = {name: value for name in ("WAYLAND_DISPLAY", "DISPLAY") if (value := os.environ.get(name))}
    if not named:
        return "neither DISPLAY nor WAYLAND_DISPLAY is set"
    for name, value in named.items():
        addresses = list(_wayland(value) if name == "WAYLAND_DISPLAY" else _x11(value))
        if not addresses or any(_answers(*address) for address in addresses):
            return ""
    return f"nothing answers at {' or '.join(f'{name}={value}' for name, value in named.items())}"


def _wayland(name: str) -> Iterator[_Address]:
    """Yield where the compositor `name` listens: a path, or a name in the folder of the session."""
    folder = os.environ.get("XDG_RUNTIME_DIR", "")
    if name.startswith("/") or folder:
        yield socket.AF_UNIX, str(Path(folder, name))


def _x11(name: str) -> Iterator[_Address]:
    """Yield where the X server `name`, such as ``:0`` or ``localhost:10.0``, listens."""
    match = _X11_NAME.fullmatch(name)
    if match is None:
        return
    number = int(match["number"])
    if match["host"] in ("", "unix") or match["protocol"] == "unix":
        path = f"/tmp/.X11-unix/X{number}"
        yield socket.AF_UNIX, path
        yield socket.AF_UNIX, f"\0{path}"
    else:
        yield socket.AF_INET, (match["host"], _X11_PORT + number)


def _answers(family: socket.AddressFamily, address: str | tuple[str, int]) -> bool:
    try:
        if isinstance(address, tuple):
            socket.create_connection(address, timeout=PATIENCE).close()
        else:
            with socket.socket(family) as end:
                end.connect(address)
    except OSError:
        return False
    return True


if __name__ == "__main__":
    fault = display_fault()
    sys.stdout.write(f"{fault}\n" if fault else "")
    sys.exit(bool(fault))
