"""The health check: what it finds, where, how severe, and that it is silent where all is well."""

import dataclasses
from collections.abc import Mapping

import numpy as np
import pytest

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import VACUUM_PERMITTIVITY
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.drude import DrudeMedium
from stackcore.media.health import Finding, check_medium
from stackcore.media.joined import JoinedMedium
from stackcore.media.lossy_dielectric import LossyDielectricMedium
from stackcore.media.mixture import Inclusion, MixtureMedium
from stackcore.media.multi_debye import MultiDebyeMedium, RelaxationTerm
from stackcore.media.power_law import PowerLawMedium
from stackcore.media.sea_water import SeaWaterMedium
from stackcore.media.tabulated import TabulatedMedium
from stackcore.media.temperature import celsius
from stackcore.media.water import LiebeWaterMedium
from stackcore.media.wideband import WidebandMedium

X_BAND = np.linspace(8.2e9, 12.4e9, 50)
WIDE = np.geomspace(1e8, 1e11, 50)


def topics(medium: AbstractMedium, frequencies: FloatArray | None = None) -> list[tuple[str, str, str]]:
    """Return severity, topic and place of each finding."""
    return [(each.severity, each.topic, each.place) for each in check_medium(medium, frequencies)]


def only(medium: AbstractMedium, frequencies: FloatArray | None = None, *, topic: str) -> Finding:
    """Return the one finding of a topic."""
    (found,) = [each for each in check_medium(medium, frequencies) if each.topic == topic]
    return found


@dataclasses.dataclass(frozen=True)
class Given(AbstractMedium):
    """A medium that answers with any constant ε, sound or not."""

    value: complex
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    @property
    def dispersive(self) -> bool:
        return False

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        epsilon: ComplexArray = np.full(np.shape(frequency), self.value, dtype=np.complex128)
        return Constitutive(epsilon, np.ones_like(epsilon), np.zeros_like(epsilon), np.zeros_like(epsilon))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        return {}


@pytest.mark.parametrize(
    "medium",
    [
        VACUUM,
        ConstantMedium(4.2 - 0.02j),
        ConductorMedium(5.8e7),
        DebyeMedium(4.0, 70.0, 8e-12, 1.0),
        LiebeWaterMedium(celsius(20)),
        SeaWaterMedium(celsius(20), 33),
        WidebandMedium(4.3, 0.02, 1e9),
        DrudeMedium(4.0, 2e15, 1e14),
        LossyDielectricMedium(15.0, conductivity=0.005),
        MixtureMedium(VACUUM, (Inclusion(ConstantMedium(3.0), 0.3),), "bruggeman"),
    ],
)
def test_sound_media_have_no_finding(medium: AbstractMedium) -> None:
    """Nothing is said of a sound medium over a band it is for."""
    assert check_medium(medium, np.linspace(8.2e9, 9.9e9, 20)) == ()
    assert check_medium(medium) == ()


def test_gain_is_an_error() -> None:
    """Gain and values that are not finite are errors that come first, with how many frequencies."""
    found = check_medium(Given(4 + 0.1j), X_BAND)[0]
    assert (found.severity, found.topic, found.place) == ("error", "passivity", "permittivity")
    assert "has gain at 8.2 GHz and at 49 more frequencies" in found.reason
    assert "not finite" in check_medium(Given(complex("nan")), X_BAND[:1])[0].reason


def test_a_sweep_outside_the_range() -> None:
    """What part of the sweep leaves the range is told, on both sides, and that a table holds its ends there."""
    table = TabulatedMedium((9e9, 10e9), (4 - 0.01j, 4 - 0.01j))
    found = only(table, np.linspace(8e9, 12e9, 9), topic="range")
    assert (found.severity, found.place) == ("warning", "valid_range")
    assert (
        "67 % of the sweep (8 GHz to 8.5 GHz and 10.5 GHz to 12 GHz) lies outside 9 GHz to 10 GHz" in found.reason
    )
    assert "ends are held" in found.reason
    model = ConstantMedium(4.0, valid_range=FrequencyRange(9e9, 10e9))
    assert "held" not in only(model, np.array([8e9]), topic="range").reason
    assert check_medium(model, np.array([9e9, 10e9])) == ()


def test_conditions_outside_those_of_the_source() -> None:
    """A temperature or salinity beyond the source's is told by name."""
    assert topics(LiebeWaterMedium(265.0)) == [("warning", "condition", "temperature")]
    assert topics(SeaWaterMedium(celsius(42), 40)) == [
        ("warning", "condition", "temperature"),
        ("warning", "condition", "salinity"),
    ]


def test_a_constant_loss_over_a_wide_sweep_is_not_causal() -> None:
    """Over three decades a constant tan δ of 0.02 would make ε′ fall by (2/π)·0.02·ln 1000, and is said to."""
    found = only(ConstantMedium.with_loss_tangent(4.0, 0.02), WIDE, topic="causality")
    assert (found.severity, found.place) == ("warning", "permittivity")
    assert "not causal" in found.reason
    assert f"{100 * 2 / np.pi * 0.02 * np.log(1000):.2g} %" in found.reason
    assert "wideband" in found.hint


def test_the_drift_is_that_of_the_causal_model() -> None:
    """The fall that is told is the one the wideband model has in a laminate of tan δ 0.02, to 10 %."""
    laminate = WidebandMedium(4.3, 0.02, 1e9).evaluate(np.array([1e8, 1e11])).permittivity.real
    told = 2 / np.pi * 0.02 * np.log(1000)
    assert (laminate[0] - laminate[1]) / 4.3 == pytest.approx(told, rel=0.1)


@pytest.mark.parametrize(
    ("medium", "sweep", "severities"),
    [
        (ConstantMedium(4 - 0.08j), X_BAND, ["note"]),
        (ConstantMedium(4 - 0.002j), X_BAND, []),
        (ConstantMedium(4 - 0.002j), WIDE, ["note"]),
        (ConstantMedium(4.0, 2 - 0.5j), X_BAND, ["warning"]),
        (ConstantMedium(4 - 1e-5j), WIDE, []),
        (ConstantMedium(4.0), WIDE, []),
    ],
)
def test_how_severe_a_constant_loss_is(medium: AbstractMedium, sweep: FloatArray, severities: list[str]) -> None:
    """By how far ε′ or μ′ would drift: nothing, a note from 0.5 % or over a decade, a warning from 2 %."""
    assert [each.severity for each in check_medium(medium, sweep)] == severities


def test_a_published_fit_that_is_not_causal() -> None:
    """Concrete of P.2040-3 has a loss that its constant ε′ does not follow: a note with the size of it."""
    concrete = PowerLawMedium(5.24, 0.0, 0.0462, 0.7822)
    found = only(concrete, np.array([1e9, 1e11]), topic="causality")
    assert found.severity == "note"
    assert "not causal" in found.reason


WATER = DebyeMedium(5.0, 75.0, 8e-12)
ROWS = np.geomspace(1e9, 1e11, 40)


def test_a_causal_table_is_told_what_its_band_can_tell() -> None:
    """A sound table gets a note with how well it agrees, what its tails are, and what that does not prove."""
    found = only(TabulatedMedium.from_arrays(ROWS, WATER.evaluate(ROWS).permittivity), topic="causality")
    assert found.severity == "note"
    assert "agree with causality" in found.reason
    assert "from below" in found.reason
    assert "from above" in found.reason
    narrow = np.linspace(8e9, 12e9, 20)
    hint = only(TabulatedMedium.from_arrays(narrow, WATER.evaluate(narrow).permittivity), topic="causality").hint
    assert "proves little" in hint


def test_a_table_that_is_not_causal_is_warned_of() -> None:
    """ε′ of one sample with ε″ of another is a warning with the misfit and where it is worst."""
    values = WATER.evaluate(ROWS).permittivity
    found = only(TabulatedMedium.from_arrays(ROWS, values.real + 0.2j * values.imag), topic="causality")
    assert found.severity == "warning"
    assert "do not belong together" in found.reason
    assert " near " in found.reason


def test_noise_is_told_by_its_size() -> None:
    """Noise of a few parts in a thousand is a note; the same table with a tenth of it is sound."""
    rng = np.random.default_rng(3)
    noise = rng.standard_normal(ROWS.size)
    values = WATER.evaluate(ROWS).permittivity
    noisy = TabulatedMedium.from_arrays(ROWS, values * (1 + 0.015 * noise))
    quiet = TabulatedMedium.from_arrays(ROWS, values * (1 + 0.0015 * noise))
    assert "do not belong together" in only(noisy, topic="causality").reason
    assert "agree with causality" in only(quiet, topic="causality").reason


def test_few_rows_cannot_tell() -> None:
    """A handful of rows is said to be too few."""
    found = only(TabulatedMedium((8e9, 12e9), (4 - 0.1j, 4 - 0.1j)), topic="causality")
    assert (found.severity, "too few" in found.reason) == ("note", True)


def test_a_long_table_is_thinned_out() -> None:
    """Five thousand rows are judged like four hundred of them, in time for a window."""
    rows = np.geomspace(1e9, 1e11, 5000)
    table = TabulatedMedium.from_arrays(rows, WATER.evaluate(rows).permittivity)
    assert "agree with causality" in only(table, topic="causality").reason


@pytest.mark.parametrize(
    ("medium", "told"),
    [
        (TabulatedMedium((8.2, 12.4), (4 - 0.1j, 4 - 0.1j)), "'12.4 GHz'"),
        (TabulatedMedium((0.4, 0.8), (4 - 0.1j, 4 - 0.1j)), "wavelengths in µm"),
        (ConstantMedium(4.0, valid_range=FrequencyRange(1.0, 18.0)), "'18 GHz'"),
        (TabulatedMedium((8.2e18, 12.4e18), (4 - 0.1j, 4 - 0.1j)), "beyond ultraviolet"),
        (ConductorMedium(1.7e-8), "5.882e+07 S/m"),
        (ConductorMedium(58.0), "'58 MS/m'"),
        (ConductorMedium(5.8e9), "more than any metal"),
        (ConstantMedium(3 - 45j), "15 % is 0.15"),
        (TabulatedMedium((1e9, 2e9), (3 - 45j, 3 - 46j)), "swapped"),
        (DebyeMedium(4.0, 70.0, 8.0), "meant in ps"),
        (MultiDebyeMedium(4.0, (RelaxationTerm(1.0, 1e-9), RelaxationTerm(2.0, 20.0))), "20 s is far too long"),
    ],
)
def test_suspicious_units(medium: AbstractMedium, told: str) -> None:
    """GHz typed as Hz, a resistivity for a conductivity, per cent for a share: told with what was likely meant."""
    found = only(medium, topic="units")
    assert told in f"{found.reason} {found.hint}"
    if isinstance(medium, MultiDebyeMedium):
        assert found.place == "terms[1].relaxation_time"


@pytest.mark.parametrize(
    "medium",
    [
        ConductorMedium(1e3),
        TabulatedMedium((1e6, 1e9), (3 - 4e5j, 3 - 400j)),
        TabulatedMedium((1e14, 5e14), (-20 - 1j, -5 - 0.2j)),
        ConstantMedium(-20 - 1j),
    ],
)
def test_what_only_looks_odd_is_left_alone(medium: AbstractMedium) -> None:
    """Conductors with a loss tangent above 10 and metals in light are not suspicious."""
    assert [each for each in check_medium(medium) if each.topic == "units"] == []


def test_a_suspicious_sweep() -> None:
    """A sweep from 8 Hz to 12 Hz is told as such, whatever the medium."""
    assert [each.place for each in check_medium(VACUUM, np.linspace(8, 12, 5))] == ["frequencies"]


BAND = FrequencyRange(9e9, 11e9)
SIGMA = 2 * np.pi * 1e10 * VACUUM_PERMITTIVITY * 0.08
"""The conductivity that makes ε″ = 0.08 at 10 GHz."""


def test_loss_that_was_entered_twice() -> None:
    """A conductivity worked out from the loss tangent that stands beside it doubles the loss, and is told."""
    doubled = LossyDielectricMedium(4.0, loss_tangent=0.02, conductivity=SIGMA, valid_range=BAND)
    found = only(doubled, topic="loss")
    assert (found.severity, found.place) == ("warning", "conductivity")
    assert "entered twice" in found.reason


@pytest.mark.parametrize(
    "medium",
    [
        LossyDielectricMedium(4.0, loss_tangent=0.02, conductivity=3 * SIGMA, valid_range=BAND),
        LossyDielectricMedium(4.0, conductivity=SIGMA, valid_range=BAND),
        PowerLawMedium(4.0, 0.0, 0.02, 0.5, valid_range=BAND),
        DebyeMedium(4.0, 2.0, 1e-12, SIGMA, valid_range=FrequencyRange(1e9, 1e11)),
        ConductorMedium(1e6, relaxation_time=1e-14, valid_range=BAND),
    ],
)
def test_loss_that_was_entered_once(medium: AbstractMedium) -> None:
    """A conductivity beside another loss of another size, or alone, is not suspected."""
    assert [each for each in check_medium(medium) if each.topic == "loss"] == []


def test_a_mixture_is_checked_with_its_components() -> None:
    """Findings of components carry their place; the range of the mixture is told once."""
    resin = ConstantMedium(3 - 0.05j, valid_range=FrequencyRange(1e9, 12e9))
    wet = MixtureMedium(resin, (Inclusion(ConductorMedium(1e-8), 0.1), Inclusion(LiebeWaterMedium(250.0), 0.1)))
    assert topics(wet, WIDE) == [
        ("warning", "range", "valid_range"),
        ("warning", "causality", "host.permittivity"),
        ("warning", "units", "inclusions[0].medium.conductivity"),
        ("warning", "condition", "inclusions[1].medium.temperature"),
    ]


def test_a_mixture_that_holds_nowhere() -> None:
    """Components without a common band are told as such."""
    low = ConstantMedium(3.0, valid_range=FrequencyRange(1e9, 2e9))
    high = ConstantMedium(3.0, valid_range=FrequencyRange(3e9, 4e9))
    found = only(MixtureMedium(low, (Inclusion(high, 0.5),)), topic="range")
    assert "no frequency in common" in found.reason


def test_a_joined_medium_is_checked_part_by_part() -> None:
    """The jump at a join is told by its size, each part is held against its share of the sweep, gaps are told."""
    film = ConductorMedium(5e5, valid_range=FrequencyRange(1e6, 1e11))
    visible = ConstantMedium(3.8, valid_range=FrequencyRange(4e14, 8e14))
    joined = JoinedMedium((film, visible), (1e13,))
    assert topics(joined) == [("warning", "join", "joins[0]"), ("note", "range", "valid_range")]
    assert topics(joined, np.array([1e9, 5e14])) == [
        ("warning", "join", "joins[0]"),
        ("note", "range", "valid_range"),
    ]
    found = [each for each in check_medium(joined, np.array([1e9, 1e12, 9e14])) if each.severity == "warning"]
    assert [each.place for each in found] == ["joins[0]", "parts[0].valid_range", "parts[1].valid_range"]
    small = JoinedMedium((ConstantMedium(4.0), ConstantMedium(4.1)), (1e9,))
    assert only(small, topic="join").severity == "note"
    assert check_medium(JoinedMedium((ConstantMedium(4.0), ConstantMedium(4.0)), (1e9,))) == ()


def test_a_part_that_does_not_answer_is_not_checked() -> None:
    """A part outside the sweep says nothing."""
    joined = JoinedMedium((ConstantMedium(4.0), ConductorMedium(1e-8)), (1e9,))
    assert [each.topic for each in check_medium(joined, np.array([1e6, 1e8]))] == ["join"]


@pytest.mark.parametrize("frequencies", [[-1.0], [0.0], [float("nan")], [float("inf"), 1.0]])
def test_what_is_no_sweep_is_refused(frequencies: list[float]) -> None:
    """Frequencies must be finite and above 0."""
    with pytest.raises(ValueError, match="finite and above 0"):
        check_medium(VACUUM, frequencies)


def test_an_empty_sweep_is_none() -> None:
    """No frequencies at all is the same as none given."""
    assert check_medium(VACUUM, []) == ()


def test_findings_read_as_sentences() -> None:
    """Every finding has a reason and a hint, and a text for a terminal that starts with how severe it is."""
    for finding in check_medium(ConductorMedium(1.7e-8), np.array([1e9])):
        assert finding.reason
        assert finding.hint
        assert str(finding).startswith("warning: conductivity: 1.7e-08 S/m")
