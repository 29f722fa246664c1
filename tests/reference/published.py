"""What the tables of published values share: how a printed number is compared, and short hands for walls.

Every row names its source and how sure we are of it: ``read`` in the source, ``read in a transcription`` of
it, ``recalled, re-derived`` (from memory of the source; an independent program agrees), ``recalled`` (from
memory only) or ``second method`` (no publication: computed by an independent program).
"""

from collections.abc import Sequence
from decimal import Decimal

import numpy as np

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.propagation import Response, solve
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import Element, Layer, PerfectConductor, SheetPlacement, Stack

READ = "read"
TRANSCRIBED = "read in a transcription"
REDERIVED = "recalled, re-derived"
RECALLED = "recalled"
SECOND_METHOD = "second method"

TE, TM = 0, 1


def assert_printed(value: float, printed: str, source: str) -> None:
    """Assert that `value`, rounded like `printed`, is `printed`: within half a unit of its last digit."""
    assert_within(value, float(printed), half_unit(printed), source)


def half_unit(printed: str) -> float:
    """Return half a unit of the last printed digit: 0.05 for "1.2", 0.5e-5 for "2.79e-3"."""
    exponent = Decimal(printed).as_tuple().exponent
    assert isinstance(exponent, int)
    return 0.5 * 10.0**exponent * (1 + 1e-9)


def assert_within(value: float, expected: float, tolerance: float, source: str) -> None:
    """Assert that `value` is within `tolerance`, absolute, of `expected`; the message tells the source."""
    assert abs(value - expected) <= tolerance, f"got {value!r}, {source} has {expected!r} (±{tolerance:.3g})"


def solved(stack: Stack, frequency: float | Sequence[float], degrees: float | Sequence[float] = 0.0) -> Response:
    """Return the response at frequencies in Hz and angles in degrees."""
    return solve(stack, frequency=np.asarray(frequency), angle=np.radians(degrees))


def light(micrometres: float) -> float:
    """Return the frequency in Hz of light of a vacuum wavelength in micrometres."""
    return SPEED_OF_LIGHT / (micrometres * 1e-6)


def index(n: complex) -> ConstantMedium:
    """Return a medium of refractive index n − jk."""
    return ConstantMedium(n**2)


def quarter(n: float, wavelength: float) -> Layer:
    """Return a layer of index `n`, a quarter wave thick at `wavelength`, both in m."""
    return Layer(index(n), wavelength / (4 * n))


def sheet(resistance: float) -> SheetPlacement:
    """Return a sheet of `resistance` in ohm per square."""
    return SheetPlacement(SeriesSheet(resistance))


def wall(
    *elements: Element, front: AbstractMedium = VACUUM, back: AbstractMedium | PerfectConductor = VACUUM
) -> Stack:
    """Return a stack of `elements`."""
    return Stack(elements, front=front, back=back)
