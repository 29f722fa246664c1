"""Groups, and elements that are left out or locked, in the drawing."""

import pytest
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import Document
from app.document.session import Session
from app.document.view import View
from app.look.theme import LIGHT
from app.panels.wall.captions import captions, end_names, group_names, rays_in
from app.panels.wall.layout import lay_out
from app.panels.wall.panel import WallPanel
from app.panels.wall.parts import LayerPart, SheetPart, wall_of
from app.panels.wall.wave import wave_in
from app.panels.wall.words import described
from app.workers.live import LiveLane
from stackcore.job import Job, job_from_json
from stackcore.propagation import solve
from tests.app.panels.wall.walls import EvenFont
from tests.stackcore.formats.files import FORMATS


@pytest.fixture
def job() -> Job:
    """The stored job with a group of two, a locked layer and one that is left out."""
    return Job(job_from_json((FORMATS / "built-up-v1.slabjob").read_text(encoding="utf-8")))


def test_the_wall_has_each_row_once(job: Job) -> None:
    """Groups are kept beside; a film has the resistance that follows; marks come from the record."""
    wall = wall_of(Document(job), 0)
    assert len(wall.elements) == 5
    assert [(group.first, group.last, group.repeat) for group in wall.groups] == [(2, 3, 3)]
    film, last, locked = wall.elements[3], wall.elements[4], wall.elements[1]
    assert isinstance(film, SheetPart)
    assert (film.name, film.parts, film.text) == ("film", ("R",), "200 Ω/sq")
    assert isinstance(last, LayerPart)
    assert last.left_out
    assert "left out" in last.name
    assert isinstance(locked, LayerPart)
    assert locked.locked


def test_losses_of_repeats_are_summed_and_what_is_left_out_has_none(job: Job) -> None:
    """The shares of the rows sum up to the absorptance; the row without an element has no way and no loss."""
    stack = job.stacks[0]
    response = solve(stack, 10e9, 0.0)
    wave = wave_in(stack, 10e9, 0.0, "TE", response, rows=job.rows[0], count=5)
    assert wave.powers is not None
    assert len(wave.powers.absorbed) == 5
    assert sum(wave.powers.absorbed) == pytest.approx(float(response.absorptance[0, 0, 0]), rel=1e-12)
    assert wave.powers.absorbed[4] == 0
    assert wave.courses.elements[4] is None
    films = response.element_absorptance[0, 0, 0, [3, 5, 7]]
    assert wave.powers.absorbed[3] == pytest.approx(float(films.sum()), rel=1e-12)


def test_groups_are_told_in_words(job: Job) -> None:
    """A screen reader hears how often which elements are repeated."""
    assert "Elements 3 to 4 are repeated 3 times." in described(wall_of(Document(job), 0), None)


def test_a_locked_face_cannot_be_dragged(qtbot: QtBot, job: Job) -> None:
    """Dragging its back face changes nothing; unlocked, it does."""
    session, view = Session(job), View()
    panel = WallPanel(session, view, LIGHT, lambda text, severity: None)
    qtbot.addWidget(panel)
    panel.resize(1000, 260)
    panel.show()
    qtbot.waitExposed(panel)
    for locked in (True, False):
        session.apply(edits.set_locked(0, (1,), locked))
        before = session.document
        x, y = (
            round(panel.layout_now.extent(1).right),
            round((panel.layout_now.body.top + panel.layout_now.body.bottom) / 2),
        )
        QTest.mousePress(panel, Qt.MouseButton.LeftButton, pos=QPoint(x, y))
        QTest.mouseMove(panel, QPoint(x + 20, y))
        QTest.mouseMove(panel, QPoint(x + 40, y))
        QTest.mouseRelease(panel, Qt.MouseButton.LeftButton, pos=QPoint(x + 40, y))
        assert (session.document is before) == locked


def test_the_live_lane_takes_groups(qtbot: QtBot, job: Job) -> None:
    """A job with groups is answered and drawn without an error."""
    session, view, lane = Session(job), View(), LiveLane()
    panel = WallPanel(session, view, LIGHT, lambda text, severity: None)
    qtbot.addWidget(panel)
    panel.show()
    lane.answered.connect(panel.show_answer)
    with qtbot.waitSignal(lane.answered):
        lane.ask_job(job, 0, view.state)
    panel.grab()
    assert panel.wave.powers is not None
    lane.close()
    lane.deleteLater()


@pytest.mark.parametrize("width", [300, 500, 900, 1600])
@pytest.mark.parametrize("parts", [1, 3, 9])
def test_the_count_of_a_group_is_covered_by_nothing(width: int, parts: int) -> None:
    """Neither a number nor an end's name lies on it, nor what is absorbed; it stands within the drawing."""
    elements = ", ".join('{"layer": "skin", "thickness": "2 mm"}' for _ in range(parts))
    text = f"""{{"format": "slabwright-job", "version": 1,
"materials": {{"skin": {{"model": "constant", "permittivity": 4.2, "loss_tangent": 0.05}}}},
"stacks": [{{"name": "A", "elements": [{{"repeat": 8, "elements": [{elements}]}}]}}],
"sweep": {{"frequency": ["10 GHz"], "angle": ["20 deg"]}}}}"""
    job = Job(job_from_json(text))
    document, stack = Document(job), job.stacks[0]
    measure = EvenFont()
    layout = lay_out(wall_of(document, 0), float(width), 300.0, measure)
    response = solve(stack, 10e9, 0.35)
    wave = wave_in(stack, 10e9, 0.35, "TE", response, rows=job.rows[0], count=parts)
    (name,) = group_names(layout, measure)
    assert name.text == "×8"
    assert name.box.left >= 0
    assert name.box.right <= width
    around = [number.box for number in layout.numbers] + [end.box for end in end_names(layout, measure)]
    written = captions(layout, rays_in(layout, wave, measure), wave, measure)
    around += [caption.box for caption in written]
    assert not any(name.box.overlaps(box) for box in around)
