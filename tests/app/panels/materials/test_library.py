"""The library as a list: what it shows, what it finds, and what it does not work out."""

import time
from collections.abc import Mapping
from dataclasses import replace
from pathlib import Path

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QAbstractItemModelTester, QTest
from pytestqt.qtbot import QtBot

from app.look.theme import LIGHT
from app.panels.materials.library import AskedOfEntry, LibraryModel, entry_words
from app.panels.materials.library_view import LibraryView
from app.panels.materials.narrowing import Values, Wanted, narrowed, read_bound
from app.panels.materials.words import glance
from stackcore.arrays import FloatArray
from stackcore.errors import Fault
from stackcore.media.base import AbstractMedium, ConstantSlope, Constitutive, FrequencyRange, Provenance
from stackcore.media.constant import ConstantMedium
from stackcore.media.library import Library, LibraryEntry, materials_dir, read_library

FOLDER = """[family]
label = "Trial"
"""
ENTRY = """
[[material]]
name = "m{number}"
label = "Trial resin {number}"
model = "constant"
permittivity = {permittivity}
loss_tangent = {tangent}
range = ["1 GHz", "20 GHz"]
source = "Coupon {number}"
certainty = "read"
spread = {{ permittivity = 0.02, loss_tangent = 0.1 }}
"""


def big_library(folder: Path, count: int = 250) -> Library:
    """Return a library of many entries, ε′ from 2 upward in steps of 0.01."""
    entries = (ENTRY.format(number=n, permittivity=2 + n / 100, tangent=0.001 * (1 + n % 5)) for n in range(count))
    (folder / "trial.toml").write_text(FOLDER + "".join(entries), encoding="utf-8")
    return Library(folder)


class CountedMedium(AbstractMedium):
    """A medium that counts how often it was asked."""

    __slots__ = ("asked",)

    def __init__(self) -> None:
        self.asked = 0

    @property
    def dispersive(self) -> bool:
        return False

    @property
    def valid_range(self) -> FrequencyRange | None:
        return None

    @property
    def provenance(self) -> Provenance:
        return Provenance()

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        self.asked += 1
        return ConstantMedium(3.0 + 0j).evaluate(frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        return {}


def test_bounds_are_those_of_the_values_at_the_marker() -> None:
    """ε′ from 2 to 4 and a loss tangent to 0.01 find what textbooks call low-loss plastics, and no metal."""
    values = Values()
    wanted = Wanted(lowest=2.0, highest=4.0, lossiest=0.01)
    found = narrowed(read_library(), wanted, lambda entry: values.permittivity(entry, 1e10))

    assert "plastics/ptfe" in {entry.key for entry in found}
    for entry in found:
        epsilon = values.permittivity(entry, 1e10)
        assert 2.0 <= epsilon.real <= 4.0
        assert -epsilon.imag <= 0.01 * epsilon.real
    rest = {entry.key for entry in read_library().entries} - {entry.key for entry in found}
    assert "metals/copper" in rest


def test_family_and_words_go_together() -> None:
    """A family keeps only its entries, words only those that hold them."""
    values = Values()
    found = narrowed(read_library(), Wanted("copper", "metals"), lambda entry: values.permittivity(entry, 1e9))

    assert found
    assert {entry.family for entry in found} == {"metals"}
    assert narrowed(read_library(), Wanted("copper", "plastics"), lambda entry: 1 + 0j) == []


def test_entries_are_evaluated_only_when_drawn_or_bounded(qtbot: QtBot) -> None:
    """Searching by words asks no medium; a row that is drawn asks its own once, bounds ask all."""
    media = [CountedMedium() for _ in range(3)]
    entry = read_library().entry("plastics/ptfe")
    entries = [replace(entry, key=f"trial/m{place}", medium=medium) for place, medium in enumerate(media)]
    values = Values()

    class Few(Library):
        """A library of these entries alone."""

        def search(self, words: str) -> tuple[LibraryEntry, ...]:
            return tuple(entries)

    few = Few(materials_dir())
    assert len(narrowed(few, Wanted("resin"), lambda one: values.permittivity(one, 1e9))) == 3
    assert [medium.asked for medium in media] == [0, 0, 0]

    model = LibraryModel(few, 1e9)
    model.set_library(few)
    for _ in range(2):
        assert model.index(1).data(AskedOfEntry.VALUES) == "ε′ 3"
    assert [medium.asked for medium in media] == [0, 1, 0]
    model.want(Wanted(lowest=3.5))
    assert model.rowCount() == 0
    assert [medium.asked for medium in media] == [1, 1, 1]


def test_model_under_the_checker_of_qt(qtbot: QtBot) -> None:
    """Searches, bounds, another frequency and marks of use leave the model true."""
    model = LibraryModel(read_library(), 1e10)
    tester = QAbstractItemModelTester(model, QAbstractItemModelTester.FailureReportingMode.Fatal)
    model.set_library(read_library())
    for wanted in (Wanted("metal"), Wanted(highest=3.0), Wanted("nothing holds this"), Wanted()):
        model.want(wanted)
    model.set_frequency(1e6)
    model.set_used(frozenset({"metals/copper"}))
    row = next(row for row in range(model.rowCount()) if model.entry(model.index(row)).key == "metals/copper")

    assert str(model.index(row).data(AskedOfEntry.FACTS)).startswith("in this job · ")
    assert "in this job" in str(model.index(row).data(Qt.ItemDataRole.AccessibleTextRole))
    assert tester is not None


def test_values_outside_the_range_are_called_a_guess(qtbot: QtBot, tmp_path: Path) -> None:
    """At 77 GHz an entry known to 20 GHz says so before anything else."""
    model = LibraryModel(big_library(tmp_path, 1), 7.7e10)
    model.set_library(big_library(tmp_path, 1))

    assert str(model.index(0).data(AskedOfEntry.FACTS)).startswith("a guess at 77 GHz · 1 GHz to 20 GHz")
    model.set_frequency(1e10)
    assert "guess" not in str(model.index(0).data(AskedOfEntry.FACTS))


def test_own_entries_in_place_of_shipped_ones_are_marked(qtbot: QtBot) -> None:
    """An entry of the user's own says so, and whether it stands in place of the program's."""
    entry = read_library().entry("metals/copper")
    assert "own" not in entry_words(entry)

    assert "Your own, in place of the program's." in entry_words(replace(entry, own=True, shadows=True))
    assert "Your own." in entry_words(replace(entry, own=True))


def test_two_hundred_and_fifty_entries_are_quick(qtbot: QtBot, tmp_path: Path) -> None:
    """Words and bounds over 250 entries take half a second at most, or 150 plain searches."""
    library = big_library(tmp_path)
    assert len(library.entries) == 250
    view = LibraryView(library, LIGHT, 1e10, lambda entry: None)
    qtbot.addWidget(view)
    view.resize(400, 500)
    view.show()
    started = time.perf_counter()
    library.search("resin 1")
    plain = time.perf_counter() - started
    started = time.perf_counter()
    view.search.setText("resin 1")
    view.bounds.fields["highest"].setText("3")
    view.bounds.fields["highest"].setModified(True)
    view.bounds.fields["highest"].editingFinished.emit()

    assert time.perf_counter() - started < max(150 * plain, 0.5)
    assert 0 < view.list.model().rowCount() < 250
    assert "of 250 entries" in view.count.text()


def test_bad_bound_stays_with_its_reason(qtbot: QtBot) -> None:
    """A bound that is no number is kept, marked and bounds nothing; a comma is a decimal sign."""
    view = LibraryView(read_library(), LIGHT, 1e10, lambda entry: None)
    qtbot.addWidget(view)
    view.show()
    everything = view.list.model().rowCount()
    field = view.bounds.fields["lossiest"]
    field.setFocus()
    QTest.keyClicks(field, "small")
    QTest.keyClick(field, Qt.Key.Key_Return)

    assert field.text() == "small"
    assert bool(field.fault)
    assert view.list.model().rowCount() == everything
    field.clear()
    QTest.keyClicks(field, "0,0005")
    QTest.keyClick(field, Qt.Key.Key_Return)
    assert not field.fault
    assert 0 < view.list.model().rowCount() < everything


@pytest.mark.parametrize(("text", "value"), [("", None), ("2,5", 2.5), (" 4 ", 4.0)])
def test_bounds_are_read(text: str, value: float | None) -> None:
    """An empty text bounds nothing."""
    assert read_bound(text) == value


def test_what_is_no_bound() -> None:
    """A word is a fault, said with what is allowed."""
    assert isinstance(read_bound("much"), Fault)


@pytest.mark.parametrize(
    ("permittivity", "text"),
    [(2.1 - 0.0021j, "ε′ 2.1, tan δ 0.001"), (1 - 1.0425e8j, "σ 58 MS/m"), (-20 - 1j, "ε′ −20, ε″ 1")],
)
def test_glance(permittivity: complex, text: str) -> None:
    """A dielectric by ε′ and tan δ, a good conductor by σ, a plasma by ε′ and ε″."""
    assert glance(permittivity, 1e10) == text
