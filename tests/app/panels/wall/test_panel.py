"""The panel: hands and keys change the session, answers become rays, and it can be read and heard."""

from pathlib import Path

import pytest
from PySide6.QtCore import QCoreApplication, QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QHelpEvent, QImage, QMouseEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QToolTip
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import Selection
from app.document.session import Session
from app.document.view import View
from app.look.theme import DARK, LIGHT, THEMES
from app.panels.wall.layout import Face
from app.panels.wall.panel import WallPanel
from app.panels.wall.rays import Powers
from stackcore.errors import Severity
from stackcore.job.records import LayerRecord
from stackcore.job.store import write_job
from tests.app.panels.results import answer_to
from tests.app.panels.wall.walls import sandwich

MIDDLE = 120


class Desk:
    """A panel with its session and view, and what it said."""

    def __init__(self, qtbot: QtBot) -> None:
        self.qtbot = qtbot
        self.session = Session(sandwich())
        self.view = View()
        self.said: list[tuple[str, Severity]] = []
        self.panel = WallPanel(self.session, self.view, LIGHT, lambda text, kind: self.said.append((text, kind)))
        qtbot.addWidget(self.panel)
        self.panel.resize(1200, 250)
        self.panel.show()

    def rows(self) -> tuple[int, ...]:
        """Return what is selected."""
        return self.session.selection.rows

    def powers(self) -> Powers | None:
        """Return what the drawn wave carries."""
        return self.panel.wave.powers

    def thickness(self, row: int) -> float:
        """Return the thickness of a layer in the session's job."""
        element = self.session.record.stacks[0].elements[row]
        assert isinstance(element, LayerRecord)
        return element.thickness.value

    def face(self, row: int, side: str = "back") -> Face:
        """Return a face as it is drawn now."""
        return next(face for face in self.panel.layout_now.faces() if (face.row, face.side) == (row, side))

    def send(self, kind: QEvent.Type, x: float, y: float = MIDDLE, *, held: bool = True) -> None:
        """Send a mouse event to the panel."""
        button = Qt.MouseButton.LeftButton
        moving = kind == QEvent.Type.MouseMove
        event = QMouseEvent(
            kind,
            QPointF(x, y),
            self.panel.mapToGlobal(QPointF(x, y)),
            Qt.MouseButton.NoButton if moving else button,
            button if held and kind != QEvent.Type.MouseButtonRelease else Qt.MouseButton.NoButton,
            Qt.KeyboardModifier.NoModifier,
        )
        QCoreApplication.sendEvent(self.panel, event)

    def press(self, x: float, y: float = MIDDLE) -> None:
        """Press the left button."""
        self.send(QEvent.Type.MouseButtonPress, x, y)

    def drag_to(self, x: float) -> None:
        """Move with the button held."""
        self.send(QEvent.Type.MouseMove, x)

    def release(self, x: float, y: float = MIDDLE) -> None:
        """Let go."""
        self.send(QEvent.Type.MouseButtonRelease, x, y)

    def key(self, key: Qt.Key, modifiers: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier) -> None:
        """Press a key in the panel."""
        QTest.keyClick(self.panel, key, modifiers)


@pytest.fixture
def desk(qtbot: QtBot) -> Desk:
    """Return a panel that shows a sandwich with a sheet."""
    return Desk(qtbot)


def test_dragging_a_face_changes_that_layer_under_the_hand(desk: Desk) -> None:
    """At every movement the face stays within a pixel of the hand, and only this layer gets thicker."""
    start = desk.face(1).x
    desk.press(start + 1)
    for way in (4, 10, 25, 40):
        desk.drag_to(start + 1 + way)
        assert desk.face(1).x == pytest.approx(start + way, abs=1.5)
    thicker = desk.thickness(1)
    desk.release(start + 41)
    assert thicker > 6e-3
    assert desk.thickness(1) == thicker
    assert (desk.thickness(0), desk.thickness(3)) == (1e-3, 0.8e-3)
    assert desk.rows() == (1,)


def test_a_whole_drag_is_one_step_to_undo(desk: Desk) -> None:
    """One undo after twenty movements gives the document of before, and the next drag is a step of its own."""
    before = desk.session.document
    for target in (30, -20):
        start = desk.face(1).x
        desk.press(start)
        for step in range(1, 21):
            desk.drag_to(start + target * step / 20)
        desk.release(start + target)
    assert desk.session.undo_sentence.startswith("set thickness of layer 2 to ")
    desk.session.undo()
    assert desk.session.document != before
    desk.session.undo()
    assert desk.session.document == before
    assert desk.session.undo_sentence == ""


def test_escape_puts_the_face_back(desk: Desk) -> None:
    """Esc during a drag returns to the start; moving on afterwards does nothing."""
    before = desk.session.document
    start = desk.face(1).x
    desk.press(start)
    desk.drag_to(start + 30)
    assert desk.session.document != before
    desk.key(Qt.Key.Key_Escape)
    assert desk.session.document == before
    desk.drag_to(start + 60)
    desk.release(start + 60)
    assert desk.session.document == before
    assert desk.session.undo_sentence == ""


def test_escape_after_coming_back_takes_nothing_else_away(desk: Desk) -> None:
    """A drag that ended where it began has no step of its own, so that Esc must not undo the step before."""
    desk.session.apply(edits.set_title("Harbour cover"))
    start = desk.face(1).x
    desk.press(start)
    desk.drag_to(start + 20)
    desk.drag_to(start)
    desk.key(Qt.Key.Key_Escape)
    assert desk.session.record.title == "Harbour cover"
    assert desk.thickness(1) == 6e-3


def test_the_front_face_opens_the_first_layer_toward_the_wave(desk: Desk) -> None:
    """Dragging the outer face to the left thickens the first layer; the rest stays where it is."""
    start, back = desk.face(0, "front").x, desk.face(3).x
    desk.press(start)
    desk.drag_to(start - 20)
    assert desk.face(0, "front").x == pytest.approx(start - 20, abs=1.5)
    assert desk.face(3).x == pytest.approx(back)
    desk.release(start - 20)
    assert desk.thickness(0) > 1e-3


def test_a_selected_layer_is_the_one_that_changes(desk: Desk) -> None:
    """The face between two layers belongs to the one behind when only that is selected."""
    desk.session.select(Selection(0, (1,)))
    start = desk.face(1, "front").x
    desk.press(start)
    desk.drag_to(start - 20)
    desk.release(start - 20)
    assert desk.thickness(1) > 6e-3
    assert desk.thickness(0) == 1e-3


def test_a_layer_can_be_closed_to_nothing_and_not_further(desk: Desk) -> None:
    """Beyond the other face the thickness is 0, and the layer can be pulled open again."""
    start = desk.face(0).x
    desk.press(start)
    desk.drag_to(start - 500)
    assert desk.thickness(0) == 0
    desk.drag_to(start)
    assert desk.thickness(0) == pytest.approx(1e-3, rel=0.03)
    desk.release(start)


def test_while_dragging_the_thickness_is_shown_at_the_face(desk: Desk) -> None:
    """A tag in the accent colour is beside the hand during the drag and gone after it."""

    def tag() -> int:
        image = desk.panel.grab().toImage()
        x = round(desk.face(1).x)
        beside = [*range(x - 45, x - 12), *range(x + 12, x + 45)]
        return sum(image.pixel(left, y) == pixel(LIGHT.accent) for left in beside for y in range(80, 120))

    start = desk.face(1).x
    assert tag() == 0
    desk.press(start)
    desk.drag_to(start + 25)
    assert tag() > 200
    desk.release(start + 25)
    desk.send(QEvent.Type.MouseMove, 5, held=False)
    assert tag() == 0


def pixel(colour: str) -> int:
    """Return a colour as a picture holds it."""
    return int(colour.removeprefix("#"), 16) | 0xFF000000


def count(image: QImage, colour: str) -> int:
    """Return how many pixels have a colour."""
    return sum(image.pixel(x, y) == pixel(colour) for x in range(image.width()) for y in range(image.height()))


def test_someone_elses_edit_ends_the_drag(desk: Desk) -> None:
    """When the document changes under the hand the drag is over, and moving on changes nothing."""
    start = desk.face(1).x
    desk.press(start)
    desk.drag_to(start + 10)
    desk.session.apply(edits.delete(0, (1,)))
    after = desk.session.document
    desk.drag_to(start + 60)
    desk.release(start + 60)
    assert desk.session.document == after


def test_a_press_without_movement_selects(desk: Desk) -> None:
    """A click selects the element under it, also on a sheet's line; beside the wall it selects nothing."""
    layout = desk.panel.layout_now
    for x, rows in ((layout.slabs[1].box.middle, (1,)), (layout.sheets[0].x, (2,)), (layout.body.left - 60, ())):
        desk.press(x)
        desk.release(x)
        assert desk.rows() == rows
    assert desk.session.undo_sentence == ""


def test_shift_and_ctrl_extend_and_toggle_the_selection(desk: Desk) -> None:
    """Shift takes everything between, Ctrl adds and removes one."""
    slabs = desk.panel.layout_now.slabs
    points = [QPoint(round(slab.box.middle), MIDDLE) for slab in slabs]
    left = Qt.MouseButton.LeftButton
    QTest.mouseClick(desk.panel, left, Qt.KeyboardModifier.NoModifier, points[0])
    QTest.mouseClick(desk.panel, left, Qt.KeyboardModifier.ShiftModifier, points[1])
    assert desk.rows() == (0, 1)
    QTest.mouseClick(desk.panel, left, Qt.KeyboardModifier.ControlModifier, points[2])
    assert desk.rows() == (0, 1, 3)
    QTest.mouseClick(desk.panel, left, Qt.KeyboardModifier.ControlModifier, points[0])
    assert desk.rows() == (1, 3)


def test_a_label_on_a_leader_line_selects_its_element(desk: Desk) -> None:
    """What stands above the wall is part of its element."""
    label = next(label for label in desk.panel.layout_now.labels if label.row == 2)
    assert label.leader is not None
    desk.press(label.box.middle, (label.box.top + label.box.bottom) / 2)
    assert desk.rows() == (2,)


def test_the_cursor_tells_where_a_face_can_be_dragged(desk: Desk) -> None:
    """Over a face the pointer becomes a splitter, elsewhere an arrow."""
    desk.send(QEvent.Type.MouseMove, desk.face(0).x + 2, held=False)
    assert desk.panel.cursor().shape() == Qt.CursorShape.SplitHCursor
    desk.send(QEvent.Type.MouseMove, desk.panel.layout_now.slabs[1].box.middle, held=False)
    assert desk.panel.cursor().shape() == Qt.CursorShape.ArrowCursor


def test_arrow_keys_walk_through_the_elements(desk: Desk) -> None:
    """Right and Left go from element to element, sheets too, and stop at the ends; Home and End jump there."""
    walked = []
    keys = Qt.Key
    for key in (keys.Key_Right, keys.Key_Right, keys.Key_Right, keys.Key_Left, keys.Key_End, keys.Key_Right):
        desk.key(key)
        walked.append(desk.rows())
    assert walked == [(0,), (1,), (2,), (1,), (3,), (3,)]
    desk.key(keys.Key_Home)
    assert desk.rows() == (0,)


ALT = Qt.KeyboardModifier.AltModifier
SHIFT = Qt.KeyboardModifier.ShiftModifier


@pytest.mark.parametrize(
    ("key", "modifiers", "thickness"),
    [
        (Qt.Key.Key_Plus, Qt.KeyboardModifier.NoModifier, 6.1e-3),
        (Qt.Key.Key_Plus, SHIFT, 6.1e-3),
        (Qt.Key.Key_Minus, Qt.KeyboardModifier.NoModifier, 5.9e-3),
        (Qt.Key.Key_Minus, SHIFT, 5.99e-3),
        (Qt.Key.Key_Right, ALT, 6.1e-3),
        (Qt.Key.Key_Left, ALT, 5.9e-3),
        (Qt.Key.Key_Right, ALT | SHIFT, 6.01e-3),
        (Qt.Key.Key_Left, ALT | SHIFT, 5.99e-3),
    ],
)
def test_keys_nudge_the_thickness(
    desk: Desk, key: Qt.Key, modifiers: Qt.KeyboardModifier, thickness: float
) -> None:
    """A step is a unit of the second digit, with Shift a tenth of it; nothing else changes."""
    desk.session.select(Selection(0, (1,)))
    desk.key(key, modifiers)
    assert desk.thickness(1) == pytest.approx(thickness, rel=1e-12)
    assert desk.rows() == (1,)


def test_repeated_nudges_of_several_layers_are_one_step(desk: Desk) -> None:
    """Held down, a key makes one step to undo, however many layers are selected."""
    before = desk.session.document
    desk.session.select(Selection(0, (0, 1, 2)))
    for _ in range(5):
        desk.key(Qt.Key.Key_Plus)
    assert (desk.thickness(0), desk.thickness(1)) == pytest.approx((1.5e-3, 6.5e-3))
    desk.session.undo()
    assert desk.session.document == before


def test_nudging_a_sheet_says_why_nothing_happens(desk: Desk) -> None:
    """A sheet has no thickness; the panel says what to select."""
    desk.session.select(Selection(0, (2,)))
    desk.key(Qt.Key.Key_Plus)
    assert [kind for _, kind in desk.said] == ["note"]
    assert "sheet has none" in desk.said[0][0]
    assert desk.session.undo_sentence == ""


def test_delete_and_enter(desk: Desk, qtbot: QtBot) -> None:
    """Enter asks the table to edit the row, Delete takes the element out, undo brings it back."""
    desk.session.select(Selection(0, (1,)))
    with qtbot.waitSignal(desk.panel.edit_requested) as asked:
        desk.key(Qt.Key.Key_Return)
    assert asked.args == [1]
    desk.key(Qt.Key.Key_Delete)
    assert len(desk.session.record.stacks[0].elements) == 3
    desk.session.undo()
    assert desk.thickness(1) == 6e-3
    assert desk.rows() == (1,)


def test_a_double_click_asks_for_the_row(desk: Desk, qtbot: QtBot) -> None:
    """So does a double click on a slab."""
    point = QPoint(round(desk.panel.layout_now.slabs[1].box.middle), MIDDLE)
    with qtbot.waitSignal(desk.panel.edit_requested) as asked:
        QTest.mouseDClick(desk.panel, Qt.MouseButton.LeftButton, Qt.KeyboardModifier.NoModifier, point)
    assert asked.args == [1]


def test_an_answer_becomes_rays_with_its_powers(desk: Desk) -> None:
    """The wave drawn has the frequency, angle and powers of the answer, for the polarization looked at."""
    assert desk.powers() is None
    desk.view.set(active_angle=1)
    answer = answer_to(desk.session, desk.view)
    desk.panel.show_answer(answer)
    for polarization, index in (("TE", 0), ("TM", 1)):
        desk.view.set(active_polarization=polarization)
        wave = desk.panel.wave
        assert wave.powers is not None
        assert wave.powers.reflectance == answer.at_marker.reflectance[0, 0, index]
        assert wave.powers.absorbed == tuple(answer.at_marker.element_absorptance[0, 0, index])
        assert wave.circumstances == f"10 GHz, 30°, {polarization}"
    desk.panel.set_stale(True)
    assert desk.panel.wave.stale


def test_stale_rays_are_dimmed(desk: Desk) -> None:
    """The transmitted arrow loses its full colour while it belongs to an earlier job."""
    desk.panel.show_answer(answer_to(desk.session, desk.view))
    fresh = desk.panel.grab().toImage()
    desk.panel.set_stale(True)
    stale = desk.panel.grab().toImage()
    assert fresh != stale
    desk.panel.set_stale(False)
    assert desk.panel.grab().toImage() == fresh


def test_another_stack_or_job_forgets_the_answer(desk: Desk, tmp_path: Path) -> None:
    """Rays of one stack are never drawn in another one."""
    desk.panel.show_answer(answer_to(desk.session, desk.view))
    desk.session.select(Selection(1, ()))
    assert desk.powers() is None
    assert [part.name for part in desk.panel.layout_now.wall.elements] == ["copper"]
    desk.session.select(Selection(0, ()))
    desk.panel.show_answer(answer_to(desk.session, desk.view))
    assert desk.powers() is not None
    write_job(sandwich(), tmp_path / "again.slabjob")
    desk.session.open(tmp_path / "again.slabjob")
    assert desk.powers() is None


def test_the_wall_is_told_in_words(desk: Desk) -> None:
    """The accessible description follows the job and the answer, the name follows the selection."""
    assert desk.panel.accessibleDescription().startswith("Wall: front air, 3 layers and 1 sheet, back air.")
    desk.panel.show_answer(answer_to(desk.session, desk.view))
    assert "reflected" in desk.panel.accessibleDescription()
    desk.session.apply(edits.set_thickness(0, 1, 7e-3))
    # With the drawing, a moment later: what is said belongs to what is shown.
    desk.qtbot.waitUntil(lambda: "2: Foam core, 7 mm" in desk.panel.accessibleDescription())
    desk.key(Qt.Key.Key_Home)
    assert desk.panel.accessibleName() == "Wall drawing, selected 1: Glass-fibre skin, 1 mm"


def test_tool_tip_of_a_slab(desk: Desk, monkeypatch: pytest.MonkeyPatch) -> None:
    """Resting on a slab shows what it is."""
    shown: list[str] = []
    monkeypatch.setattr(QToolTip, "showText", lambda _, text, __: shown.append(text))
    point = QPoint(round(desk.panel.layout_now.slabs[1].box.middle), MIDDLE)
    help_event = QHelpEvent(QEvent.Type.ToolTip, point, desk.panel.mapToGlobal(point))
    assert desk.panel.event(help_event)
    assert shown[0].startswith("2: Foam core, 6 mm\nε = 1.1 at 10 GHz")


def test_the_scale_stays_while_the_wall_fits(desk: Desk) -> None:
    """A typed change of thickness shows as a change of this slab's width alone."""
    widths = [slab.box.width for slab in desk.panel.layout_now.slabs]
    desk.session.apply(edits.set_thickness(0, 1, 5.5e-3))
    changed = [slab.box.width for slab in desk.panel.layout_now.slabs]
    assert changed[1] < widths[1]
    assert (changed[0], changed[2]) == pytest.approx((widths[0], widths[2]))


@pytest.mark.parametrize("theme", sorted(THEMES))
@pytest.mark.parametrize("stack", [0, 1, 2])
def test_every_stack_is_painted_in_both_themes(desk: Desk, theme: str, stack: int) -> None:
    """A sandwich, a foil on metal and an empty stack are drawn with the answer, selected and focused."""
    desk.panel.set_theme(THEMES[theme])
    desk.session.select(Selection(stack, (0,) if stack < 2 else ()))
    desk.panel.setFocus()
    desk.panel.show_answer(answer_to(desk.session, desk.view, stack))
    image = desk.panel.grab().toImage()
    assert image.pixel(3, 60) == pixel(THEMES[theme].base)
    assert len({image.pixel(x, 100) for x in range(0, image.width(), 3)}) > 3


def test_focus_is_seen(desk: Desk) -> None:
    """With the focus the drawing shows it, with and without a selection."""
    for rows in ((), (1,)):
        desk.session.select(Selection(0, rows))
        desk.panel.clearFocus()
        desk.panel.setFocus()
        with_focus = desk.panel.grab().toImage()
        desk.panel.clearFocus()
        assert desk.panel.grab().toImage() != with_focus


def test_themes_change_everything(desk: Desk) -> None:
    """The dark drawing shares no ground with the light one."""
    desk.panel.set_theme(DARK)
    image = desk.panel.grab().toImage()
    assert count(image, LIGHT.base) == 0
    assert count(image, DARK.base) > 10000
