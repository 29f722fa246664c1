"""The table of models, and the way of every model's constants through a file."""

import json
import tomllib

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from stackcore.errors import Fault
from stackcore.media.base import FrequencyRange, Provenance
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.library_file import read_family
from stackcore.media.library_text import entry_text
from stackcore.media.models import MODELS, Constants, Terms, value_text
from stackcore.units import Dimension, measure, parse_measure
from tests.stackcore.media.model_strategies import PART, model_constants

BAND = FrequencyRange(1e9, 2e9)
NOWHERE = Provenance("a test")
NAMES = list(MODELS)


def faults_of(model: str, given_constants: dict[str, object]) -> dict[str, str]:
    """Return path and message of what is wrong in an object of a file."""
    told: list[Fault] = []

    def tell(path: str, message: str, allowed: str) -> None:
        assert allowed
        told.append(Fault(path, message, allowed))

    constants = MODELS[model].read(given_constants, "m", tell)
    paths = {fault.path for fault in told}
    told += [fault for fault in MODELS[model].faults(constants, "m") if fault.path not in paths]
    return {fault.path.removeprefix("m."): fault.message for fault in told}


def test_the_words_of_the_trade() -> None:
    """The names that files rely on are there, and nothing else is."""
    dielectrics = {"constant", "lossy-dielectric", "conductor", "wideband", "wideband-step", "power-law"}
    relaxations = {"debye", "multi-debye", "cole-cole", "cole-davidson", "havriliak-negami"}
    resonances = {"lorentz", "multi-lorentz", "drude", "drude-lorentz", "plasma", "sellmeier", "cauchy"}
    magnets = {"magnetic-debye", "magnetic-lorentz", "magnetic"}
    waters = {"water-liebe", "water-ellison", "sea-water", "ice"}
    assert set(NAMES) == dielectrics | relaxations | resonances | magnets | waters | {
        "tabulated",
        "mixture",
        "joined",
    }


@pytest.mark.parametrize("name", NAMES)
def test_every_model_says_what_it_is(name: str) -> None:
    """Label, sentence, formula, and of every constant a label, a sentence and what is allowed are there."""
    model = MODELS[name]
    assert model.name == name
    assert model.label
    assert model.about.endswith(".")
    assert model.formula
    for constant in model.constants:
        assert constant.label
        assert constant.about.endswith(".")
        assert constant.kind.word
        assert constant.kind.allowed
        default = model.default(constant.name)
        assert default is None or not list(constant.kind.faults(default, "x")) or default == 0


@pytest.mark.parametrize("name", NAMES)
def test_every_model_has_something_to_begin_from(name: str) -> None:
    """The constants of a new material have no fault and make a passive medium."""
    model = MODELS[name]
    constants = model.start()
    assert list(model.faults(constants, "m")) == []
    values = model.build(constants, media={"air": PART} if model.nested else None).evaluate(np.array([1e9, 1e10]))
    assert (values.permittivity.imag <= 0).all()
    assert (values.permeability.imag <= 0).all()


@pytest.mark.parametrize("name", NAMES)
@given(data=st.data())
@settings(max_examples=25)
def test_constants_survive_json(name: str, data: st.DataObject) -> None:
    """What is written of a model is read as the same constants, which make the same medium."""
    model = MODELS[name]
    constants = data.draw(model_constants(name))
    text = json.dumps(model.written(constants))
    told: list[str] = []
    again = model.read(json.loads(text), "", lambda path, message, allowed: told.append(message))
    assert (again, told) == (constants, [])
    assert list(model.faults(again, "")) == []
    media = {"air": PART}
    assert model.build(again, media=media) == model.build(constants, media=media)


@pytest.mark.parametrize("name", NAMES)
@given(data=st.data())
@settings(max_examples=15)
def test_an_entry_survives_toml(name: str, data: st.DataObject) -> None:
    """An entry written as TOML is read with the same constants, range, source and spread, and builds."""
    model = MODELS[name]
    constants = data.draw(model_constants(name, ("trial/part",)))
    ends = (measure(1e9, Dimension.FREQUENCY), measure(2e9, Dimension.FREQUENCY)) if model.ranged else None
    spread = tuple((one.name, 0.125) for one in model.constants if one.varies and one.name in constants)
    told = Provenance('a "test" with \x7f\n and \\', "read", spread, "note")
    part = entry_text("part", "Part", "constant", {"permittivity": 3 - 0.01j}, ends, Provenance("x", "read"))
    if not model.ranged:
        part = part.replace("spread", 'range = ["1 GHz", "2 GHz"]\nspread')
    part = part.replace("spread = {}", "spread = { permittivity = 0 }")
    text = f'[family]\nlabel = "Trial"\n{part}\n{entry_text("it", "It", name, constants, ends, told)}'
    tomllib.loads(text)
    family = read_family("trial", text.encode())
    assert family.faults == ()
    entry = family.entries[1]
    assert (entry.constants, entry.model, entry.provenance) == (constants, name, told)
    assert entry.valid_range == BAND or not model.ranged


FAULTS: list[tuple[str, dict[str, object], str, str]] = [
    ("debye", {"permittivity_step": 2, "relaxation_time": "1 ps"}, "high_frequency_permittivity", "is missing"),
    ("debye", {"relaxation_time": "1 GHz"}, "relaxation_time", "is a frequency, not a time"),
    ("debye", {"relaxation_time": "-1 ps"}, "relaxation_time", "is negative"),
    ("debye", {"relaxation_time": True}, "relaxation_time", "true is not a time"),
    ("debye", {"permittivity_step": "2"}, "permittivity_step", "'2' is not a number"),
    ("debye", {"permittivity_step": -2}, "permittivity_step", "negative, which would be gain"),
    ("debye", {"permittivity_step": 10**400}, "permittivity_step", "is not a number"),
    ("debye", {"conductivity": "-1 S/m"}, "conductivity", "would be gain"),
    ("cole-cole", {"symmetric_exponent": 1.5}, "symmetric_exponent", "too large"),
    ("multi-debye", {"terms": {}}, "terms", "is not a list"),
    ("multi-debye", {"terms": []}, "terms", "0 terms"),
    ("multi-debye", {"terms": [3]}, "terms[0]", "3 is not an object"),
    ("multi-debye", {"terms": [{"permittivity_step": 1}]}, "terms[0].relaxation_time", "is missing"),
    ("multi-debye", {"terms": [{"relaxation_tim": 1}]}, "terms[0].relaxation_tim", "did you mean"),
    ("lorentz", {"linewidth": 0}, "linewidth", "is 0"),
    ("drude", {"collision_rate": "5 THz"}, "collision_rate", "is a frequency, not a rate"),
    ("plasma", {"electron_density": "1e18 m"}, "electron_density", "is a length, not a number density"),
    ("cauchy", {"terms": [{"coefficient": 1, "exponent": 1.5}]}, "terms[0].exponent", "not a whole number"),
    ("cauchy", {"terms": [{"coefficient": 1, "exponent": 0}]}, "terms[0].exponent", "not a whole number other"),
    ("cauchy", {"squared": 1}, "squared", "neither true nor false"),
    ("conductor", {"roughness_rule": "grois"}, "roughness_rule", "did you mean 'groiss'"),
    ("conductor", {"roughness_rule": 3}, "roughness_rule", "3 is not a text"),
    ("ice", {"temperature": "5 GHz"}, "temperature", "is a frequency, not a temperature"),
    ("ice", {"temperature": "-300 °C"}, "temperature", "is negative"),
    ("sea-water", {"salinity": -1}, "salinity", "is negative"),
    ("tabulated", {"rows": [{"frequency": "1 GHz", "permittivity": 2}]}, "rows", "1 row"),
    ("tabulated", {"rows": [{"frequency": "1 GHz", "permittivity": [2, -1]}]}, "rows[0].permittivity", "gain"),
    ("mixture", {"host": 3}, "host", "3 is not the name of a material"),
    ("mixture", {"rule": "brugeman"}, "rule", "did you mean 'bruggeman'"),
    ("mixture", {"inclusions": [{"material": "a", "fraction": 1.2}]}, "inclusions[0].fraction", "too large"),
    ("wideband", {"permittivity": [4, 0.1]}, "permittivity", "a list of 2 is not a number"),
    ("lossy-dielectric", {"permittivity": [4, 0.1], "loss_tangent": 0.1}, "loss_tangent", "given twice"),
]


@pytest.mark.parametrize(("model", "given_constants", "place", "told"), FAULTS)
def test_a_fault_of_a_constant_has_its_place(
    model: str, given_constants: dict[str, object], place: str, told: str
) -> None:
    """Every kind of wrong value is told at its place with what is wrong."""
    assert told in faults_of(model, given_constants)[place]


BUILT: list[tuple[str, dict[str, object], str, str]] = [
    ("ice", {"temperature": "20 °C"}, "m.temperature", "must lie between"),
    (
        "tabulated",
        {"rows": [{"frequency": "2 GHz", "permittivity": 2}, {"frequency": "1 GHz", "permittivity": 2}]},
        "m.rows[1].frequency",
        "follows",
    ),
    (
        "tabulated",
        {
            "rows": [
                {"frequency": "1 GHz", "permittivity": 2, "permeability": 2},
                {"frequency": "2 GHz", "permittivity": 2},
            ]
        },
        "m.rows[1].permeability",
        "is missing",
    ),
    ("joined", {"parts": [{"material": "air"}, {"material": "air"}]}, "m.parts[0].up_to", "is missing"),
    (
        "joined",
        {"parts": [{"material": "air", "up_to": "1 GHz"}, {"material": "air", "up_to": "2 GHz"}]},
        "m.parts[1].up_to",
        "the last part has no end",
    ),
    (
        "joined",
        {
            "parts": [
                {"material": "air", "up_to": "2 GHz"},
                {"material": "air", "up_to": "1 GHz"},
                {"material": "air"},
            ]
        },
        "m.parts[1].up_to",
        "follows",
    ),
    (
        "mixture",
        {"host": "air", "inclusions": [{"material": "air", "fraction": 0.6}, {"material": "air", "fraction": 0.6}]},
        "m.inclusions",
        "add up to 1.2",
    ),
    (
        "wideband-step",
        {
            "high_frequency_permittivity": 3,
            "permittivity_step": 1,
            "lower_frequency": "2 GHz",
            "upper_frequency": "1 GHz",
        },
        "m",
        "",
    ),
    (
        "havriliak-negami",
        {
            "high_frequency_permittivity": 3,
            "permittivity_step": 1,
            "relaxation_time": "1 ps",
            "symmetric_exponent": 0.9,
            "asymmetric_exponent": 2,
        },
        "m.asymmetric_exponent",
        "would be gain",
    ),
]


@pytest.mark.parametrize(("model", "given_constants", "place", "told"), BUILT)
def test_what_only_the_medium_refuses_has_its_place_too(
    model: str, given_constants: dict[str, object], place: str, told: str
) -> None:
    """Constants that are well each by themselves and make no medium together are told where they stand."""
    row = MODELS[model]
    constants = row.read(given_constants, "m", lambda path, message, allowed: pytest.fail(message))
    assert list(row.faults(constants, "m")) == []
    with pytest.raises(ValueError) as caught:  # noqa: PT011  whatever its text, it is the place that counts
        row.build(constants, media={"air": PART})
    (fault,) = row.located(caught.value, "m")
    assert fault.path.startswith(place)
    assert told in fault.message


@given(st.floats(0.1, 100.0), st.floats(1e-9, 10.0))
def test_loss_tangent_is_loss_over_real_part(real: float, tangent: float) -> None:
    """A permittivity with a loss tangent builds the medium ε′(1 − j·tan δ)."""
    medium = MODELS["constant"].build({"permittivity": complex(real), "loss_tangent": tangent}, BAND, NOWHERE)
    assert isinstance(medium, ConstantMedium)
    assert medium.permittivity == pytest.approx(real * (1 - 1j * tangent), rel=1e-15)
    assert (medium.valid_range, medium.provenance) == (BAND, NOWHERE)


def test_loss_given_twice_is_refused() -> None:
    """A pair with loss and a loss tangent together do not build a medium."""
    for name in ("constant", "lossy-dielectric"):
        with pytest.raises(ValueError, match="given twice"):
            MODELS[name].build({"permittivity": 4.2 - 0.06j, "loss_tangent": 0.015}, None, NOWHERE)


def test_conductor_is_built_with_its_range() -> None:
    """The conductor takes the conductivity in S/m, its permeability, its range and its source."""
    constants = Constants(conductivity=parse_measure("6 MS/m", Dimension.CONDUCTIVITY), permeability=200 + 0j)
    assert MODELS["conductor"].build(constants, BAND, NOWHERE) == ConductorMedium(6e6, 200, BAND, NOWHERE)


def test_constants_are_a_frozen_mapping() -> None:
    """Equal constants are equal and hash alike whatever their order, and a change makes new ones."""
    one, two = Constants(a=1.0, b=2 + 0j), Constants(b=2 + 0j, a=1.0)
    assert (one, hash(one), list(one)) == (two, hash(two), ["a", "b"])
    assert one.with_value("a", None) == {"b": 2 + 0j}
    assert one["a"] == 1.0
    with pytest.raises(TypeError):
        one["a"] = 2.0  # type: ignore[index]  # that it cannot be set is what is tested


@pytest.mark.parametrize("name", NAMES)
@given(data=st.data())
@settings(max_examples=5)
def test_references_are_found_and_renamed(name: str, data: st.DataObject) -> None:
    """Every material that constants refer to is found with its place, and a new name takes its place."""
    model = MODELS[name]
    constants = data.draw(model_constants(name, ("one",)))
    places = [place for place, used in model.references(constants)]
    assert {used for _, used in model.references(constants)} == ({"one"} if model.nested else set())
    renamed = model.renamed(constants, "one", "two")
    assert model.references(renamed) == tuple((place, "two") for place in places)
    assert (renamed == constants) is not model.nested


def test_values_as_texts() -> None:
    """Constants are shown as they are typed."""
    rows = MODELS["multi-debye"].start()["terms"]
    texts = [
        value_text(value) for value in (4.2 + 0j, 2 - 0.5j, 3.0, True, "air", measure(1e9, Dimension.FREQUENCY))
    ]
    assert texts == ["4.2", "2 - 0.5j", "3", "yes", "air", "1 GHz"]
    assert value_text(rows) == "1 row"
    assert isinstance(MODELS["multi-debye"].constants[1].kind, Terms)
