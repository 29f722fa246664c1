"""Plots and the wall drawing as files: pixels, drawing or page, as the suffix says."""

from collections.abc import Callable
from pathlib import Path

from app.look.pictures import KINDS, Picture, picture_bytes
from app.window.dialogs import PICTURES, Dialogs
from app.window.exporting import Tell
from stackcore.errors import nearest
from stackcore.job.replacing import replacing


class PictureFiles:
    """Asks where to write a picture and writes it; an older file of the name is untouched until all is written."""

    def __init__(self, folder: Callable[[str], Path], dialogs: Dialogs, tell: Tell) -> None:
        self._suggestion, self._dialogs, self._tell = folder, dialogs, tell

    def export(self, what: str, picture: Callable[[], Picture]) -> None:
        """Ask for a file for the picture of `what`, and write it as it looks when the file is named."""
        beside = self._suggestion(".png")
        suggestion = beside.with_name(f"{beside.stem} {what}.png")
        self._dialogs.pick_target(f"Export {what}", suggestion, PICTURES, lambda path: self.write(path, picture()))

    def write(self, path: Path, picture: Picture) -> None:
        """Write a picture as the suffix of `path` says."""
        given = path.suffix.lower().lstrip(".") or KINDS[0]
        kind = next((kind for kind in KINDS if kind == given), None)
        if kind is None:
            allowed = ", ".join(f".{kind}" for kind in KINDS)
            self._tell(f"No picture is written as .{given}{nearest(given, KINDS)}; allowed: {allowed}.", "error")
            return
        target = path if path.suffix else path.with_suffix(f".{kind}")
        try:
            with replacing(target) as file:
                file.write(picture_bytes(picture, kind))
        except OSError as error:
            self._tell(f"{target.name} could not be written: {error.strerror or error}. No file was left.", "error")
        else:
            self._tell(f"Exported {target.name}.", "note")
