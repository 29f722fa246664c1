"""Measured data from files, by menu and by drop, into a material of the job."""

from pathlib import Path

import pytest
from PySide6.QtCore import QMimeData, QPointF, Qt, QUrl
from PySide6.QtGui import QDropEvent

from app.window.beside import MATERIAL_DATA
from app.window.material_files import MOST, decoded
from tests.app.window.conftest import Bench

COLUMNS = "f (GHz);eps_r;tan d\n8;2,61;0,0062\n10;2,60;0,0065\n12;2,60;0,0069\n"


def measured(folder: Path, text: str = COLUMNS, name: str = "panel 7.csv", encoding: str = "utf-8") -> Path:
    """Write a file of columns."""
    path = folder / name
    path.write_bytes(text.encode(encoding))
    return path


def take(bench: Bench) -> None:
    """Take what the preview shows."""
    bench.window.panels.material_data.editor.page.preview.accept.click()


@pytest.mark.parametrize("encoding", ["utf-8", "utf-8-sig", "utf-16", "cp1252"])
def test_a_file_becomes_a_material(bench: Bench, tmp_path: Path, encoding: str) -> None:
    """It is shown first; taken, it is a material called like the file, with it as its source, in one step."""
    bench.dialogs.source_paths = [measured(tmp_path, encoding=encoding)]
    bench.trigger("file.import_material")
    page = bench.window.panels.material_data.editor.page
    assert bench.window._arrangement.shown(MATERIAL_DATA)
    assert not bench.session.modified
    take(bench)
    material = bench.session.record.material("panel 7")
    assert material is not None
    assert material.source == "Measured data, file panel 7.csv"
    rows = material.constants["rows"]
    assert isinstance(rows, tuple)
    assert len(rows) == 3
    assert page.name == "panel 7"
    bench.session.undo()
    assert bench.session.record.material("panel 7") is None


def test_a_second_file_of_the_name_is_another_material(bench: Bench, tmp_path: Path) -> None:
    """The name is made free with a number."""
    for _ in range(2):
        bench.dialogs.source_paths = [measured(tmp_path)]
        bench.trigger("file.import_material")
        take(bench)
    assert bench.session.record.material("panel 7-2") is not None


def test_cancel_leaves_the_job_as_it_was(bench: Bench, tmp_path: Path) -> None:
    """No material is made, and the editor shows what was chosen before."""
    before = bench.session.document
    bench.dialogs.source_paths = [measured(tmp_path)]
    bench.trigger("file.import_material")
    page = bench.window.panels.material_data.editor.page
    page.preview.cancel.click()
    assert bench.session.document is before
    assert not page.preview.isVisible()
    assert "panel 7" not in page.title.text()


def test_a_dropped_table_is_shown_and_a_dropped_job_is_opened(bench: Bench, tmp_path: Path) -> None:
    """The suffix says which of the two a file is."""
    data = QMimeData()
    data.setUrls([QUrl.fromLocalFile(str(measured(tmp_path)))])
    drop = QDropEvent(
        QPointF(50, 50),
        Qt.DropAction.CopyAction,
        data,
        Qt.MouseButton.LeftButton,
        Qt.KeyboardModifier.NoModifier,
    )
    bench.window.dropEvent(drop)
    take(bench)
    assert bench.session.record.material("panel 7") is not None
    assert bench.session.path is None


@pytest.mark.parametrize(("text", "words"), [("", "is empty"), ("\n\t \n", "is empty")])
def test_a_file_without_columns_is_told(bench: Bench, tmp_path: Path, text: str, words: str) -> None:
    """The reason and what is needed are told, and nothing opens."""
    bench.dialogs.source_paths = [measured(tmp_path, text)]
    bench.trigger("file.import_material")
    assert bench.window.messages.shown is not None
    assert words in bench.window.messages.shown.text
    assert not bench.window._arrangement.shown(MATERIAL_DATA)


def test_a_file_that_is_not_there_or_far_too_long_is_told(bench: Bench, tmp_path: Path) -> None:
    """Both are told with the reason."""
    huge = tmp_path / "huge.csv"
    with huge.open("wb") as file:
        file.truncate(MOST + 1)
    for path, words in ((tmp_path / "nowhere.csv", "No such file"), (huge, "20 MB")):
        bench.dialogs.source_paths = [path]
        bench.trigger("file.import_material")
        assert bench.window.messages.shown is not None
        assert words in bench.window.messages.shown.text


def test_bytes_that_are_no_utf_8_are_read_as_older_programs_wrote_them() -> None:
    """A micro sign of the Western code page is one."""
    assert decoded("30 µm".encode("cp1252")) == "30 µm"
