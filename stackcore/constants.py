"""Constants of nature in SI units.

Source: BIPM, The International System of Units, 9th edition (2019), for the exact speed of light, Planck constant
and elementary charge; CODATA 2022 recommended values (NIST SP 961, 2024) for the vacuum permittivity and the mass
of the electron. The vacuum permeability and the wave impedance follow from the first two, so that the four always
agree with each other to the last bit.
"""

from typing import Final

SPEED_OF_LIGHT: Final = 299_792_458.0
"""m/s, exact."""

VACUUM_PERMITTIVITY: Final = 8.854_187_818_8e-12
"""F/m."""

VACUUM_PERMEABILITY: Final = 1.0 / (VACUUM_PERMITTIVITY * SPEED_OF_LIGHT**2)
"""H/m."""

FREE_SPACE_IMPEDANCE: Final = 1.0 / (VACUUM_PERMITTIVITY * SPEED_OF_LIGHT)
"""Wave impedance of free space, ohm (376.730 313 4)."""

PLANCK_CONSTANT: Final = 6.626_070_15e-34
"""J·s, exact."""

ELEMENTARY_CHARGE: Final = 1.602_176_634e-19
"""C, exact; also the joules of one electronvolt."""

ELECTRON_MASS: Final = 9.109_383_713_9e-31
"""kg."""
