"""Numbers as findings say them."""

from stackcore.media.base import FrequencyRange
from stackcore.units import Dimension, format_value


def hertz(frequency: float) -> str:
    """Return a frequency in a readable unit, three digits.

    Examples
    --------
    >>> hertz(9.3754e9)
    '9.38 GHz'
    """
    return format_value(frequency, Dimension.FREQUENCY, digits=3)


def span(band: FrequencyRange) -> str:
    """Return ``8 GHz to 12 GHz``."""
    return f"{hertz(band.lowest)} to {hertz(band.highest)}"


def percent(share: float) -> str:
    """Return a share in per cent, two digits.

    Examples
    --------
    >>> percent(0.0123), percent(1e-9)
    ('1.2 %', 'less than 0.01 %')
    """
    if share < 1e-4:
        return "less than 0.01 %"
    return f"{float(f'{100 * share:.2g}'):g} %"
