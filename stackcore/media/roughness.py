"""How much more a rough metal surface resists than a smooth one: published rules.

    Hammerstad-Jensen   K = 1 + (2/π) atan(1.4 (Δ/δ)²)
    Groiss              K = 1 + exp(−(δ/2Δ)^1.6)

Δ is the rms roughness and δ the skin depth of the smooth metal. Both go from 1 to 2; the first was fitted to
grooves across the current (S. P. Morgan), the second to measured foils. Neither holds for surfaces with a
developed area of much more than twice the flat one. Sources: E. Hammerstad, O. Jensen, IEEE MTT-S Int. Microwave
Symp. Digest, 407 (1980); S. Groiss, I. Bardi, O. Biro, K. Preis, K. R. Richter, IEEE Trans. Magn. 32, 894 (1996);
both recalled.
"""

from typing import Final

import numpy as np

from stackcore.arrays import FloatArray

HAMMERSTAD_JENSEN: Final = "hammerstad-jensen"
GROISS: Final = "groiss"
ROUGHNESS_RULES: Final = (HAMMERSTAD_JENSEN, GROISS)
"""The rules by name."""


def roughness_factor(rule: str, ratio2: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Return K and ∂K/∂ln s at s = (Δ/δ)², `ratio2`, of any shape, > 0.

    Examples
    --------
    >>> float(np.round(roughness_factor("hammerstad-jensen", np.array(1.0))[0], 5))
    1.60514
    """
    if rule == HAMMERSTAD_JENSEN:
        y = 1.4 * ratio2
        return 1 + 2 / np.pi * np.arctan(y), 2 / np.pi / (y + 1 / y)
    if rule == GROISS:
        y = (4 * ratio2) ** -0.8
        bump = np.exp(-np.minimum(y, 700.0))
        return 1 + bump, 0.8 * y * bump
    raise ValueError(f"no roughness rule {rule!r}; there are {', '.join(ROUGHNESS_RULES)}")
