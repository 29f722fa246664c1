"""The notes come where they belong, and every page of help is made of the tables."""

from dataclasses import replace

import pytest

from app.document.view import ViewState
from app.look.theme import DARK, LIGHT
from app.panels.curves.commands import Command
from app.window import help_pages
from app.window.actions import Act
from app.window.cautions import (
    ALWAYS,
    BEYOND,
    CONDUCTIVE_COAT,
    MATERIAL_FIGURE,
    STANDING,
    STEEP,
    Caution,
    cautions,
)
from app.window.first_view import first_view
from app.window.keys import key_groups
from stackcore import solve
from stackcore.conventions import CONVENTIONS
from stackcore.job import Job, job_from_json
from stackcore.quantities import GROUPS, QUANTITIES
from tests.app.window.scripted import JOB, small_job

SHIELDING = ViewState(quantity="shielding_effectiveness_dB")


def notes(job: Job, stack: int, view: ViewState) -> tuple[Caution, ...]:
    """Return the notes with the result at hand."""
    response = solve(job.stacks[stack], job.sweep.frequencies(), job.sweep.angles())
    return cautions(job, stack, view, response)


def test_a_plain_wall_has_only_the_standing_note() -> None:
    """Dielectric layers looked at in transmission call for nothing more."""
    assert notes(small_job(), 0, ViewState()) == ()


def test_a_metal_back_is_a_material_figure() -> None:
    """Behind a perfect conductor the enclosure is another matter, whatever is shown."""
    assert notes(small_job(), 1, ViewState()) == (MATERIAL_FIGURE,)


def test_shielding_is_a_material_figure_and_deep_shielding_beyond_the_practical() -> None:
    """Shielding of a thin wall has one note, that of steel thousands of dB deep has two."""
    assert notes(small_job(), 0, SHIELDING) == (MATERIAL_FIGURE,)
    assert notes(small_job(), 2, SHIELDING) == (MATERIAL_FIGURE, BEYOND)
    assert cautions(small_job(), 2, SHIELDING, None) == (MATERIAL_FIGURE,)


def test_an_insertion_loss_beyond_the_practical_is_told() -> None:
    """A loss of thousands of dB is beyond practice under either name, a return loss never."""
    assert notes(small_job(), 2, ViewState(quantity="insertion_loss_dB")) == (BEYOND,)
    assert notes(small_job(), 0, ViewState(quantity="insertion_loss_dB")) == ()
    assert notes(small_job(), 2, ViewState(quantity="return_loss_dB")) == (CONDUCTIVE_COAT,)


def test_a_conductive_layer_and_a_steep_angle_have_their_notes() -> None:
    """A conductor looked at in transmission warns of static and lightning, 85° of finite size."""
    assert notes(small_job(), 2, ViewState()) == (CONDUCTIVE_COAT,)
    steep = Job(job_from_json(JOB.replace("45 deg", "85 deg")))
    assert notes(steep, 0, ViewState()) == (STEEP,)


def test_outside_the_range_of_a_material_is_told() -> None:
    """A library material swept beyond its stated range has a note."""
    text = JOB.replace('{"model": "conductor", "conductivity": "6 MS/m", "permeability": 200}', '{"library": "%s"}')
    key = "plastics/ptfe"
    job = Job(job_from_json((text % key).replace("12 GHz", "900 THz")))
    if job.media["steel"].valid_range is None:
        pytest.fail(f"{key} states no range; choose another entry for this test")
    assert any("range" in note.brief for note in notes(job, 2, ViewState()))


def test_the_first_view_says_something_about_the_job() -> None:
    """Metal behind shows return loss, a shield its shielding, a lossy wall its loss, else what passes."""
    text = JOB.replace('"metal", "elements": [', '"air", "elements": [{"sheet": "series", "resistance": "20 ohm"},')
    records = (*small_job().record.stacks, job_from_json(text).stacks[1])
    views = [first_view(Job(replace(small_job().record, stacks=(stack,)))).quantity for stack in records]
    assert views == ["transmittance", "return_loss_dB", "shielding_effectiveness_dB", "insertion_loss_dB"]
    log = Job(job_from_json(JOB.replace('"linear"', '"log"')))
    assert first_view(log).log_frequency
    assert not first_view(small_job()).log_frequency
    assert first_view(small_job()).markers == (10e9,)


def test_the_definitions_page_has_every_convention_and_quantity() -> None:
    """Nothing of the one table of conventions and of quantities is left out."""
    page = help_pages.conventions_page(LIGHT)
    for text in CONVENTIONS.values():
        assert text in page
    for quantity in QUANTITIES.values():
        assert f'name="{quantity.name}"' in page
        assert quantity.label in page
        assert quantity.source in page
        assert (f"<code>{quantity.name}</code>" in page) == quantity.exported
    places = [page.index(f"<p class='heading'>{group}</p>") for group in GROUPS]
    assert places == sorted(places)
    assert page.index('name="element_absorptance"') < places[1]


def test_the_cautions_page_begins_with_what_is_shown_now() -> None:
    """The notes of the job come before those that always hold, and all are there."""
    page = help_pages.cautions_page(LIGHT, (BEYOND,))
    assert STANDING in page
    assert page.index(BEYOND.full[:20]) < page.index(ALWAYS[0][1][:20])
    for heading, text in ALWAYS:
        assert heading in page
        assert text in page


def test_the_keyboard_page_lists_every_shortcut_of_the_table() -> None:
    """Each act with a shortcut is on the page with all its keys; one without is not."""
    acts = (
        Act("a", "&File", "&Save…", lambda: None, ("Ctrl+S",)),
        Act("b", "&File", "Print", lambda: None),
        Act("c", "&Edit", "&Redo", lambda: None, ("Ctrl+Y", "Ctrl+Shift+Z")),
    )
    plot = (Command("Copy data", lambda: None, ("Ctrl+Shift+C",)), Command("", lambda: None, ("X",)))
    page = help_pages.keyboard_page(DARK, key_groups(acts, plot))
    assert "Menu File" in page
    assert "Ctrl+Y or Ctrl+Shift+Z" in page
    assert ">Save<" in page
    assert "Print" not in page
    assert page.index("In the plot") < page.index("Ctrl+Shift+C") < page.index("Menu File")
    assert ">X<" not in page


def test_pages_escape_what_could_be_markup() -> None:
    """Angle brackets in a name are shown, not interpreted."""
    assert "&lt;b&gt;" in help_pages.about_page(LIGHT, "<b>1", ())
