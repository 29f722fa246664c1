"""A medium that does not depend on frequency."""

import numpy as np
import pytest

from stackcore.media.constant import VACUUM, ConstantMedium


@pytest.mark.parametrize("shape", [(), (3,), (2, 4)])
def test_values_have_the_shape_of_the_frequencies(shape: tuple[int, ...]) -> None:
    """Every array has the shape of the frequencies, holds the constants and has no slope."""
    values = ConstantMedium(4.2 - 0.063j, 1.5 - 0.2j).evaluate(np.full(shape, 1e10))
    assert np.array_equal(values.permittivity, np.full(shape, 4.2 - 0.063j))
    assert np.array_equal(values.permeability, np.full(shape, 1.5 - 0.2j))
    for slope in (values.permittivity_slope, values.permeability_slope):
        assert np.array_equal(slope, np.zeros(shape))


def test_vacuum_is_one_exactly() -> None:
    """The vacuum has ε = μ = 1 without rounding and does not depend on frequency."""
    assert (VACUUM.permittivity, VACUUM.permeability, VACUUM.dispersive) == (1, 1, False)


@pytest.mark.parametrize(
    ("permittivity", "permeability", "told"),
    [
        (4 + 0.1j, 1, "permittivity .* has gain"),
        (4, 1 + 1e-9j, "permeability .* has gain"),
        (0, 1, "permittivity must not be 0"),
        (4, 0, "permeability must not be 0"),
        (float("nan"), 1, "permittivity .* is not finite"),
        (4, complex(1, float("-inf")), "permeability .* is not finite"),
    ],
)
def test_what_is_no_passive_medium_is_refused(permittivity: complex, permeability: complex, told: str) -> None:
    """Gain, zero and values that are not finite raise ValueError and name the constant."""
    with pytest.raises(ValueError, match=told):
        ConstantMedium(permittivity, permeability)
