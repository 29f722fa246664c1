"""The table of models a library file can name."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.errors import UnitError
from stackcore.media.base import FrequencyRange, Provenance
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.models import MODELS, Constant, read_conductivity, read_loss_tangent, read_relative

BAND = FrequencyRange(1e9, 2e9)
NOWHERE = Provenance("a test")


@pytest.mark.parametrize(
    ("given_value", "constant"),
    [(4, 4 + 0j), (4.2, 4.2 + 0j), ([4.2, 0.06], 4.2 - 0.06j), ([-3, 0], -3 + 0j), ([2, 0.0], 2 + 0j)],
)
def test_relative_constants(given_value: object, constant: complex) -> None:
    """A number has no loss; a pair is real − j·loss."""
    assert read_relative(given_value) == constant


@pytest.mark.parametrize(
    "given_value", ["4.2", True, None, [4.2], [4.2, 0.1, 0.2], [4.2, "0.1"], [], float("nan"), 10**400, {"a": 1}]
)
def test_what_is_no_relative_constant(given_value: object) -> None:
    """Anything but a finite number or a pair of them is refused, with an example of what is right."""
    with pytest.raises(UnitError) as caught:
        read_relative(given_value)
    assert "[4.2, 0.06]" in caught.value.allowed


def test_gain_is_refused() -> None:
    """A negative loss and a negative loss tangent say that they would be gain."""
    with pytest.raises(UnitError, match="gain"):
        read_relative([4.2, -1e-6])
    with pytest.raises(UnitError, match="gain"):
        read_loss_tangent(-1e-6)


@pytest.mark.parametrize("given_value", ["0.01", True, None, [0.01], float("inf")])
def test_what_is_no_loss_tangent(given_value: object) -> None:
    """Only a finite number is a loss tangent."""
    with pytest.raises(UnitError, match="not a loss tangent"):
        read_loss_tangent(given_value)


def test_conductivity_keeps_its_text() -> None:
    """A conductivity is read with its unit and keeps the text as typed; a number is in S/m."""
    assert (read_conductivity("58 MS/m").value, read_conductivity("58 MS/m").text) == (5.8e7, "58 MS/m")
    assert read_conductivity("100 %IACS").value == pytest.approx(5.8e7, rel=1e-15)
    assert read_conductivity(12).value == 12


@pytest.mark.parametrize("given_value", ["0 MS/m", "-1 S/m", 0, -3.0, True, None, ["58 MS/m"], "58 MHz", "much"])
def test_what_is_no_conductivity(given_value: object) -> None:
    """Zero, negative values, other units and other types are refused."""
    with pytest.raises(UnitError):
        read_conductivity(given_value)


@given(st.floats(0.1, 100.0), st.floats(0.0, 10.0))
def test_loss_tangent_is_loss_over_real_part(real: float, tangent: float) -> None:
    """A permittivity with a loss tangent builds the medium ε′(1 − j·tan δ)."""
    medium = MODELS["constant"].build({"permittivity": real, "loss_tangent": tangent}, BAND, NOWHERE)
    assert isinstance(medium, ConstantMedium)
    assert medium.permittivity == pytest.approx(real * (1 - 1j * tangent), rel=1e-15)
    assert (medium.valid_range, medium.provenance) == (BAND, NOWHERE)


def test_loss_given_twice_is_refused() -> None:
    """A pair with loss and a loss tangent together do not build a medium."""
    with pytest.raises(ValueError, match="given twice"):
        MODELS["constant"].build({"permittivity": 4.2 - 0.06j, "loss_tangent": 0.015}, None, NOWHERE)


def test_conductor_is_built_with_its_range() -> None:
    """The conductor takes the conductivity in S/m, its permeability, its range and its source."""
    constants: dict[str, Constant] = {"conductivity": read_conductivity("6 MS/m"), "permeability": 200 + 0j}
    medium = MODELS["conductor"].build(constants, BAND, NOWHERE)
    assert medium == ConductorMedium(6e6, 200, BAND, NOWHERE)
