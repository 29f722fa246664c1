"""Every question the program asks, behind one protocol, so that tests can answer by script.

Nothing here waits: each question is given what to do with the answer, and the window lives on meanwhile.
"""

from collections.abc import Callable
from pathlib import Path
from typing import Final, Literal, Protocol

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QDialog, QFileDialog, QMessageBox, QWidget

SaveAnswer = Literal["save", "discard", "cancel"]
OverwriteAnswer = Literal["overwrite", "save as", "cancel"]

JOBS: Final = "Slabwright jobs (*.slabjob)"
ALL_FILES: Final = "All files (*)"
TABLES: Final = "Comma-separated values (*.csv)"


class Dialogs(Protocol):
    """The questions. `then` is called with the answer, and not at all when the person gives none."""

    def ask_save(self, name: str, then: Callable[[SaveAnswer], None]) -> None:
        """Ask what to do with the unsaved changes of the job called `name`."""

    def ask_overwrite(self, name: str, then: Callable[[OverwriteAnswer], None]) -> None:
        """Ask what to do when the file was changed by someone else since it was read."""

    def pick_open(self, folder: Path, then: Callable[[Path], None]) -> None:
        """Ask for a job file to open."""

    def pick_save(self, suggestion: Path, then: Callable[[Path], None]) -> None:
        """Ask where to save a job; overwriting is confirmed by the dialog itself."""

    def pick_csv(self, suggestion: Path, then: Callable[[Path], None]) -> None:
        """Ask where to write a CSV table; overwriting is confirmed by the dialog itself."""


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
        dialog = self._files("Open a job", folder)
        dialog.setFileMode(QFileDialog.FileMode.ExistingFile)
        dialog.setNameFilters([JOBS, ALL_FILES])
        dialog.fileSelected.connect(lambda name: then(Path(name)))
        dialog.open()

    def pick_save(self, suggestion: Path, then: Callable[[Path], None]) -> None:
        """Ask where to save a job."""
        self._pick_target("Save the job as", suggestion, JOBS, "slabjob", then)

    def pick_csv(self, suggestion: Path, then: Callable[[Path], None]) -> None:
        """Ask where to write a CSV table."""
        self._pick_target("Export CSV", suggestion, TABLES, "csv", then)

    def _pick_target(
        self, title: str, suggestion: Path, kind: str, suffix: str, then: Callable[[Path], None]
    ) -> None:
        dialog = self._files(title, suggestion.parent)
        dialog.setAcceptMode(QFileDialog.AcceptMode.AcceptSave)
        dialog.setNameFilters([kind, ALL_FILES])
        dialog.setDefaultSuffix(suffix)
        dialog.selectFile(suggestion.name)
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
