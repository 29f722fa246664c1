"""Texts with units -> SI values, and the refusal of everything that could be read two ways."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.errors import UnitError
from stackcore.units import Dimension, Measure, known_units, parse_measure

LENGTHS = {
    "3.2 mm": 3.2e-3,
    "30 µm": 3e-05,
    "30 μm": 3e-05,
    "30 um": 3e-05,
    "30um": 3e-05,
    "550 nm": 550e-9,
    "1.5 cm": 0.015,
    "2 m": 2.0,
    "2": 2.0,
    "1e-3": 0.001,
    ".5 mm": 0.0005,
    "5. mm": 0.005,
    "+5 mm": 0.005,
    "10 mil": 254e-6,
    "10 mils": 254e-6,
    "5 thou": 127e-6,
    "1 in": 0.0254,
    "1 inch": 0.0254,
    '0.125"': 0.003175,
    "0.125″": 0.003175,
    "0.125''": 0.003175,
    "1/8 in": 0.003175,
    "1/8″": 0.003175,
    "(1 + 1/8) in": 0.028575,
    "1,5 mm": 0.0015,
    "0,125 in": 0.003175,
    "1,5e-3": 0.0015,
    "−3 mm": -0.003,
    "3\u00a0mm": 0.003,
    "3\u2009mm": 0.003,
    "3\u202fmm": 0.003,
    "  3 mm  ": 0.003,
    "1 mm + 20 um": 1.02e-3,
    "1 mm - 20 um": 0.98e-3,
    "3 * 0.2 mm": 0.6e-3,
    "3 × 0.2 mm": 0.6e-3,
    "2 * (1 mm + 20 um)": 2.04e-3,
    "10 mm / 4": 2.5e-3,
    "-(1 mm)": -0.001,
    "6 mm / (2 mm) * 1 mm": 3e-3,
    "5 NM": 5e-9,
    "5 Um": 5e-6,
    "5 MIL": 127e-6,
    "1500 Å": 1.5e-7,
    "0 mm": 0.0,
    "0,000 mm": 0.0,
}


@pytest.mark.parametrize(("text", "metres"), LENGTHS.items())
def test_length_is_the_nearest_double(text: str, metres: float) -> None:
    """A length is the double nearest to its decimal text, and keeps that text."""
    assert parse_measure(text, Dimension.LENGTH) == Measure(metres, text.strip())


OTHERS = [
    ("10 GHz", Dimension.FREQUENCY, 1e10),
    ("10ghz", Dimension.FREQUENCY, 1e10),
    ("10 GHZ", Dimension.FREQUENCY, 1e10),
    ("10 Ghz", Dimension.FREQUENCY, 1e10),
    ("5 MHZ", Dimension.FREQUENCY, 5e6),
    ("5 khz", Dimension.FREQUENCY, 5e3),
    ("545 THz", Dimension.FREQUENCY, 545e12),
    ("1 PHz", Dimension.FREQUENCY, 1e15),
    ("5 mHz", Dimension.FREQUENCY, 5e-3),
    ("180 deg", Dimension.ANGLE, math.pi),
    ("45°", Dimension.ANGLE, math.pi / 4),
    ("45º", Dimension.ANGLE, math.pi / 4),
    ("0.5 rad", Dimension.ANGLE, 0.5),
    ("5 mrad", Dimension.ANGLE, 0.005),
    ("0.5", Dimension.ANGLE, 0.5),
    ("377 ohm/sq", Dimension.RESISTANCE, 377.0),
    ("377 Ohm/Sq", Dimension.RESISTANCE, 377.0),
    ("377 ohm / sq", Dimension.RESISTANCE, 377.0),
    ("377 ohm", Dimension.RESISTANCE, 377.0),
    ("377 Ω", Dimension.RESISTANCE, 377.0),
    ("377 \u2126/□", Dimension.RESISTANCE, 377.0),
    ("1.2 kΩ/sq", Dimension.RESISTANCE, 1200.0),
    ("5 mohm/sq", Dimension.RESISTANCE, 0.005),
    ("5 Mohm/sq", Dimension.RESISTANCE, 5e6),
    ("20 pH", Dimension.INDUCTANCE, 2e-11),
    ("20 nh", Dimension.INDUCTANCE, 2e-8),
    ("1 µH", Dimension.INDUCTANCE, 1e-6),
    ("1 pF", Dimension.CAPACITANCE, 1e-12),
    ("1 PF", Dimension.CAPACITANCE, 1e-12),
    ("6 MS/m", Dimension.CONDUCTIVITY, 6e6),
    ("6 kS/m", Dimension.CONDUCTIVITY, 6e3),
    ("6 S/cm", Dimension.CONDUCTIVITY, 600.0),
    ("100 %IACS", Dimension.CONDUCTIVITY, 58e6),
    ("61 %iacs", Dimension.CONDUCTIVITY, 35.38e6),
    ("61 % IACS", Dimension.CONDUCTIVITY, 35.38e6),
    ("4.2", Dimension.NUMBER, 4.2),
    ("4,2", Dimension.NUMBER, 4.2),
    ("2 %", Dimension.NUMBER, 0.02),
    ("3/4", Dimension.NUMBER, 0.75),
]


@pytest.mark.parametrize(("text", "dimension", "value"), OTHERS)
def test_every_dimension_reads_its_units(text: str, dimension: Dimension, value: float) -> None:
    """Each dimension reads its units, with signs that look alike and letters in the wrong case."""
    assert parse_measure(text, dimension).value == value


AMBIGUOUS = {
    "1,500 mm": r"'1,500' may mean 1.500 or 1500",
    "12,345 mm": r"12.345 or 12345",
    "1,234.5 mm": "more than one decimal sign",
    "1,2,3 mm": "more than one decimal sign",
    "5 MM": "unknown unit 'MM', did you mean 'mm'",
    "5 M": "unknown unit 'M', did you mean 'm'",
    "5 mmm": "unknown unit 'mmm', did you mean 'mm'",
    "5 inhc": "did you mean 'in'",
    "1 + 2 mm": "a bare number and a length cannot be added",
    "1-1/8 in": "cannot be added",
    "1 1/8 in": "a sign is missing before '1'",
    "1 500 mm": "a sign is missing before '500'",
    "2 (3 mm)": "a sign is missing before",
    "1 mm 2 mm": "a sign is missing before '2'",
    "5 mm * 3 mm": "a length times a length",
    "1 mm + 1 GHz": "a length and a frequency cannot be added",
    "5 mm / (2 GHz)": "a division by a frequency",
    "5 mm / 0": "a division by 0",
    "5 mm / (1 - 1)": "a division by 0",
    "1.2.3 mm": "'1.2.3' is not a number",
    "1e999 m": "too large",
    "1e300 m * 1e300": "too large",
    "1e-999 m": "too small",
    "1e-300 m / 1e300": "too small",
    "nan": "a number is missing",
    "inf mm": "a number is missing",
    "": "nothing is written",
    "   ": "nothing is written",
    "mm": "a number is missing",
    "5 mm +": "is not complete",
    "(5 mm": "is not complete",
    "()": "can be read",
    "2 ** 3 mm": "can be read",
    "2 // 3 mm": "can be read",
    "1_000 mm": "cannot be read",
    "0x10 mm": "unknown unit 'x10'",
    "٣ mm": "cannot be read",
    "1;5 mm": "cannot be read",
    "__import__('os')": "cannot be read",
    "a0": "a number is missing",
    "5 mm²": "unknown unit",
    "5 %": "is a fraction, not a length",
    "5 GHz": "'5 GHz' is a frequency, not a length",
    "(" * 50 + "1" + ")" * 49: "is not complete",
    "1" * 101: "too long",
}


@pytest.mark.parametrize(("text", "words"), AMBIGUOUS.items())
def test_what_could_be_misread_is_refused(text: str, words: str) -> None:
    """A text with two readings, an unknown unit, or more than simple arithmetic is refused, saying why."""
    with pytest.raises(UnitError) as caught:
        parse_measure(text, Dimension.LENGTH)
    assert words in caught.value.message
    assert caught.value.allowed
    assert "\n" not in str(caught.value)


def test_a_product_is_read_from_left_to_right() -> None:
    """1 / 3 mm is a third of a millimetre, as 1/8 in is an eighth of an inch."""
    assert parse_measure("1 / 3 mm", Dimension.LENGTH).value == 1e-3 / 3


def test_a_ratio_of_lengths_is_a_number() -> None:
    """A length over a length is a pure number, which a number takes and a length does not silently scale."""
    assert parse_measure("3 mm / (1.5 mm)", Dimension.NUMBER).value == 2.0


@pytest.mark.parametrize("text", ["5 mhz", "5 ms/m", "5 mOHM"])
def test_a_small_m_that_may_be_mega_is_refused(text: str) -> None:
    """Where mega and milli are both units, letters in the wrong case do not decide which is meant."""
    dimension = {"z": Dimension.FREQUENCY, "m": Dimension.CONDUCTIVITY, "M": Dimension.RESISTANCE}[text[-1]]
    with pytest.raises(UnitError) as caught:
        parse_measure(text, dimension)
    assert "could be m" in caught.value.message
    assert " or M" in caught.value.message


def test_degrees_are_those_of_numpy() -> None:
    """A whole number of degrees is bit for bit what numpy.radians makes of it."""
    degrees = list(range(90))
    parsed = [parse_measure(f"{degree} deg", Dimension.ANGLE).value for degree in degrees]
    assert parsed == np.radians(degrees).tolist()


@pytest.mark.parametrize(
    ("text", "value", "kept"),
    [
        ("5", 0.005, "5 mm"),
        ("1,5", 0.0015, "1,5 mm"),
        ("-2", -0.002, "-2 mm"),
        ("2e-3", 2e-6, "2e-3 mm"),
        ("1/8", 0.000125, "1/8 mm"),
        ("2 + 3", 0.005, "(2 + 3) mm"),
        ("2-3", -0.001, "(2-3) mm"),
        ("2 * -3", -0.006, "(2 * -3) mm"),
        ("5 um", 5e-6, "5 um"),
    ],
)
def test_a_default_unit_becomes_part_of_the_text(text: str, value: float, kept: str) -> None:
    """A bare number takes the default unit into its text, so that it means the same in a file."""
    measure = parse_measure(text, Dimension.LENGTH, default_unit="mm")
    assert measure == Measure(value, kept)
    assert parse_measure(measure.text, Dimension.LENGTH).value == value


def test_a_default_unit_of_another_dimension_is_refused() -> None:
    """A default unit must be one of the dimension."""
    with pytest.raises(UnitError, match="a unit of frequency"):
        parse_measure("5", Dimension.LENGTH, default_unit="GHz")


@pytest.mark.parametrize(
    ("given", "kept"),
    [(0.001, "0.001"), (2, "2"), (1e-05, "1e-05"), (np.float64(0.25), "0.25"), (-0.0, "-0.0")],
)
def test_a_number_is_in_the_base_unit(given: float, kept: str) -> None:
    """A number that is not a text is in the SI base unit, and its text is its shortest form."""
    assert parse_measure(given, Dimension.LENGTH) == Measure(float(given), kept)


@pytest.mark.parametrize("given", [math.nan, math.inf, -math.inf, 10**400, True])
def test_a_number_that_is_no_quantity_is_refused(given: float) -> None:
    """NaN, infinity, a whole number beyond every double and a truth value are refused."""
    with pytest.raises(UnitError):
        parse_measure(given, Dimension.LENGTH)


@pytest.mark.parametrize("dimension", list(Dimension))
def test_all_units_offered_can_be_read(dimension: Dimension) -> None:
    """Every unit that an error or a menu offers, and every spelling known, is read by its own dimension."""
    for unit in {*dimension.units, *known_units(dimension), *([dimension.si_unit] if dimension.si_unit else [])}:
        assert parse_measure(f"1 {unit}", dimension).value > 0


@pytest.mark.parametrize("dimension", list(Dimension))
def test_the_wrong_dimension_is_told(dimension: Dimension) -> None:
    """A unit of another dimension is refused with the name of what was given and of what was expected."""
    for other in Dimension:
        if other not in (dimension, Dimension.NUMBER):
            with pytest.raises(UnitError) as caught:
                parse_measure(other.example, dimension)
            assert other.word in caught.value.message
            assert dimension.word in caught.value.message


PIECES = st.sampled_from(
    [*"0123456789.,eE+-*/()% '\"°µΩ", "mm", "um", "in", "GHz", "ohm/sq", " ", "1e308", "1e-320"]
)


@given(
    text=st.one_of(st.text(max_size=40), st.lists(PIECES, max_size=25).map("".join)),
    dimension=st.sampled_from(Dimension),
)
def test_any_text_is_a_quantity_or_a_unit_error(text: str, dimension: Dimension) -> None:
    """Whatever is typed gives a finite value that its text gives again, or an error with what is allowed."""
    try:
        found = parse_measure(text, dimension, default_unit=dimension.usual_unit or None)
    except UnitError as error:
        refused = error
    else:
        assert math.isfinite(found.value)
        assert parse_measure(found.text, dimension) == found
        return
    assert refused.message
    assert refused.allowed
    assert str(refused).isprintable()


@pytest.mark.parametrize(
    ("text", "dimension", "value"),
    [
        ("20 °C", Dimension.TEMPERATURE, 293.15),
        ("-10°C", Dimension.TEMPERATURE, 263.15),
        ("20,5 degC", Dimension.TEMPERATURE, 293.65),
        ("20 ℃", Dimension.TEMPERATURE, 293.15),
        ("68 °F", Dimension.TEMPERATURE, 293.15),
        ("293.15 K", Dimension.TEMPERATURE, 293.15),
        ("300", Dimension.TEMPERATURE, 300.0),
        ("8 ps", Dimension.TIME, 8e-12),
        ("25 fs", Dimension.TIME, 25e-15),
        ("5e13 1/s", Dimension.RATE, 5e13),
        ("5e13 s^-1", Dimension.RATE, 5e13),
        ("5e13/s", Dimension.RATE, 5e13),
        ("1e12 1/cm3", Dimension.DENSITY, 1e18),
        ("1e12 cm^-3", Dimension.DENSITY, 1e18),
        ("1e18 1/m³", Dimension.DENSITY, 1e18),
        ("2.1 eV", Dimension.FREQUENCY, 2.1 * 1.602176634e-19 / 6.62607015e-34),
    ],
)
def test_quantities_of_materials(text: str, dimension: Dimension, value: float) -> None:
    """Temperatures with their zero, times, rates, densities and photon energies are read as they are written."""
    assert parse_measure(text, dimension).value == pytest.approx(value, rel=3e-16)


@pytest.mark.parametrize("text", ["2 * 20 °C", "20 °C + 1 °C", "20 °C / 2"])
def test_a_scale_with_its_own_zero_is_not_reckoned_with(text: str) -> None:
    """Twice 20 °C is no temperature anyone means."""
    with pytest.raises(UnitError, match="scale of its own zero"):
        parse_measure(text, Dimension.TEMPERATURE)


def test_a_default_unit_with_its_own_zero_counts() -> None:
    """A bare number typed where °C is usual is in °C."""
    assert parse_measure("20", Dimension.TEMPERATURE, default_unit="°C").value == 293.15
