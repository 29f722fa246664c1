"""What the constants of a medium must be; each check raises ValueError and names the constant.

No matter has a constant beyond 1e-40 or 1e40 SI units. Refusing what lies beyond keeps every model free of overflow
from 1 Hz to 1 PHz, squares and slopes included.
"""

import cmath
import math
from typing import Final

SMALLEST: Final = 1e-40
"""The smallest positive constant, in SI units."""

LARGEST: Final = 1e40
"""The largest constant, in SI units."""


def check_number(name: str, value: float) -> None:
    """Refuse a number that is not finite or is too large for any matter."""
    if not math.isfinite(value):
        raise ValueError(f"{name} {value} is not finite")
    if abs(value) > LARGEST:
        raise ValueError(f"{name} {value:g} is beyond {LARGEST:g}, more than any matter has")


def check_positive(name: str, value: float, unit: str = "") -> None:
    """Refuse what is not a finite number above 0.

    Examples
    --------
    >>> check_positive("relaxation_time", -1e-12, "s")
    Traceback (most recent call last):
    ...
    ValueError: relaxation_time -1e-12 s must be above 0
    """
    check_number(name, value)
    if not value > 0:
        raise ValueError(f"{name} {_with_unit(value, unit)} must be above 0")
    if value < SMALLEST:
        raise ValueError(f"{name} {value:g} is below {SMALLEST:g}, less than any matter has")


def check_loss(name: str, value: float, unit: str = "") -> None:
    """Refuse what is not a finite number, 0 or above: below 0 it would be gain."""
    check_number(name, value)
    if value < 0:
        raise ValueError(f"{name} {_with_unit(value, unit)} is negative, which would be gain")
    if value:
        check_positive(name, value, unit)


def check_exponents(symmetric: float = 1.0, asymmetric: float = 1.0) -> None:
    """Refuse exponents of a broadened relaxation that are not above 0, or whose medium would have gain."""
    for name, value in (("symmetric_exponent", symmetric), ("asymmetric_exponent", asymmetric)):
        check_positive(name, value)
    if symmetric > 1:
        raise ValueError(f"symmetric_exponent {symmetric:g} is above 1, which would be gain")
    if asymmetric * symmetric > 1 + 1e-12:  # 1/a times a is not always 1 to the last digit
        allowed = "1" if symmetric == 1 else f"1/symmetric_exponent = {1 / symmetric:g}"
        raise ValueError(f"asymmetric_exponent {asymmetric:g} is above {allowed}, which would be gain")
    if min(symmetric, asymmetric) < 1e-3 or asymmetric > 1e3:
        raise ValueError("symmetric_exponent and asymmetric_exponent must lie between 0.001 and 1000")


def check_terms(name: str, terms: tuple[object, ...]) -> None:
    """Refuse a sum without terms, and a list, which would leave the medium changeable."""
    if not isinstance(terms, tuple):
        raise ValueError(f"{name} must be a tuple, not a {type(terms).__name__}")
    if not terms:
        raise ValueError(f"{name} must hold at least one term")


def check_relative(name: str, value: complex) -> None:
    """Refuse a relative constant that is not finite, has gain or is 0.

    Examples
    --------
    >>> check_relative("permeability", 2 + 0.1j)
    Traceback (most recent call last):
    ...
    ValueError: permeability (2+0.1j) has gain: its imaginary part must be 0 or negative
    """
    if not cmath.isfinite(value):
        raise ValueError(f"{name} {value} is not finite")
    if complex(value).imag > 0:
        raise ValueError(f"{name} {value} has gain: its imaginary part must be 0 or negative")
    if value == 0:
        raise ValueError(f"{name} must not be 0")


def _with_unit(value: float, unit: str) -> str:
    return f"{value:g} {unit}" if unit else f"{value:g}"
