"""Measured data from a file: read as text, whatever program wrote it, and shown before it is taken."""

from collections.abc import Callable
from pathlib import Path
from typing import Final

from app.window.dialogs import Dialogs, FileKind
from app.window.exporting import Tell

KINDS: Final = (
    FileKind("Comma-separated values", "csv"),
    FileKind("Tab-separated values", "tsv"),
    FileKind("Columns of text", "txt"),
    FileKind("Columns of text", "dat"),
)
"""What measured data come as; the text says how it is written, not the suffix."""
MOST: Final = 20_000_000
"""Bytes that are read; a table of measured data has a hundredth of it."""


class MaterialFiles:
    """Opens files of measured data for the job.

    Parameters
    ----------
    folder
        Where to begin looking.
    show
        Shows name and text of a file for the columns to be understood.
    """

    def __init__(
        self, folder: Callable[[], Path], dialogs: Dialogs, tell: Tell, show: Callable[[str, str], None]
    ) -> None:
        self._folder, self._dialogs, self._tell, self._show = folder, dialogs, tell, show

    def pick(self) -> None:
        """Ask for a file and show it."""
        self._dialogs.pick_source("Measured data of a material", self._folder(), KINDS, self.open)

    def takes(self, path: Path) -> bool:
        """Whether a file that was dropped is one of measured data, by its suffix."""
        return path.suffix.lower().lstrip(".") in [kind.suffix for kind in KINDS]

    def open(self, path: Path) -> None:
        """Read a file and show it; what cannot be read is told."""
        try:
            size = path.stat().st_size
            if size > MOST:
                self._tell(
                    f"{path.name} has {size / 1e6:.0f} MB; a table of measured data has less than 20.", "error"
                )
                return
            content = path.read_bytes()
        except OSError as error:
            self._tell(f"{path.name} cannot be read: {error.strerror or error}.", "error")
            return
        text = decoded(content)
        if not text.strip("\ufeff \t\r\n"):
            self._tell(f"{path.name} is empty; columns of frequency and permittivity are needed.", "error")
            return
        self._show(path.name, text)


def decoded(content: bytes) -> str:
    """Return the text of a file: UTF-8, UTF-16 with its mark, or else the Western code page of older programs.

    Examples
    --------
    >>> decoded("ε".encode("utf-16"))
    'ε'
    >>> decoded(b"\xb5m")
    'µm'
    """
    if content.startswith((b"\xff\xfe", b"\xfe\xff")):
        return content.decode("utf-16", errors="replace")
    try:
        return content.decode("utf-8-sig")
    except UnicodeDecodeError:
        return content.decode("cp1252", errors="replace")
