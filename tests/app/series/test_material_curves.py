"""Curves of materials against textbook values."""

import numpy as np
import pytest

from app.series.material_curves import (
    Specimen,
    crossover_sentence,
    crossovers,
    data_table,
    material_curves,
    reading_sentence,
    readings_at,
)
from app.series.material_quantities import CURRENT_RATIO, MATERIAL_QUANTITIES, plain_number, unit_for, words_of
from stackcore.constants import SPEED_OF_LIGHT, VACUUM_PERMITTIVITY
from stackcore.media.base import FrequencyRange
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.drude import DrudeMedium
from stackcore.media.library import read_library
from stackcore.media.lossy_dielectric import LossyDielectricMedium

SWEEP = np.linspace(8e9, 12e9, 5)
RESIN = Specimen("Resin", ConstantMedium(4.0 - 0.08j, valid_range=FrequencyRange(8e9, 11e9)))
COPPER = Specimen("Copper", ConductorMedium(5.8e7))


def test_dielectric_by_hand() -> None:
    """ε = 4 − 0.08j: tan δ 0.02, n 2.0001, k 0.02, σ 44.5 mS/m and a depth of λ₀/(2πk) at 10 GHz."""
    readings = dict(readings_at(RESIN.medium, 1e10))

    assert readings["ε′"] == "4"
    assert readings["ε″"] == "0.08"
    assert readings["tan δ"] == "0.02"
    assert readings["n"] == "2"
    assert readings["k"] == "0.02"
    assert readings["σ"] == "44.51 mS/m"
    assert readings["μ′"] == "1"
    depth = SPEED_OF_LIGHT / (2 * np.pi * 1e10 * 0.01999900012)
    assert readings["δ"] == f"{depth * 1e3:.4g} mm"


def test_skin_depth_is_that_of_a_good_conductor() -> None:
    """Copper of 58 MS/m: 0.66 µm at 10 GHz, in micrometres on the axis."""
    (curve,) = material_curves((COPPER,), "skin_depth_m", np.array([1e8, 1e10]))

    assert curve.unit == "µm"
    assert curve.y == pytest.approx([6.609, 0.6609], rel=1e-4)
    assert curve.raw == pytest.approx([6.609e-6, 6.609e-7], rel=1e-4)


def test_crossover_is_where_sigma_is_omega_epsilon() -> None:
    """Earth of ε′ 15 and 5 mS/m: the currents are equal at σ/(2πε₀ε′) = 6 MHz."""
    earth = LossyDielectricMedium(15.0, conductivity=0.005)
    expected = 0.005 / (2 * np.pi * VACUUM_PERMITTIVITY * 15.0)
    (found,) = crossovers(earth, np.geomspace(1e5, 1e9, 33))
    assert found == pytest.approx(expected, rel=1e-12)

    (curve,) = material_curves((Specimen("Earth", earth),), CURRENT_RATIO, np.geomspace(1e5, 1e9, 33))
    assert curve.crossover == (found,)
    assert crossover_sentence(curve) == "Earth: conduction and displacement current are equal at 5.992 MHz"
    assert np.interp(found, curve.x, curve.raw) == pytest.approx(1.0, rel=0.1)


def test_which_current_prevails_is_told_without_a_crossover() -> None:
    """In copper conduction prevails, in resin the displacement current."""
    for specimen, told in ((COPPER, "conduction"), (RESIN, "displacement current")):
        (curve,) = material_curves((specimen,), CURRENT_RATIO, SWEEP)
        assert crossover_sentence(curve) == f"{specimen.label}: {told} prevails over all of the sweep"


def test_curve_leaves_its_range_where_the_data_end() -> None:
    """The mask is that of the range, and the sentence says that the value beyond is a guess."""
    (curve,) = material_curves((RESIN,), "permittivity", SWEEP)

    assert curve.held.tolist() == [True, True, True, True, False]
    assert "a guess: known from 8 GHz to 11 GHz" in reading_sentence(RESIN, 1.2e10)
    assert "guess" not in reading_sentence(RESIN, 1e10)


def test_what_cannot_be_drawn_by_ratio_is_counted() -> None:
    """A loss of 0 has no logarithm, a plasma no loss tangent, a lossless medium no finite depth."""
    lossless = Specimen("Glass", ConstantMedium(5.0 + 0j))
    plasma = Specimen("Silver", DrudeMedium(1.0, 2e15, 5e12))
    cases = (
        (lossless, "dielectric_loss", True),
        (plasma, "loss_tangent", False),
        (lossless, "skin_depth_m", False),
    )
    for specimen, quantity, by_ratio in cases:
        (curve,) = material_curves((specimen,), quantity, SWEEP, by_ratio=by_ratio)
        assert curve.hidden_points == 5
        assert np.isnan(curve.y).all()
    (curve,) = material_curves((lossless,), "dielectric_loss", SWEEP)
    assert curve.hidden_points == 0


def test_compared_materials_share_one_unit_and_rising_frequencies() -> None:
    """Copper and sea-like water are both in the unit that fits the middle of all values."""
    water = Specimen("Water", DebyeMedium(5.0, 75.0, 8e-12, 5.0))
    curves = material_curves((COPPER, water), "conductivity_S_per_m", SWEEP[::-1])

    assert {curve.unit for curve in curves} == {curves[0].unit}
    assert curves[0].x.tolist() == SWEEP.tolist()
    assert curves[1].raw[0] > 5.0


def test_table_has_every_digit_and_says_what_is_known() -> None:
    """SI units in the header; a column of yes and no beside a curve that leaves its range."""
    lines = data_table(material_curves((RESIN, COPPER), "skin_depth_m", SWEEP)).splitlines()
    titles = lines[0].split("\t")

    assert titles == ["Frequency, Hz", "Skin depth of Resin, m", "Resin is known here", "Skin depth of Copper, m"]
    assert [line.split("\t")[2] for line in lines[1:]] == ["yes", "yes", "yes", "yes", "no"]
    assert float(lines[3].split("\t")[3]) == material_curves((COPPER,), "skin_depth_m", SWEEP)[0].raw[2]
    assert data_table(()) == ""


@pytest.mark.parametrize("quantity", list(MATERIAL_QUANTITIES))
def test_every_quantity_of_every_library_entry_has_words(quantity: str) -> None:
    """Each value at both ends of its range reads as a number, infinity or none, never as an error."""
    for entry in read_library().entries:
        ends = np.array([entry.valid_range.lowest, entry.valid_range.highest])
        inside = np.clip(ends, 1e3, 1e15)
        (curve,) = material_curves((Specimen(entry.label, entry.medium),), quantity, inside)
        for value in curve.raw:
            text = words_of(quantity, float(value))
            assert text in ("none", "∞") or text[0] in "−0123456789"


@pytest.mark.parametrize(
    ("value", "text"), [(0.0, "0"), (1.1284e8, "1.128×10⁸"), (2.5e-7, "2.5×10⁻⁷"), (-12.5, "−12.5"), (3e6, "3×10⁶")]
)
def test_numbers_are_short(value: float, text: str) -> None:
    """Long numbers have a power of ten, and the minus is a minus."""
    assert plain_number(value) == text


def test_unit_without_values() -> None:
    """With nothing to fit, the unit is the SI unit."""
    assert unit_for("skin_depth_m", np.array([np.inf])) == ("m", 1.0)
