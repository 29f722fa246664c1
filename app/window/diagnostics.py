"""What a report of a fault needs: versions, platform, the end of the log; nothing of a job."""

import platform
import sys
from importlib import metadata
from typing import Final

from PySide6.QtCore import qVersion
from PySide6.QtGui import QGuiApplication
from PySide6.QtWidgets import QApplication

from app.look.theme import Theme

PARTS: Final = (
    ("PySide6-Essentials", "LGPL-3.0"),
    ("pyqtgraph", "MIT"),
    ("numpy", "BSD-3-Clause"),
    ("scipy", "BSD-3-Clause"),
)


def version_of(package: str) -> str:
    """Return the installed version of a package, or ``not installed as a package``."""
    try:
        return metadata.version(package)
    except metadata.PackageNotFoundError:
        return "not installed as a package"


def parts() -> tuple[tuple[str, str, str], ...]:
    """Return name, version and licence of what the program is made of."""
    python = ("Python", platform.python_version(), "PSF-2.0")
    return (python, *((name, version_of(name), licence) for name, licence in PARTS))


def diagnostics(theme: Theme, log: str) -> str:
    """Return the text that Copy diagnostics puts on the clipboard."""
    screen = QGuiApplication.primaryScreen()
    font = QApplication.font()
    lines = [
        f"Slabwright {version_of('slabwright')}",
        *(f"{name} {number}" for name, number, _ in parts()),
        f"Qt {qVersion()}, platform {QGuiApplication.platformName()}",
        f"System {platform.platform()}",
        f"Byte order {sys.byteorder}",
        f"Screen {screen.size().width()} x {screen.size().height()} at {screen.devicePixelRatio():g}",
        f"Font {font.family()} {font.pointSizeF():g} pt",
        f"Theme {theme.name}",
        "",
        "Last lines of the log:",
        log or "(none)",
    ]
    return "\n".join(lines)
