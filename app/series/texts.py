"""How values of quantities and frequencies read on screen, and the exact text to be copied.

Table, readings, plot and wall drawing all write numbers by these functions, so that one value reads the same
wherever it stands.
"""

import math
from typing import Final

from app.series.shown import shown
from stackcore.units import Dimension, format_value

PRACTICAL_DECIBELS: Final = 400.0
"""Beyond this an ideal wall says nothing about a real one: what passes its seams and edges is far more."""

BEYOND_PRACTICAL: Final = "beyond practical limit (seams govern)"

DIGITS: Final = 4
"""Significant digits on screen of values without a fixed number of decimals."""

FREQUENCY_DIGITS: Final = 7
"""Significant digits of a frequency on screen: 1 Hz at 1 MHz, 1 kHz at 1 GHz."""

MINUS: Final = "\u2212"
_SUPERSCRIPTS: Final = str.maketrans("-0123456789", "⁻⁰¹²³⁴⁵⁶⁷⁸⁹")
_SMALLEST_PLAIN: Final = 1e-3
_LARGEST_PLAIN: Final = 1e5


def number_text(quantity: str, value: float, unit: str = "") -> str:
    """Return `value`, in the unit on screen, without its unit.

    Parameters
    ----------
    quantity
        CSV column name.
    value
        As `app.series.curves` has it. Infinity reads ``∞``, what is not a number ``–``.
    unit
        The unit on screen; it tells how a fraction of power is shown, and other quantities ignore it.

    Examples
    --------
    >>> number_text("transmittance", 0.83456), number_text("insertion_loss_dB", 0.78512)
    ('0.8346', '0.785')
    >>> number_text("transmittance", 1.2e-7), number_text("insertion_loss_dB", float("inf"))
    ('1.200×10⁻⁷', '∞')
    """
    if math.isnan(value):
        return "–"
    if math.isinf(value):
        return "∞" if value > 0 else f"{MINUS}∞"
    decimals = 3 if unit == "dB" else shown(quantity).decimals
    text = _significant(value, DIGITS) if decimals is None else _fixed(value, decimals)
    return text.replace("-", MINUS)


def value_text(quantity: str, value: float, unit: str) -> str:
    """Return `value` with its unit, and beyond `PRACTICAL_DECIBELS` what that means.

    Examples
    --------
    >>> value_text("shielding_effectiveness_dB", 5671.0, "dB")
    '5671.0 dB, beyond practical limit (seams govern)'
    >>> value_text("insertion_phase_delay_deg", -12.5, "deg")
    '−12.50°'
    """
    number = number_text(quantity, value, unit)
    return number + unit_suffix(unit) + (f", {BEYOND_PRACTICAL}" if beyond_practical(quantity, value) else "")


def exact_text(value: float, unit: str) -> str:
    """Return every digit of `value` and its unit, to be copied: plain letters, dot decimal.

    Examples
    --------
    >>> exact_text(0.1 + 0.2, "dB"), exact_text(float("inf"), "dB")
    ('0.30000000000000004 dB', 'inf dB')
    """
    return f"{value!r} {unit}".strip()


def beyond_practical(quantity: str, value: float) -> bool:
    """Return whether `value` is more than any wall with edges keeps, though still finite."""
    return shown(quantity).practical and PRACTICAL_DECIBELS < value < math.inf


def unit_suffix(unit: str) -> str:
    """Return what follows a number: a space and the unit, the sign of degrees without a space, or nothing."""
    if unit == "deg":
        return "°"
    return f" {unit}" if unit else ""


def frequency_text(frequency: float, unit: str | None = None) -> str:
    """Return a frequency in Hz for the screen, in `unit` or a readable one.

    Examples
    --------
    >>> frequency_text(9.4e9), frequency_text(9.4e9, "MHz")
    ('9.4 GHz', '9400 MHz')
    """
    return format_value(frequency, Dimension.FREQUENCY, unit=unit, digits=FREQUENCY_DIGITS)


def angle_text(angle: float) -> str:
    """Return an angle in rad for the screen, in degrees.

    Examples
    --------
    >>> angle_text(math.radians(22.5))
    '22.5°'
    """
    return f"{format_value(angle, Dimension.ANGLE, unit='deg', digits=6).removesuffix(' deg')}°"


def _fixed(value: float, decimals: int) -> str:
    """Return `value` with fixed decimals, fewer from 1000 upward, where nobody reads them."""
    if abs(value) >= 1000:
        decimals = 1
    text = f"{value:.{decimals}f}"
    # A rounded −0.000 is no sign of anything.
    return text.removeprefix("-") if float(text) == 0 else text


def _significant(value: float, digits: int) -> str:
    """Return `value` with significant digits, zeros kept so that columns do not dance, powers as superscripts."""
    if value == 0:
        return "0"
    scientific = f"{value:.{digits - 1}e}"
    mantissa, _, power = scientific.partition("e")
    if _SMALLEST_PLAIN <= abs(float(scientific)) < _LARGEST_PLAIN:
        return f"{float(scientific):.{max(digits - 1 - int(power), 0)}f}"
    return f"{mantissa}×10{str(int(power)).translate(_SUPERSCRIPTS)}"
