"""The whole window: it opens, shows what it should, follows, and leaves nothing behind."""

import threading
from collections import Counter
from pathlib import Path

import pytest
from PySide6.QtCore import QMimeData, QPoint, QPointF, Qt, QUrl
from PySide6.QtGui import QDragEnterEvent, QDropEvent, QGuiApplication, QKeySequence
from PySide6.QtWidgets import (
    QAbstractItemView,
    QAbstractScrollArea,
    QApplication,
    QDockWidget,
    QMenu,
    QTextBrowser,
    QWidget,
)

from app.document import edits
from app.document.document import Selection
from app.look.settings import open_settings
from app.look.theme import DARK, LIGHT
from app.window.beside import BESIDE
from app.window.layout import VERSION
from app.window.panels import has_focus
from stackcore.errors import Fault
from tests.app.window.conftest import Bench, MakeWindow
from tests.app.window.scripted import JOB, job_file, small_job


def test_the_panels_stand_as_the_arrangement_says(bench: Bench) -> None:
    """The wall spans the top, about a third; the table is at the left, the curves are the larger part."""
    panels, window = bench.window.panels, bench.window

    def place(widget: QWidget) -> tuple[int, int, int, int]:
        corner = widget.mapTo(window, QPoint(0, 0))
        return corner.x(), corner.y(), widget.width(), widget.height()

    wall, table, curves, readings = map(place, (panels.wall, panels.elements, panels.curves, panels.readings))
    assert wall[2] == window.width()
    assert 0.25 < wall[3] / window.height() < 0.42
    assert table[1] > wall[1] + wall[3] - 1
    assert table[0] < curves[0]
    assert curves[2] > table[2]
    assert readings[1] > curves[1]
    assert curves[3] > readings[3]


def test_every_shortcut_is_unique(bench: Bench) -> None:
    """A key sequence used twice would silently do nothing."""
    table = bench.window.actions_table.table
    keys = Counter(
        QKeySequence(text).toString(QKeySequence.SequenceFormat.PortableText)
        for act in table
        for text in act.shortcuts
    )
    assert [text for text, count in keys.items() if count > 1] == []
    assert "" not in keys
    for expected in ("Ctrl+Q", "Ctrl+S", "Ctrl+Z", "Ctrl+Y", "Ctrl+Shift+Z", "F1", "F6"):
        assert expected in keys


def test_every_act_has_words_a_tip_and_an_access_key_of_its_own(bench: Bench) -> None:
    """Each entry has a tip; within a menu no access key is used twice, nor by two menus."""
    table = bench.window.actions_table.table
    assert len({act.key for act in table}) == len(table)
    for act in table:
        assert act.tip.endswith("."), act.key
    menus: dict[str, list[str]] = {}
    for act in table:
        menus.setdefault(act.menu, []).append(act.text)
    for texts in (list(menus), *menus.values()):
        letters = [text[text.index("&") + 1].lower() for text in texts]
        assert len(set(letters)) == len(letters), texts


def test_undo_says_what_it_would_take_back(bench: Bench) -> None:
    """The menu reads the sentence of the edit, and is off when there is nothing."""
    undo, redo = bench.window.actions_table["edit.undo"], bench.window.actions_table["edit.redo"]
    assert not undo.isEnabled()
    bench.session.apply(edits.set_thickness(0, 1, 0.0009))
    assert undo.text().replace("&", "") == "Undo set thickness of layer 2 to 0.9 mm"
    assert undo.isEnabled()
    undo.trigger()
    assert redo.text().replace("&", "") == "Redo set thickness of layer 2 to 0.9 mm"
    assert not undo.isEnabled()


def test_the_title_names_the_job_and_marks_changes(bench: Bench, tmp_path: Path) -> None:
    """The window's title has job and file, and the mark for unsaved changes."""
    assert bench.window.windowTitle() == "Harbour cover[*] – Slabwright"
    bench.session.apply(edits.set_title("Pier cover"))
    assert bench.window.windowTitle() == "Pier cover[*] – Slabwright"
    assert bench.window.isWindowModified()
    bench.dialogs.save_paths = [tmp_path / "pier.slabjob"]
    bench.trigger("file.save")
    assert bench.window.windowTitle() == "Pier cover – pier.slabjob[*] – Slabwright"
    assert not bench.window.isWindowModified()


def test_elements_can_be_added_moved_and_deleted_from_the_menu(bench: Bench) -> None:
    """Each act of the menu Edit makes one step on the selected element."""
    bench.session.select(Selection(0, (0,)))
    for key, sentence in (
        ("edit.down", "move element 1"),
        ("edit.duplicate", "duplicate element 2"),
        ("edit.delete", "delete element 3"),
        ("edit.add_layer", "add layer"),
        ("edit.add_sheet", "add sheet"),
    ):
        bench.trigger(key)
        assert bench.session.undo_sentence.startswith(sentence)
    bench.session.select(Selection(0, (0,)))
    assert not bench.window.actions_table["edit.up"].isEnabled()
    assert bench.window.actions_table["edit.down"].isEnabled()


def test_stacks_can_be_added_looked_at_and_deleted(bench: Bench) -> None:
    """The menu Stack works on the list of stacks; the last one cannot be deleted."""
    bench.trigger("stack.next")
    assert bench.session.selection.stack == 1
    bench.trigger("stack.previous")
    bench.trigger("stack.previous")
    assert bench.session.selection.stack == 2
    bench.trigger("stack.duplicate")
    bench.trigger("stack.add")
    assert [stack.name for stack in bench.session.record.stacks] == ["A", "B", "C", "D", "E"]
    for _ in range(4):
        bench.trigger("stack.delete")
    assert len(bench.session.record.stacks) == 1
    assert not bench.window.actions_table["stack.delete"].isEnabled()


def test_markers_are_added_in_the_gaps_and_gone_through(bench: Bench) -> None:
    """New markers fall into the widest gap; next and previous go round in frequency; remove removes."""
    for _ in range(3):
        bench.trigger("markers.remove")
    assert bench.view.state.markers == ()
    for _ in range(3):
        bench.trigger("markers.add")
    assert sorted(bench.view.state.markers) == pytest.approx([9e9, 10e9, 11e9])
    seen: list[float] = []
    for _ in range(3):
        bench.trigger("markers.next")
        seen.append(bench.view.state.markers[bench.view.state.active_marker])
    assert sorted(seen) == pytest.approx([9e9, 10e9, 11e9])
    bench.trigger("markers.worst")
    bench.settle()
    answer = bench.window.recompute.answer
    assert answer is not None
    transmittance = answer.response.transmittance
    at: float = bench.view.state.markers[bench.view.state.active_marker]
    place = int(abs(answer.response.frequency - at).argmin())
    assert transmittance[place].min() == transmittance.min()


@pytest.mark.parametrize(("choice", "theme"), [("dark", DARK), ("light", LIGHT)])
def test_the_theme_is_taken_and_remembered(
    bench: Bench, make_bench: MakeWindow, choice: str, theme: object
) -> None:
    """The menu changes the look of everything at once, and the next window has it too."""
    bench.trigger(f"view.{choice}")
    assert bench.window.theme is theme
    assert bench.window.actions_table[f"view.{choice}"].isChecked()
    other = make_bench(small_job())
    assert other.window.theme is theme


def test_f6_goes_round_all_visible_panels(bench: Bench) -> None:
    """F6 reaches every panel that is shown and comes back; Shift+F6 goes the other way."""
    bench.trigger("view.materials")
    shown = [panel for panel in bench.window.panels.in_order if panel.isVisible()]
    assert len(shown) == 6
    order: list[QWidget] = []
    for _ in range(len(shown)):
        bench.press(Qt.Key.Key_F6)
        order.append(next(panel for panel in shown if has_focus(panel)))
    assert set(order) == set(shown)
    now = order[-1]
    bench.press(Qt.Key.Key_F6, Qt.KeyboardModifier.ShiftModifier)
    assert has_focus(shown[(shown.index(now) - 1) % len(shown)])


def test_materials_open_beside_and_never_over(bench: Bench) -> None:
    """The materials panel is a pane of the window, shown and hidden by its act."""
    assert not bench.window.panels.materials.isVisible()
    bench.trigger("view.materials")
    assert bench.window.panels.materials.isVisible()
    assert not bench.window.panels.materials.isWindow()
    assert bench.window.actions_table["view.materials"].isChecked()
    assert QApplication.activeModalWidget() is None
    bench.trigger("view.materials")
    assert not bench.window.panels.materials.isVisible()


def test_title_and_notes_are_typed_beside(bench: Bench) -> None:
    """What is typed is in the job at once, in one go it is one step to undo, and both follow undo."""
    bench.trigger("view.notes")
    notes = bench.window.panels.notes
    notes.title.setFocus()
    notes.title.selectAll()
    bench.type("Pier cover")
    assert bench.session.record.title == "Pier cover"
    bench.press(Qt.Key.Key_Tab)
    bench.type("for the pier")
    assert bench.session.record.notes == "for the pier"
    while bench.session.undo_sentence == "change notes":
        bench.session.undo()
    assert notes.notes.toPlainText() == ""
    bench.session.undo()
    assert notes.title.text() == "Harbour cover"


def test_help_is_local_beside_and_at_the_quantity(bench: Bench) -> None:
    """F1 shows the definitions in a pane; the other pages show keys, cautions and versions."""
    help_panel = bench.window.panels.help
    bench.press(Qt.Key.Key_F1)
    assert help_panel.isVisible()
    assert "Conventions and definitions" in help_panel.shown_text()
    text = help_panel.findChild(QTextBrowser)
    assert text is not None
    bar = text.verticalScrollBar()
    assert bar.value() > 0
    bench.trigger("help.keyboard")
    assert "Ctrl+Shift+S" in help_panel.shown_text()
    assert bar.value() == 0
    bench.trigger("help.cautions")
    assert "verify by test" in help_panel.shown_text()
    bench.trigger("help.about")
    assert "LGPL" in help_panel.shown_text()


def test_how_power_is_shown_stays_for_the_next_job_and_the_next_window(
    bench: Bench, make_bench: MakeWindow
) -> None:
    """Per cent once chosen is chosen for the next job, and in the next window too."""
    bench.view.set(power="percent")
    bench.trigger("file.new")
    bench.settle()
    assert bench.view.state.power == "percent"
    assert {curve.unit for curve in bench.window.panels.curves.curves} == {"%"}
    other = make_bench(small_job())
    assert other.view.state.power == "percent"


def test_diagnostics_go_to_the_clipboard(bench: Bench) -> None:
    """Versions and platform are copied; nothing of the job is."""
    bench.trigger("help.diagnostics")
    text = QGuiApplication.clipboard().text()
    assert "numpy" in text
    assert "platform offscreen" in text
    assert "Harbour" not in text


def test_esc_dismisses_the_message(bench: Bench) -> None:
    """Esc takes the message away, wherever the focus is."""
    bench.window.messages.tell("Something to know.", "warning")
    bench.press(Qt.Key.Key_Escape)
    assert bench.window.messages.shown is None


def test_a_dropped_file_opens(bench: Bench, tmp_path: Path) -> None:
    """One local file dropped on the window is opened; two, or none, are not welcome."""
    path = job_file(tmp_path)

    def data(*urls: QUrl) -> QMimeData:
        data = QMimeData()
        data.setUrls(list(urls))
        return data

    def enter(data: QMimeData) -> bool:
        event = QDragEnterEvent(
            QPoint(50, 50),
            Qt.DropAction.CopyAction,
            data,
            Qt.MouseButton.LeftButton,
            Qt.KeyboardModifier.NoModifier,
        )
        event.ignore()
        QApplication.sendEvent(bench.window, event)
        return event.isAccepted()

    url = QUrl.fromLocalFile(str(path))
    assert not enter(data())
    assert enter(data(url, url))
    assert not enter(data(QUrl("https://example.org/cover.slabjob")))
    mime = data(url)
    assert enter(mime)
    drop = QDropEvent(
        QPointF(50, 50),
        Qt.DropAction.CopyAction,
        mime,
        Qt.MouseButton.LeftButton,
        Qt.KeyboardModifier.NoModifier,
    )
    QApplication.sendEvent(bench.window, drop)
    assert bench.session.path == path


def test_recent_and_sample_menus_are_filled(bench: Bench, tmp_path: Path) -> None:
    """A file that is gone is greyed and not deleted from the list; samples are listed by title."""
    path, gone = job_file(tmp_path), job_file(tmp_path, "gone.slabjob")
    for each in (path, gone):
        bench.window.open_path(each)
    gone.unlink()
    menus = {menu.objectName(): menu for menu in bench.window.findChildren(QMenu)}
    recent = menus["file.recent"]
    recent.aboutToShow.emit()
    entries = {action.text(): action.isEnabled() for action in recent.actions()}
    assert entries == {"&1 gone.slabjob": False, "&2 cover.slabjob": True}
    samples = menus["file.sample"]
    samples.actions()[0].trigger()
    assert bench.session.path is None
    assert bench.session.record.title == samples.actions()[0].text()


def test_closing_an_unsaved_job_asks_and_cancel_keeps_it_open(bench: Bench, tmp_path: Path) -> None:
    """Cancel leaves the window as it is; Save writes the file and closes."""
    bench.session.apply(edits.set_title("Unsaved"))
    bench.dialogs.save = ["cancel"]
    bench.trigger("file.quit")
    assert bench.window.isVisible()
    bench.dialogs.save = ["save"]
    bench.dialogs.save_paths = [tmp_path / "kept.slabjob"]
    bench.trigger("file.quit")
    assert not bench.window.isVisible()
    assert (tmp_path / "kept.slabjob").exists()


def test_closing_ends_every_thread_and_removes_the_recovery_file(bench: Bench, program_home: Path) -> None:
    """After closing nothing runs and nothing is kept that was given up."""
    bench.session.apply(edits.set_title("Unsaved"))
    bench.window._recovery.write()
    folder = program_home / "state" / "recovery"
    assert list(folder.glob("*.recovery")) != []
    bench.dialogs.save = ["discard"]
    bench.window.close()
    assert list(folder.glob("*.recovery")) == []
    assert [thread.name for thread in threading.enumerate() if not thread.daemon] == ["MainThread"]
    assert not any(thread.name in {"live lane", "CSV export"} for thread in threading.enumerate())


def test_unsaved_work_of_a_crashed_session_is_offered(bench: Bench, make_bench: MakeWindow) -> None:
    """The next start offers what was left; Recover brings it back as unsaved changes."""
    bench.session.apply(edits.set_title("Half done"))
    bench.window._recovery.write()
    bench.window._recovery._lock.unlock()  # what the end of a process does
    other = make_bench(small_job())
    other.show()
    other.window.offer_leftovers()
    message = other.window.messages.shown
    assert message is not None
    assert "Half done" in message.text
    assert [choice.words for choice in message.choices] == ["Recover", "Discard", "Later"]
    message.choices[0].act()
    assert other.session.record.title == "Half done"
    assert other.session.modified
    other.settle()


def test_the_layout_is_remembered_and_reset(bench: Bench, make_bench: MakeWindow) -> None:
    """Shares that the user changed come back in the next window; Reset layout gives the first ones."""
    whole = bench.window._arrangement.splitters[0]
    first = whole.sizes()
    whole.setSizes([first[0] + 120, first[1] - 120])
    moved = whole.sizes()
    bench.trigger("view.materials")
    bench.window.close()
    assert open_settings().value("layout/version", 0, type=int) == VERSION
    other = make_bench(small_job())
    other.show()
    assert other.window._arrangement.splitters[0].sizes() == pytest.approx(moved, abs=40)
    assert other.window.panels.materials.isVisible()
    other.trigger("view.reset")
    assert other.window._arrangement.splitters[0].sizes()[0] < moved[0]
    assert not other.window.panels.materials.isVisible()
    docks = {dock.windowTitle() for dock in other.window.findChildren(QDockWidget)}
    assert docks == {beside.title for beside in BESIDE}


def test_a_layout_that_makes_no_sense_is_forgotten(make_bench: MakeWindow) -> None:
    """Settings that make no sense give the first layout rather than a broken window."""
    settings = open_settings()
    settings.setValue("layout/version", VERSION)
    settings.setValue("layout/geometry", "nonsense")
    settings.setValue("layout/state", "nonsense")
    settings.sync()
    bench = make_bench(small_job())
    bench.show()
    wall = bench.window.panels.wall.height()
    assert 0.25 < wall / bench.window.height() < 0.42


def test_a_stack_that_cannot_be_computed_is_told_in_the_strip(bench: Bench) -> None:
    """A failure is told with every fault, and taken back with the next answer."""
    bench.window.recompute.failed.emit((Fault("stacks[0]", "has no answer"), Fault("sweep", "is too long")))
    message = bench.window.messages.shown
    assert message is not None
    assert message.text.startswith("This stack cannot be computed")
    assert message.details == ("stacks[0]: has no answer", "sweep: is too long")
    bench.session.apply(edits.set_thickness(0, 1, 0.003))
    bench.settle()
    assert bench.window.messages.shown is None


def test_the_status_line_has_cautions_and_counts(bench: Bench) -> None:
    """What the result does not say stands at the left, points and time at the right."""
    assert bench.window.status.cautions.words.endswith("Infinite flat sheets, plane wave; verify by test.")
    assert bench.window.status.told.startswith("41 frequencies × 2 angles")
    bench.view.set(quantity="shielding_effectiveness_dB")
    assert "seams and apertures" in bench.window.status.cautions.words
    bench.window.status.cautions.click()
    assert "seams" in bench.window.panels.help.shown_text().lower()


def test_opening_a_job_shows_what_says_something(bench: Bench, tmp_path: Path) -> None:
    """A job that begins with a metal back is looked at in return loss, also after another view."""
    path = tmp_path / "absorber.slabjob"
    path.write_text(JOB.replace('"back": "air"', '"back": "metal"', 1), encoding="utf-8")
    bench.window.open_path(path)
    assert bench.view.state.quantity == "return_loss_dB"
    bench.settle()


def test_an_element_of_the_drawing_is_edited_in_the_table(bench: Bench) -> None:
    """What the drawing wants edited becomes the open cell of the table: thickness, of a sheet resistance."""
    bench.session.apply(edits.add_sheet(0, 1))
    table = bench.window.panels.elements.table
    for row, column in ((0, "thickness"), (1, "resistance")):
        bench.window.panels.wall.edit_requested.emit(row)
        index = table.currentIndex()
        assert (index.row(), table.elements_model().columns[index.column()].name) == (row + 1, column)
        assert table.state() == QAbstractItemView.State.EditingState
        bench.press(Qt.Key.Key_Escape)


def test_what_is_pointed_at_is_said_in_the_status_line(bench: Bench) -> None:
    """The words of the plot stand in the status line as long as it points at something."""
    bench.window.panels.curves.pointed.emit("9 GHz: TE 0.9")
    assert bench.window.status.currentMessage() == "9 GHz: TE 0.9"
    bench.window.panels.curves.pointed.emit("")
    assert bench.window.status.currentMessage() == ""


def test_a_passing_note_stands_where_the_cautions_do(bench: Bench) -> None:
    """The same words look the same, whether they are a caution or a note that passes."""
    status = bench.window.status
    standing = status.grab().toImage()
    status.note(status.cautions.words)
    assert not status.cautions.isVisible()
    assert status.grab().toImage() == standing


def test_every_control_has_a_name(bench: Bench) -> None:
    """Whatever takes the keyboard focus says what it is to a screen reader."""
    bench.trigger("view.materials")
    bench.trigger("help.conventions")
    nameless = [
        f"{type(widget).__name__} in {type(widget.parent()).__name__}"
        for widget in bench.window.findChildren(QWidget)
        if widget.focusPolicy() & Qt.FocusPolicy.TabFocus
        and widget.isVisible()
        and not isinstance(widget.parent(), QAbstractScrollArea)  # its viewport: the area has the name
        and not _name(widget)
    ]
    assert nameless == []


def _name(widget: QWidget) -> str:
    if widget.accessibleName():
        return widget.accessibleName()
    text = getattr(widget, "text", None)
    return str(text()) if callable(text) and not hasattr(widget, "setReadOnly") else ""


def test_constants_and_curves_open_below_the_materials(bench: Bench) -> None:
    """Both panels are seen at once; the one below shows what is chosen above, and F6 reaches it."""
    bench.window.resize(1600, 1000)
    bench.trigger("view.materials")
    bench.window.panels.materials.detail_wanted.emit()
    materials, data = bench.window.panels.materials, bench.window.panels.material_data
    bench.qtbot.waitUntil(lambda: data.isVisible() and materials.isVisible())
    assert bench.window.actions_table["view.material_data"].isChecked()
    above = materials.mapTo(bench.window, materials.rect().bottomLeft())
    assert data.mapTo(bench.window, data.rect().topLeft()).y() > above.y()
    name = bench.window.panels.materials.table.materials_model().lines[-1].name
    materials.table.go_to(name, "name")

    assert data.editor.page.name == name
    assert len(data.curves.curves) == 1
    bench.trigger("view.material_data")
    assert not data.isVisible()


def test_constants_and_curves_are_a_tab_in_a_low_window(bench: Bench) -> None:
    """With little height they share the place of the materials, in front when asked for."""
    bench.window.resize(1200, 750)
    bench.trigger("view.materials")
    bench.trigger("view.material_data")
    materials, data = bench.window.panels.materials, bench.window.panels.material_data
    bench.qtbot.waitUntil(lambda: not data.visibleRegion().isEmpty())

    assert materials.visibleRegion().isEmpty()
    bench.qtbot.waitUntil(lambda: data.height() > 400)
