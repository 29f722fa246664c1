"""The real dialogs: verbs on their buttons, Esc cancels, nothing waits."""

from pathlib import Path

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QFileDialog, QMessageBox, QWidget
from pytestqt.qtbot import QtBot

from app.window.dialogs import PICTURES, TABLES, OverwriteAnswer, QtDialogs, SaveAnswer


@pytest.fixture
def parent(qtbot: QtBot, dialogs_may_open: list[str]) -> QWidget:
    """A shown window to be above; the file dialogs are those of Qt, not of a desktop."""
    QApplication.setAttribute(Qt.ApplicationAttribute.AA_DontUseNativeDialogs)
    widget = QWidget()
    qtbot.addWidget(widget)
    widget.show()
    qtbot.waitExposed(widget)
    return widget


def question(parent: QWidget) -> QMessageBox:
    """Return the one question that is open."""
    (box,) = parent.findChildren(QMessageBox)
    return box


@pytest.mark.parametrize(
    ("press", "answer"), [("Save", "save"), ("Discard", "discard"), ("Cancel", "cancel"), ("", "cancel")]
)
def test_unsaved_changes_are_asked_with_verbs(qtbot: QtBot, parent: QWidget, press: str, answer: str) -> None:
    """Save is the usual answer, Esc (here: no button) cancels, and the call itself does not wait."""
    answers: list[SaveAnswer] = []
    QtDialogs(parent).ask_save("cover", answers.append)
    box = question(parent)
    assert answers == []
    assert "cover" in box.text()
    assert [button.text() for button in (box.defaultButton(), box.escapeButton())] == ["Save", "Cancel"]
    if press:
        next(button for button in box.buttons() if button.text() == press).click()
    else:
        QTest.keyClick(box, Qt.Key.Key_Escape)
    qtbot.waitUntil(lambda: answers == [answer])


@pytest.mark.parametrize(
    ("press", "answer"), [("Save as…", "save as"), ("Overwrite", "overwrite"), ("Cancel", "cancel")]
)
def test_a_file_changed_by_others_is_asked_about(qtbot: QtBot, parent: QWidget, press: str, answer: str) -> None:
    """The usual answer is the one that loses nothing."""
    answers: list[OverwriteAnswer] = []
    QtDialogs(parent).ask_overwrite("cover.slabjob", answers.append)
    box = question(parent)
    assert box.defaultButton().text() == "Save as…"
    next(button for button in box.buttons() if button.text() == press).click()
    qtbot.waitUntil(lambda: answers == [answer])


def test_a_picked_file_is_handed_on(qtbot: QtBot, parent: QWidget, tmp_path: Path) -> None:
    """Opening gives an existing file, saving adds the suffix, and rejecting gives nothing."""
    there = tmp_path / "there.slabjob"
    there.write_text("{}")
    picked: list[Path] = []
    dialogs = QtDialogs(parent)

    def answer(name: str | None) -> None:
        (dialog,) = parent.findChildren(QFileDialog)
        if name is None:
            dialog.reject()
        else:
            dialog.selectFile(name)
            dialog.accept()
        qtbot.waitUntil(lambda: not parent.findChildren(QFileDialog))

    dialogs.pick_open(tmp_path, picked.append)
    answer("there.slabjob")
    dialogs.pick_save(tmp_path / "new", picked.append)
    answer("new")
    dialogs.pick_target("Export CSV", tmp_path / "table.csv", (TABLES,), picked.append)
    answer("table")
    dialogs.pick_open(tmp_path, picked.append)
    answer(None)
    assert picked == [there, tmp_path / "new.slabjob", tmp_path / "table.csv"]


def test_another_kind_of_file_changes_the_suffix(qtbot: QtBot, tmp_path: Path) -> None:
    """Choosing a drawing instead of pixels names the file so; a name typed without a suffix gets it."""
    parent = QWidget()
    qtbot.addWidget(parent)
    parent.show()
    picked: list[Path] = []
    QtDialogs(parent).pick_target("Export plot", tmp_path / "loss.png", PICTURES, picked.append)
    (dialog,) = parent.findChildren(QFileDialog)
    dialog.selectNameFilter(PICTURES[1].filter)
    dialog.filterSelected.emit(PICTURES[1].filter)
    assert Path(dialog.selectedFiles()[0]).name == "loss.svg"
    dialog.selectFile("other")
    dialog.accept()
    qtbot.waitUntil(lambda: not parent.findChildren(QFileDialog))
    assert picked == [tmp_path / "other.svg"]
