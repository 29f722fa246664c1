"""Every question the program asks, behind one protocol, so that tests can answer by script.

Nothing here waits: each question is given what to do with the answer, and the window lives on meanwhile.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Final, Literal, Protocol

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QDialog, QFileDialog, QMessageBox, QWidget

SaveAnswer = Literal["save", "discard", "cancel"]
OverwriteAnswer = Literal["overwrite", "save as", "cancel"]

ALL_FILES: Final = "All files (*)"


@dataclass(frozen=True, slots=True)
class FileKind:
    """A kind of file: words for people, and the suffix without its dot."""

    words: str
    suffix: str

    @property
    def filter(self) -> str:
        """The line of a file dialog."""
        return f"{self.words} (*.{self.suffix})"


JOBS: Final = FileKind("Slabwright jobs", "slabjob")
TABLES: Final = FileKind("Comma-separated values", "csv")
PICTURES: Final = (
    FileKind("Picture in pixels", "png"),
    FileKind("Drawing", "svg"),
    FileKind("Page", "pdf"),
)
"""What a plot or the wall can be written as."""


class Dialogs(Protocol):
    """The questions. `then` is called with the answer, and not at all when the person gives none."""

    def ask_save(self, name: str, then: Callable[[SaveAnswer], None]) -> None:
        """Ask what to do with the unsaved changes of the job called `name`."""

    def ask_overwrite(self, name: str, then: Callable[[OverwriteAnswer], None]) -> None:
        """Ask what to do when the file was changed by someone else since it was read."""

    def pick_open(self, folder: Path, then: Callable[[Path], None]) -> None:
        """Ask for a job file to open."""

    def pick_source(
        self, title: str, folder: Path, kinds: Sequence[FileKind], then: Callable[[Path], None]
    ) -> None:
        """Ask for a file of one of `kinds` to be read."""

    def pick_save(self, suggestion: Path, then: Callable[[Path], None]) -> None:
        """Ask where to save a job; overwriting is confirmed by the dialog itself."""

    def pick_target(
        self, title: str, suggestion: Path, kinds: Sequence[FileKind], then: Callable[[Path], None]
    ) -> None:
        """Ask where to write a file of one of `kinds`; overwriting is confirmed by the dialog itself.

        The path that is picked has a suffix: that of the kind chosen, unless another was typed.
        """


class QtDialogs:
    """The real dialogs, opened without waiting, above `parent`."""

    def __init__(self, parent: QWidget) -> None:
        self._parent = parent

    def ask_save(self, name: str, then: Callable[[SaveAnswer], None]) -> None:
        """Ask with Save (the usual answer), Discard, and Cancel (Esc)."""
        box = self._question(f"Save the changes to {name}?", "Without saving, the changes are lost.")
        save = box.addButton("Save", QMessageBox.ButtonRole.AcceptRole)
        discard = box.addButton("Discard", QMessageBox.ButtonRole.DestructiveRole)
        cancel = box.addButton("Cancel", QMessageBox.ButtonRole.RejectRole)
        box.setDefaultButton(save)
        box.setEscapeButton(cancel)

        def answer() -> None:
            clicked = box.clickedButton()
            then("save" if clicked is save else "discard" if clicked is discard else "cancel")

        box.finished.connect(answer)
        box.open()

    def ask_overwrite(self, name: str, then: Callable[[OverwriteAnswer], None]) -> None:
        """Ask with Save as (the usual answer), Overwrite, and Cancel (Esc)."""
        text = "Overwriting it loses what the other program or person wrote."
        box = self._question(f"{name} was changed on disk since it was read.", text)
        elsewhere = box.addButton("Save as…", QMessageBox.ButtonRole.AcceptRole)
        overwrite = box.addButton("Overwrite", QMessageBox.ButtonRole.DestructiveRole)
        cancel = box.addButton("Cancel", QMessageBox.ButtonRole.RejectRole)
        box.setDefaultButton(elsewhere)
        box.setEscapeButton(cancel)

        def answer() -> None:
            clicked = box.clickedButton()
            then("save as" if clicked is elsewhere else "overwrite" if clicked is overwrite else "cancel")

        box.finished.connect(answer)
        box.open()

    def pick_open(self, folder: Path, then: Callable[[Path], None]) -> None:
        """Ask for a job file to open."""
        self.pick_source("Open a job", folder, (JOBS,), then)

    def pick_source(
        self, title: str, folder: Path, kinds: Sequence[FileKind], then: Callable[[Path], None]
    ) -> None:
        """Ask for a file to be read; all kinds are shown together first."""
        dialog = self._files(title, folder)
        dialog.setFileMode(QFileDialog.FileMode.ExistingFile)
        together = " ".join(f"*.{kind.suffix}" for kind in kinds)
        dialog.setNameFilters([f"{kinds[0].words if len(kinds) == 1 else 'Data'} ({together})", ALL_FILES])
        dialog.fileSelected.connect(lambda name: then(Path(name)))
        dialog.open()

    def pick_save(self, suggestion: Path, then: Callable[[Path], None]) -> None:
        """Ask where to save a job."""
        self.pick_target("Save the job as", suggestion, (JOBS,), then)

    def pick_target(
        self, title: str, suggestion: Path, kinds: Sequence[FileKind], then: Callable[[Path], None]
    ) -> None:
        """Ask where to write a file; another kind chosen changes the suffix of the name."""
        dialog = self._files(title, suggestion.parent)
        dialog.setAcceptMode(QFileDialog.AcceptMode.AcceptSave)
        suffixes = {kind.filter: kind.suffix for kind in kinds}
        dialog.setNameFilters([*suffixes, ALL_FILES])
        dialog.setDefaultSuffix(kinds[0].suffix)
        dialog.selectFile(suggestion.name)

        def follow(chosen: str) -> None:
            suffix = suffixes.get(chosen)
            names = dialog.selectedFiles()
            if suffix is not None:
                dialog.setDefaultSuffix(suffix)
                if names:
                    dialog.selectFile(Path(names[0]).with_suffix(f".{suffix}").name)

        dialog.filterSelected.connect(follow)
        dialog.fileSelected.connect(lambda name: then(Path(name)))
        dialog.open()

    def _files(self, title: str, folder: Path) -> QFileDialog:
        dialog = QFileDialog(self._parent, title, str(folder))
        dialog.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        return dialog

    def _question(self, text: str, explanation: str) -> QMessageBox:
        box = QMessageBox(self._parent)
        box.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        box.setIcon(QMessageBox.Icon.Question)
        box.setWindowTitle("Slabwright")
        box.setText(text)
        box.setInformativeText(explanation)
        return box


def close_open_dialogs(parent: QWidget) -> None:
    """Close every dialog above `parent` that is still open, unanswered."""
    for dialog in parent.findChildren(QDialog):
        if dialog.isVisible():
            dialog.reject()
