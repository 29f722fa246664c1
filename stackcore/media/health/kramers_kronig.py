"""Do real part and loss belong together? The relation of Kramers and Kronig over a finite band.

    ε′(ω) = ε∞ + (2/π) P∫ x ε″(x)/(x² − ω²) dx

over all frequencies x. Inside the band ε″ is known; outside it is not, but there it is not negative either. So the
best non-negative ε″ outside, continuous with the known one, and the best ε∞ ≥ 1 are looked for. What then remains
between ε′ and its integral cannot be explained by any absorption anywhere: that is the misfit. The other way round
it says little: over a narrow band absorption outside explains almost any slow change.

Source: the relation as in L. D. Landau, E. M. Lifshitz, Electrodynamics of Continuous Media, section 82; least
squares of non-negative tails after C. L. Lawson, R. J. Hanson, Solving Least Squares Problems (1974), chapter 23.
"""

from dataclasses import dataclass
from typing import Final

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import ComplexArray, FloatArray

_TAIL_DECADES: Final = 4
_TAIL_NODES: Final = 30
_FAR: Final = 2.0
"""Widths of a piece from which on its integral is taken by quadrature instead of in closed form."""

_GAUSS_X, _GAUSS_W = np.polynomial.legendre.leggauss(8)


@dataclass(frozen=True, slots=True)
class KramersKronig:
    """How well real part and loss of ε (or μ) agree over a band.

    Parameters
    ----------
    lowest, highest
        The band in Hz.
    misfit
        Root mean square, as a share of |ε|, of what no absorption outside the band explains.
    worst, worst_frequency
        The largest such share, and where it is, in Hz.
    inside, below, above
        How much the absorption inside the band, and the one supposed below and above it, change ε′ over the band.
    """

    lowest: float
    highest: float
    misfit: float
    worst: float
    worst_frequency: float
    inside: float
    below: float
    above: float


def kramers_kronig(
    frequency: FloatArray, values: ComplexArray, tested: NDArray[np.intp] | None = None
) -> KramersKronig:
    """Compare the real part of ε (or μ) with the integral over its loss.

    Parameters
    ----------
    frequency
        Hz, rising, dense enough that the loss is straight between neighbours.
    values
        ε′ − jε″ there.
    tested
        Places in `frequency` where ε′ is known and compared; all of them when None.

    Examples
    --------
    >>> from stackcore.media.debye import DebyeMedium
    >>> f = np.geomspace(1e9, 1e11, 200)
    >>> water = DebyeMedium(5.0, 75.0, 8e-12).evaluate(f).permittivity
    >>> bool(kramers_kronig(f, water).misfit < 1e-3 < kramers_kronig(f, water.real + 0j).misfit)
    True
    """
    tested = np.arange(frequency.size) if tested is None else tested
    first_step = float(np.log(frequency[1] / frequency[0])), float(np.log(frequency[-1] / frequency[-2]))
    below = frequency[0] * np.exp(-_tail(first_step[0]))[::-1]
    above = frequency[-1] * np.exp(_tail(first_step[1]))
    # In units of the middle of the band, which keeps every square in range.
    nodes = np.concatenate((below, frequency, above)) / np.sqrt(frequency[0] * frequency[-1])
    responses = 2 / np.pi * _hat_responses(nodes, nodes[below.size :][tested])
    low, band, high = np.split(responses, (below.size, below.size + frequency.size), axis=1)
    inside = band @ (0.0 - values.imag)
    weight = 1 / np.abs(values[tested])
    wanted = (values.real[tested] - 1 - inside) * weight
    columns = np.hstack((low, high, np.ones((tested.size, 1)))) * weight[:, None]
    amounts, left = _non_negative(columns, wanted)
    from_below, from_above = low @ amounts[: below.size], high @ amounts[below.size : -1]
    place = int(np.argmax(np.abs(left)))
    return KramersKronig(
        float(frequency[0]),
        float(frequency[-1]),
        float(np.sqrt(np.mean(left**2))),
        float(np.abs(left[place])),
        float(frequency[tested[place]]),
        float(np.ptp(inside)),
        float(np.ptp(from_below)),
        float(np.ptp(from_above)),
    )


def _tail(first_step: float) -> FloatArray:
    """Return ln of the ratio to the edge of the band for the nodes of a tail, dense near the edge."""
    whole = _TAIL_DECADES * np.log(10)
    return np.asarray(np.geomspace(min(first_step, whole / _TAIL_NODES), whole, _TAIL_NODES))


def _non_negative(columns: FloatArray, wanted: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Return the non-negative amounts of `columns` that come nearest to `wanted`, and what is left of it."""
    from scipy.optimize import nnls  # here, since importing it takes longer than everything else of the package

    size = np.linalg.norm(columns, axis=0)
    size = np.where(size > 0, size, 1.0)
    scale = max(float(np.abs(wanted).max()), 1e-300)
    amounts = nnls(columns / size, wanted / scale, maxiter=30 * columns.shape[1])[0] * scale / size
    return amounts, wanted - columns @ amounts


def _hat_responses(nodes: FloatArray, at: FloatArray) -> FloatArray:
    """Return P∫ x h(x)/(x² − ω²) dx at each ω of `at` for the hat h of each node: 1 there, 0 at its neighbours.

    The neighbours of the first and the last node are 0 and twice the last.
    """
    ends = np.concatenate(([0.0], nodes, [2 * nodes[-1]]))
    left, right = ends[:-1], ends[1:]
    width, omega = right - left, at[:, None]
    falling, rising = _closed(left, right, width, omega)
    distance = np.maximum(np.maximum(left - omega, omega - right), 0.0)
    far = distance > _FAR * width
    middle, half = (left + right) / 2, width / 2
    for place, weight in zip(_GAUSS_X, _GAUSS_W, strict=True):
        x = middle + half * place
        square = np.where(far, x * x - omega * omega, 1.0)
        kernel = np.where(far, half * weight * x / square, 0.0)
        falling += kernel * (1 - place) / 2
        rising += kernel * (1 + place) / 2
    # A node is the right end of one piece and the left end of the next.
    responses: FloatArray = rising[:, :-1] + falling[:, 1:]
    return responses


def _closed(
    left: FloatArray, right: FloatArray, width: FloatArray, omega: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Return the integrals of (right − x)/width and (x − left)/width in closed form near ω, 0 far from it.

    x(a + bx)/(x² − ω²) = b + ½(a + bω)/(x − ω) + ½(a − bω)/(x + ω). At an end that is ω itself the logarithms of
    the two pieces that meet there cancel, since a hat is continuous, and each is taken as 0.
    """
    near = np.maximum(np.maximum(left - omega, omega - right), 0.0) <= _FAR * width
    plus = np.log((right + omega) / (left + omega))

    def logarithm(end: FloatArray) -> FloatArray:
        gap = np.abs(end - omega)
        return np.where(gap > 0, np.log(np.where(gap > 0, gap, 1.0)), 0.0)

    minus = logarithm(right) - logarithm(left)
    falling = -1 + ((right - omega) * minus + (right + omega) * plus) / (2 * width)
    rising = 1 + ((omega - left) * minus - (left + omega) * plus) / (2 * width)
    return np.where(near, falling, 0.0), np.where(near, rising, 0.0)
