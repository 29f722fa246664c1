"""The table of quantities: which there are, what each says of itself, and the one that needs an element."""

import numpy as np
import pytest

from stackcore import (
    CIRCULAR,
    METAL,
    QUANTITIES,
    TE,
    TM,
    ConstantMedium,
    Layer,
    Response,
    SeriesSheet,
    SheetPlacement,
    Stack,
    solve,
    tilted,
)
from stackcore.quantities import GROUPS, ElementAbsorptance, element_absorptance, quantity_named

GLASS = Layer(ConstantMedium(6.3 - 0.15j), 4e-3)
WALL = Stack((GLASS, SheetPlacement(SeriesSheet(40.0)), Layer(ConstantMedium(1.1), 9e-3), GLASS))
WAVES = (TE, TM, CIRCULAR, tilted(0.6), tilted(-1.2))


def wall(back: object = None) -> Response:
    """Return a lossy wall over some frequencies and angles."""
    stack = WALL if back is None else Stack(WALL.elements, back=METAL)
    return solve(stack, [6e9, 7e9, 9e9], np.radians([0.0, 30.0, 70.0]))


def test_exactly_ten_are_columns_of_the_csv() -> None:
    """The contract's columns come first and in its order."""
    assert [name for name, one in QUANTITIES.items() if one.exported] == list(QUANTITIES)[:10]
    assert list(QUANTITIES)[9] == "group_delay_s"


@pytest.mark.parametrize("name", QUANTITIES)
def test_each_says_what_it_is(name: str) -> None:
    """Words, a sentence of definition, one of sign, a known unit and a group; the unit is in the name."""
    one = QUANTITIES[name]
    assert one.name == name
    assert one.label
    assert one.symbol
    assert one.definition.endswith(".")
    assert one.sign.endswith(".")
    assert one.group in GROUPS
    assert one.unit in ("", "dB", "deg", "s", "ohm")
    assert not one.unit or name.endswith(f"_{one.unit}")
    assert one.title == (f"{one.label}, {one.unit}" if one.unit else one.label)


def test_labels_and_groups_are_clear() -> None:
    """No two share a label, and the members of a group stand together."""
    labels = [one.label for one in QUANTITIES.values()]
    assert len(set(labels)) == len(labels)
    order = [GROUPS.index(one.group) for one in QUANTITIES.values()]
    assert order == sorted(order)


@pytest.mark.parametrize("metal", [False, True])
@pytest.mark.parametrize("name", QUANTITIES)
def test_every_polarization_gives_frequency_by_angle(name: str, metal: bool) -> None:
    """Any quantity of any wave is (F, A), and that of TE and TM is one of the two columns of its values."""
    response, one = wall(METAL if metal else None), QUANTITIES[name]
    with np.errstate(all="raise", under="ignore"):
        both = one.values(response)
        assert both.shape == (3, 3, 2)
        for wave in WAVES:
            found = one.of(response, wave)
            assert found.shape == (3, 3)
            if wave.single is not None:
                assert np.array_equal(found, both[:, :, wave.single], equal_nan=True)


def test_the_mean_lies_between_te_and_tm() -> None:
    """Powers of a circular wave are the means, and a tilted one slides from TE to TM."""
    response = wall()
    for name in ("reflectance", "transmittance", "absorptance"):
        te, tm = np.moveaxis(getattr(response, name), -1, 0)
        assert QUANTITIES[name].of(response, CIRCULAR) == pytest.approx((te + tm) / 2, rel=1e-15)
        assert QUANTITIES[name].of(response, tilted(np.radians(30))) == pytest.approx(
            0.75 * te + 0.25 * tm, rel=1e-15
        )


def test_an_element_has_its_own_absorptance() -> None:
    """Its values are those of the response, several add up, and the mean of a circular wave is between."""
    response = wall()
    for row in range(4):
        one = ElementAbsorptance(row).quantity("pane")
        assert np.array_equal(one.values(response), response.element_absorptance[..., row])
        assert one.of(response, CIRCULAR) == pytest.approx(response.element_absorptance[..., row].mean(axis=-1))
        assert one.label == "Absorptance of pane"
        assert quantity_named(one.name).label == f"Absorptance of element {row + 1}"
    every = ElementAbsorptance(0, 1, 2, 3).quantity()
    assert every.of(response, TE) == pytest.approx(response.absorptance[..., 0], rel=1e-13)
    assert np.isnan(ElementAbsorptance(4).values(response)).all()


@pytest.mark.parametrize(
    "name",
    [
        "absorptance",
        "element_absorptance",
        "element_absorptance:",
        "element_absorptance:-1",
        "element_absorptance:1,",
        "other:1",
    ],
)
def test_what_names_no_element(name: str) -> None:
    """Only whole numbers after the colon name elements."""
    assert element_absorptance(name) is None


def test_an_unknown_name_is_an_error() -> None:
    """A name that is neither in the table nor of an element is a KeyError."""
    with pytest.raises(KeyError, match="gain"):
        quantity_named("gain")
