"""The way from the command to the window, which another package may have brought.

This package knows the window only by an entry point of its distribution, so that it works where none is installed.
"""

from collections.abc import Callable, Sequence
from importlib.metadata import entry_points
from pathlib import Path
from typing import Final

from stackcore.cli.telling import one_line

GROUP: Final = "slabwright.window"
"""Entry-point group; its entry ``main`` takes the arguments and returns the exit status."""

_TOOLKIT: Final = ("PySide6", "shiboken6", "pyqtgraph")


def looks_like_a_file(text: str) -> bool:
    """Return whether an argument can be meant as a file rather than as a command."""
    return bool(Path(text).suffix) or len(Path(text).parts) > 1 or Path(text).exists()


def open_window(arguments: Sequence[str]) -> int:
    """Run the window with `arguments`, or say in one line what is missing for it; return the exit status."""
    found = [entry for entry in entry_points(group=GROUP) if entry.name == "main"]
    if not found:
        return one_line("the window is not installed; allowed: slabwright sweep, or pip install 'slabwright[gui]'")
    try:
        window: Callable[[Sequence[str]], int | None] = found[0].load()
        return int(window(arguments) or 0)
    except ImportError as error:
        return toolkit_missing(error)


def toolkit_missing(error: ImportError) -> int:
    """Say what to install when the toolkit or a library under it is missing; raise any other error again."""
    package = (error.name or "").partition(".")[0]
    if isinstance(error, ModuleNotFoundError) and package in _TOOLKIT:
        return one_line(
            f"the window needs {package}, which is missing; install it with: pip install 'slabwright[gui]'"
        )
    if package in _TOOLKIT or ".so" in str(error):
        return one_line(f"the window's toolkit cannot be loaded: {error}; install the system library it names")
    raise error
