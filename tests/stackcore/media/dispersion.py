"""How the tests take a medium apart: its constants by name, differences, and the Kramers-Kronig integral."""

import re
from collections.abc import Callable, Sequence
from dataclasses import replace
from typing import Any

import numpy as np
from scipy.integrate import quad

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.base import AbstractMedium
from stackcore.media.constant import ConstantMedium

_STEP = 1e-4
_WIDEST = 160.0


def constant_of(medium: Any, name: str) -> float:
    """Return a constant by the name that `constant_slopes` gives it."""
    head, _, rest = name.partition(".")
    if rest:
        return constant_of(_part(medium, head), rest)
    if name == "loss_tangent" and isinstance(medium, ConstantMedium):
        return -medium.permittivity.imag / medium.permittivity.real
    if name.endswith("_loss"):
        return -complex(getattr(medium, name.removesuffix("_loss"))).imag
    return float(complex(getattr(medium, name) or 0.0).real)


def with_constant(medium: Any, name: str, value: float) -> Any:
    """Return `medium` with one constant replaced, all others held."""
    head, _, rest = name.partition(".")
    if rest:
        place = re.fullmatch(r"(\w+)\[(\d+)\]", head)
        part = with_constant(_part(medium, head), rest, value)
        if place is None:
            return replace(medium, **{head: part})
        items = list(getattr(medium, place[1]))
        items[int(place[2])] = part
        return replace(medium, **{place[1]: tuple(items)})
    if isinstance(medium, ConstantMedium) and medium.loss_as == "tangent" and not name.startswith("permeability"):
        real = value if name == "permittivity" else medium.permittivity.real
        tangent = value if name == "loss_tangent" else constant_of(medium, "loss_tangent")
        return ConstantMedium.with_loss_tangent(real, tangent, medium.permeability)
    if name.endswith("_loss"):
        field = name.removesuffix("_loss")
        return replace(medium, **{field: complex(complex(getattr(medium, field)).real, -value)})
    if isinstance(getattr(medium, name), complex):
        return replace(medium, **{name: complex(value, getattr(medium, name).imag)})
    return replace(medium, **{name: value})


def _part(medium: Any, head: str) -> Any:
    place = re.fullmatch(r"(\w+)\[(\d+)\]", head)
    return getattr(medium, head) if place is None else getattr(medium, place[1])[int(place[2])]


def difference(values: Callable[[float], ComplexArray]) -> ComplexArray:
    """Return dv/d ln x at x = 1 of `values` of a factor x, by a central difference of fourth order."""
    far, near = 2 * _STEP, _STEP
    inner = (values(1 + near) - values(1 - near)) * 8
    outer = values(1 + far) - values(1 - far)
    slope: ComplexArray = (inner - outer) / (12 * _STEP)
    return slope


def assert_same_slope(found: ComplexArray, expected: ComplexArray, size: ComplexArray, about: str) -> None:
    """Assert that slopes per d ln x agree; `size` are the values whose rounding the difference has in it."""
    allowed = 1e-8 * np.abs(found) + 1e-11 * np.abs(size)
    assert (np.abs(found - expected) <= allowed).all(), f"{about}: {found} is not the difference {expected}"


def kramers_kronig(loss: Callable[[float], float], frequency: float, breaks: Sequence[float] = ()) -> float:
    """Return (2/π) ∫ [f′L(f′) − fL(f)]/(f′² − f²) df′ over all f′ > 0, what L(f) makes of the real part.

    The principal value needs no care: P∫ df′/(f′² − f²) is 0, hence the second term. Taken over u = ln(f′/f).
    `breaks` are frequencies where the loss changes quickly.
    """
    here = loss(frequency)

    def integrand(u: float) -> float:
        grown = float(np.exp(u))
        return (grown * loss(frequency * grown) - here) / (2 * float(np.sinh(u)))

    corners = sorted(np.log(f / frequency) for f in breaks)
    total = 0.0
    for start, stop in ((-_WIDEST, 0.0), (0.0, _WIDEST)):
        inside = [float(u) for u in corners if start < u < stop] or [(start + stop) / 2]
        total += quad(integrand, start, stop, points=inside, limit=500, epsabs=1e-11, epsrel=1e-11)[0]
    return 2 / np.pi * total


def loss_of(medium: AbstractMedium, quantity: str, conductivity_loss: float = 0.0) -> Callable[[float], float]:
    """Return ε″ or μ″ of a frequency in Hz, less `conductivity_loss` over the frequency (σ/(2πε₀)).

    What is left of the difference is 0 where only its rounding is left.
    """

    def loss(frequency: float) -> float:
        whole = -float(getattr(medium.evaluate(np.array(frequency)), quantity).imag)
        rest = whole - conductivity_loss / frequency
        return rest if abs(rest) > 1e-14 * whole else 0.0

    return loss


def rounded(values: ComplexArray, digits: int) -> list[complex]:
    """Return values rounded to some digits, to compare with a printed table."""
    return [complex(v) for v in np.round(np.atleast_1d(values), digits)]


def index_of(medium: AbstractMedium, frequency: FloatArray) -> ComplexArray:
    """Return the complex index n − jk at `frequency` in Hz."""
    index: ComplexArray = np.sqrt(medium.evaluate(frequency).permittivity)
    return np.where(index.real < 0, -index, index)
