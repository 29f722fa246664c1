"""Responses the tests of the series begin with, solved or made up."""

import numpy as np

from stackcore.media.base import FloatArray
from stackcore.media.constant import ConstantMedium
from stackcore.propagation import Response, solve
from stackcore.stack import METAL, Layer, Stack

FREQUENCY: FloatArray = np.linspace(8e9, 12e9, 5)
ANGLE: FloatArray = np.radians([0.0, 60.0, 30.0])


def slab(*, metal_back: bool = False, frequency: FloatArray = FREQUENCY) -> Response:
    """Return the response of a lossy 5 mm slab, before air or metal, at 0°, 60° and 30°."""
    layer = Layer(ConstantMedium(4.0 - 0.1j), 5e-3)
    stack = Stack((layer,), back=METAL) if metal_back else Stack((layer,))
    return solve(stack, frequency, ANGLE)
