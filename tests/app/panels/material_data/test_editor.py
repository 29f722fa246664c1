"""The editor of a material: every model from the one table, faults at their fields, curves that follow."""

from pathlib import Path

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from app.document import edits
from app.document.document import material_cell
from app.look.theme import DARK
from app.panels.material_data.editor import LOOKED_AT, NOTHING, own_key
from app.panels.materials.picks import Pick
from app.panels.sweep.field import QuietChoice, QuietField
from stackcore.job.records import MaterialRecord
from stackcore.media.library import library_entry, read_library
from stackcore.media.models import MODELS, Terms
from tests.app.panels.material_data.conftest import Bench, choose


@pytest.mark.parametrize("model", list(MODELS))
def test_every_model_has_its_form(bench: Bench, model: str) -> None:
    """Each constant of each model is a field with name and meaning, or a table; the formula stands above."""
    bench.add(model)
    table = MODELS[model]

    for constant in table.constants:
        if isinstance(constant.kind, Terms):
            assert bench.page.terms.constant == constant.name
            assert bench.page.table.isVisible()
            assert bench.page.terms.rowCount() >= constant.kind.least
            continue
        row = bench.page.form.rows[constant.name]
        assert row.label.text() == f"{constant.label} {constant.symbol}".strip()
        assert constant.about in row.control.toolTip()
        assert row.control.accessibleName() == row.label.text()
        assert row.control.focusPolicy() & Qt.FocusPolicy.TabFocus
    assert bench.page.formula.text() == table.formula
    assert bench.page.model.currentData() == model
    assert not bench.panel.grab().isNull()


def test_constant_typed_is_an_edit_that_the_curves_follow(bench: Bench) -> None:
    """A relaxation time with its unit is taken, drawn at once, undone at once."""
    bench.add("debye")
    bench.panel.curves.show_quantity("dielectric_loss")
    before = bench.panel.curves.curves[0].raw.copy()
    bench.type("relaxation_time", "9.4 ps")

    assert bench.measured("relaxation_time") == "9.4 ps"
    assert bench.session.undo_sentence == "set relaxation time of trial to 9.4 ps"
    assert (bench.panel.curves.curves[0].raw != before).all()
    bench.session.undo()
    assert (bench.panel.curves.curves[0].raw == before).all()
    control = bench.page.form.rows["relaxation_time"].control
    assert isinstance(control, QuietField)
    assert control.text() != "9.4 ps"


def test_bad_text_stays_with_its_reason_at_the_field(bench: Bench) -> None:
    """A length for a time is kept as typed, marked, and said below the field; the last good value stays."""
    bench.add("debye")
    good = bench.record().constants["relaxation_time"]
    bench.type("relaxation_time", "3 mm")
    row = bench.page.form.rows["relaxation_time"]

    assert isinstance(row.control, QuietField)
    assert row.control.text() == "3 mm"
    assert row.control.fault is not None
    assert row.fault.isVisible()
    assert "mm" in row.fault.text()
    assert bench.record().constants["relaxation_time"] == good
    bench.type("relaxation_time", "5 ps")
    assert not row.fault.isVisible()
    assert bench.session.document.drafts == ()


def test_gain_is_refused_at_its_field(bench: Bench) -> None:
    """A step below 0 would be gain: the field says so."""
    bench.add("debye")
    bench.type("permittivity_step", "-3")

    assert bench.session.document.draft(material_cell("trial", "permittivity_step")) is not None
    assert bench.page.form.rows["permittivity_step"].fault.text()


def test_empty_optional_constant_says_what_holds(bench: Bench) -> None:
    """The upper corner of the wideband model is 1 THz unless given, and its empty field says that."""
    bench.add("wideband")
    control = bench.page.form.rows["upper_frequency"].control
    assert isinstance(control, QuietField)
    assert (control.text(), control.placeholderText()) == ("", "1 THz")
    bench.type("upper_frequency", "500 GHz")
    assert "upper_frequency" in bench.record().constants
    bench.type("upper_frequency", "")
    assert "upper_frequency" not in bench.record().constants


def test_another_model_keeps_what_both_have(bench: Bench) -> None:
    """From Debye to Cole-Cole the time stays; the change is one step back."""
    bench.add("debye")
    bench.type("relaxation_time", "7 ps")
    choose(bench.page.model, "cole-cole")

    assert bench.record().model == "cole-cole"
    assert bench.measured("relaxation_time") == "7 ps"
    assert "symmetric_exponent" in bench.page.form.rows
    bench.session.undo()
    assert bench.page.model.currentData() == "debye"
    assert "symmetric_exponent" not in bench.page.form.rows


def test_words_about_the_constants(bench: Bench) -> None:
    """Label, range, source, certainty and note are typed here; a range that is turned round is a fault in place."""
    bench.add("constant")
    bench.type("label", "Batch 7")
    bench.type("range", "8 GHz to 12.4 GHz")
    bench.type("source", "Report 12, coupon C")
    bench.choose("certainty", "read")
    record = bench.record()
    medium = bench.session.job.media["trial"]

    assert (record.label, record.source, record.certainty) == ("Batch 7", "Report 12, coupon C", "read")
    assert medium.valid_range is not None
    assert (medium.valid_range.lowest, medium.valid_range.highest) == (8e9, 12.4e9)
    assert bench.page.title.text() == "Batch 7"
    bench.type("range", "12 GHz to 8 GHz")
    assert bench.page.form.rows["range"].fault.isVisible()


def test_mixture_chooses_other_materials_and_tells_its_bounds(bench: Bench) -> None:
    """Half air in ε′ 3.78 by Looyenga's rule is 2.0916, between Wiener's 1.5816 and 2.39."""
    bench.session.apply(
        edits.add_material(MaterialRecord("silica", model="constant", constants={"permittivity": 3.78 + 0j}))
    )
    bench.add("mixture")
    host = bench.page.form.rows["host"].control
    assert isinstance(host, QuietChoice)
    assert [host.itemData(place) for place in range(host.count())] == ["ptfe", "silica", "air", "vacuum"]
    bench.choose("host", "silica")
    bench.choose("rule", "looyenga")
    index = bench.page.terms.index(0, 1)
    assert bench.page.terms.setData(index, "0.5")

    values = bench.session.job.media["trial"].evaluate(np.array([1e10]))
    assert complex(values.permittivity[0]).real == pytest.approx(2.09162, abs=1e-5)
    assert "this rule gives ε′ 2.092" in bench.page.notes.text()
    assert "between 1.582 and 2.39" in bench.page.notes.text()


def test_entry_of_the_library_is_looked_at_not_edited(bench: Bench) -> None:
    """An entry shows its facts and where to edit; a material of the job brings the form back."""
    entry = library_entry("metals/copper")
    bench.panel.show_picks((Pick(entry=entry),), Pick(entry=entry))

    assert bench.page.about.text().startswith(LOOKED_AT)
    assert entry.provenance.source in bench.page.about.text()
    assert not bench.page.form.isVisible()
    bench.look_at("ptfe")
    assert bench.page.form.isVisible()
    assert "From the library, plastics/ptfe" in bench.page.about.text()
    bench.panel.show_picks((), Pick())
    assert bench.page.about.text() == NOTHING


def test_constant_typed_over_the_library_cuts_the_tie(bench: Bench) -> None:
    """The editor says that before, and the tie is gone after."""
    bench.look_at("ptfe")
    bench.type("permittivity", "2.2")

    assert bench.record("ptfe").library == ""
    assert bench.record("ptfe").permittivity == 2.2
    assert not bench.page.about.isVisible()


def test_what_is_kept_stays_beside_what_is_chosen_next(bench: Bench) -> None:
    """With Keep these on, the next choice is drawn beside; off again it is alone."""
    bench.add("debye")
    bench.look_at("ptfe")
    QTest.mouseClick(bench.panel.keep, Qt.MouseButton.LeftButton)
    bench.look_at("trial")
    assert [one.label for one in bench.panel.curves.specimens] == ["PTFE", "trial"]
    QTest.keyClick(bench.panel.keep, Qt.Key.Key_Space)
    assert [one.label for one in bench.panel.curves.specimens] == ["trial"]


def test_material_is_kept_in_the_own_library(bench: Bench) -> None:
    """The button writes the user's file, tells where, and the entry can be used; a second time it is refused."""
    bench.add("debye", "Resin, batch 7")
    told: list[None] = []
    bench.page.kept.connect(lambda: told.append(None))
    bench.page.keep()

    text, severity = bench.told[-1]
    assert severity == "note"
    assert Path(text.rpartition(" in ")[2].rstrip(".")).exists()
    assert told == [None]
    entry = read_library().entry("own/resin-batch-7")
    assert entry.own
    at, medium = np.array([1e10]), bench.session.job.media["Resin, batch 7"]
    assert entry.medium.evaluate(at).permittivity == pytest.approx(medium.evaluate(at).permittivity)
    bench.page.keep()
    assert bench.told[-1][1] == "error"
    assert told == [None]


@pytest.mark.parametrize(
    ("name", "key"), [("Resin, batch 7", "own/resin-batch-7"), ("Épais", "own/epais"), ("膜", "own/material")]
)
def test_keys_of_the_own_library(name: str, key: str) -> None:
    """Letters without marks, digits and hyphens are what a key may hold."""
    assert own_key(MaterialRecord(name)) == key


def test_theme_and_a_dragged_face(bench: Bench) -> None:
    """Colours follow the theme; a thickness changes nothing here, and what is being typed stays."""
    bench.add("debye")
    bench.panel.set_theme(DARK)
    assert bench.page.palette().window().color().name() == DARK.base
    control = bench.page.form.rows["relaxation_time"].control
    assert isinstance(control, QuietField)
    control.setFocus()
    control.selectAll()
    QTest.keyClicks(control, "9.")
    bench.session.apply(edits.set_thickness(0, 0, 0.002))
    assert control.text() == "9."


def test_removed_material_is_no_longer_edited(bench: Bench) -> None:
    """When the material goes, the editor says what it is for."""
    bench.add("debye")
    assert bench.session.apply(edits.remove_material("trial")) == ()

    assert bench.page.name == ""
    assert bench.page.about.text() == NOTHING
    assert bench.panel.curves.specimens == ()
    bench.session.undo()
    assert bench.page.name == "trial"
