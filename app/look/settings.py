"""The one place that makes settings, and the folders where the program keeps its own files.

Settings hold layout and preferences, never anything of a job. They live in one explicit file, so that tests
(and a portable installation) can point somewhere else with ``SLABWRIGHT_HOME``.
"""

import os
from pathlib import Path
from typing import Final

from PySide6.QtCore import QSettings, QStandardPaths

HOME_VARIABLE: Final = "SLABWRIGHT_HOME"
"""Environment variable that moves settings and state below one folder."""


def settings_file() -> Path:
    """Return the file that holds layout and preferences; its folder need not exist yet."""
    home = os.environ.get(HOME_VARIABLE)
    if home:
        return Path(home) / "settings.ini"
    folder = QStandardPaths.writableLocation(QStandardPaths.StandardLocation.GenericConfigLocation)
    return Path(folder) / "slabwright" / "settings.ini"


def state_folder() -> Path:
    """Return the folder for the log and for recovery files, made when it is missing."""
    home = os.environ.get(HOME_VARIABLE)
    if home:
        folder = Path(home) / "state"
    else:
        state = QStandardPaths.writableLocation(QStandardPaths.StandardLocation.GenericStateLocation)
        folder = Path(state) / "slabwright"
    folder.mkdir(parents=True, exist_ok=True)
    return folder


def open_settings() -> QSettings:
    """Return the settings of this program. Ask for values with their type: the file holds only text."""
    return QSettings(str(settings_file()), QSettings.Format.IniFormat)
