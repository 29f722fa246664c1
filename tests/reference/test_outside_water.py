"""Water against an independent general-purpose package of physical properties.

`chemicals` carries the equation of the International Association for the Properties of Water and Steam for the
static permittivity (IAPWS R8-97; D. P. Fernández and others, J. Phys. Chem. Ref. Data 26, 1125 (1997)), which
neither of the two models here was made from.
"""

import numpy as np
import pytest
from chemicals import permittivity_IAPWS

from stackcore.media.library import library_entry

LOW = 1e6
"""Hz: far below the relaxation, where ε′ is the static permittivity to six digits."""


DENSITY = {0: 999.84, 10: 999.70, 20: 998.21, 30: 995.65, 40: 992.22, 60: 983.20}
"""kg/m³ of water at 1 atm by °C, CRC Handbook of Chemistry and Physics, recalled; 1e-3 of it moves ε′ by 1e-3."""


def static(key: str) -> float:
    """Return ε′ of an entry far below its relaxation."""
    return float(library_entry(key).medium.evaluate(np.array([LOW])).permittivity[0].real)


@pytest.mark.parametrize("celsius", [0, 20, 40, 60])
def test_ellison_has_the_static_permittivity_of_iapws(celsius: int) -> None:
    """To a thousandth from 0 to 60 °C."""
    expected = permittivity_IAPWS(celsius + 273.15, DENSITY[celsius])
    assert static(f"water/water-ellison-{celsius}c") == pytest.approx(expected, rel=1e-3)


@pytest.mark.parametrize("celsius", [0, 10, 20, 30])
def test_liebe_has_the_static_permittivity_of_iapws(celsius: int) -> None:
    """Its straight line in 300/T − 1 keeps within half a per cent from 0 to 30 °C."""
    expected = permittivity_IAPWS(celsius + 273.15, DENSITY[celsius])
    assert static(f"water/water-{celsius}c") == pytest.approx(expected, rel=5e-3)
