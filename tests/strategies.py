"""What Hypothesis draws from: media, sheets, stacks, frequencies and angles. The one such file of the tests.

A `Case` is one plane wave on one stack, the unit that most properties speak of. Thicknesses are drawn in
vacuum wavelengths, so that every frequency meets electrically thin and thick walls alike.
"""

from dataclasses import dataclass, replace

import numpy as np
from hypothesis import strategies as st

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.propagation import Response, solve
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Element, Layer, PerfectConductor, SheetPlacement, Stack

TE, TM = 0, 1


@dataclass(frozen=True, slots=True)
class Case:
    """A stack met by a plane wave of `frequency` in Hz at `angle` in rad."""

    stack: Stack
    frequency: float
    angle: float

    def solve(self) -> Response:
        """Return the response; every floating-point fault but a silent underflow is an error."""
        with np.errstate(all="raise", under="ignore"):
            return solve(self.stack, frequency=self.frequency, angle=self.angle)

    def with_elements(self, elements: tuple[Element, ...]) -> "Case":
        """Return the same wave on another set of elements."""
        return replace(self, stack=replace(self.stack, elements=elements))

    @property
    def wavelength(self) -> float:
        """The vacuum wavelength in m."""
        return SPEED_OF_LIGHT / self.frequency


def decades(lowest: float, highest: float) -> st.SearchStrategy[float]:
    """Return numbers spread evenly over the decades from `lowest` to `highest`."""
    exponent = st.floats(float(np.log10(lowest)), float(np.log10(highest)))
    return exponent.map(lambda x: float(np.clip(10.0**x, lowest, highest)))


def frequencies(lowest: float = 1.0, highest: float = 1e15) -> st.SearchStrategy[float]:
    """Return frequencies in Hz."""
    return decades(lowest, highest)


def angles(highest_deg: float = 89.9) -> st.SearchStrategy[float]:
    """Return angles of incidence in rad, from 0 to `highest_deg` degrees."""
    return st.floats(0.0, highest_deg).map(lambda degrees: float(np.radians(degrees)))


def lossless_media(highest: float = 20.0) -> st.SearchStrategy[ConstantMedium]:
    """Return dielectrics and a few magnetic media without loss."""
    mu = st.one_of(st.just(1.0), decades(0.5, 5.0))
    return st.builds(ConstantMedium, decades(0.5, highest), mu)


def lossy_media(highest: float = 100.0) -> st.SearchStrategy[ConstantMedium]:
    """Return media with dielectric or magnetic loss or both, real parts of ε also negative as in metals."""

    def build(size: float, tangent: float, sign: float, mu: float, mu_tangent: float) -> ConstantMedium:
        return ConstantMedium(size * complex(sign, -tangent), mu * complex(1.0, -mu_tangent))

    sign = st.sampled_from((1.0, 1.0, 1.0, -1.0))
    mu_tangent = st.one_of(st.just(0.0), decades(1e-3, 3.0))
    return st.builds(build, decades(0.5, highest), decades(1e-3, 10.0), sign, decades(1.0, 5.0), mu_tangent)


def conductors() -> st.SearchStrategy[ConductorMedium]:
    """Return conductors from damp soil to silver, some of them magnetic, some with slow carriers."""
    mu = st.one_of(st.just(1.0), decades(1.0, 1000.0))
    slow = st.one_of(st.just(0.0), decades(1e-16, 1e-12))
    return st.builds(ConductorMedium, decades(1e-3, 6.3e7), mu, relaxation_time=slow)


def media() -> st.SearchStrategy[AbstractMedium]:
    """Return any passive medium."""
    return st.one_of(lossless_media(), lossy_media(), conductors())


def resistive_sheets(lowest: float = 1.0, highest: float = 1e5) -> st.SearchStrategy[SheetPlacement]:
    """Return sheets of a resistance in ohm per square."""
    return st.builds(SeriesSheet, decades(lowest, highest)).map(SheetPlacement)


@st.composite
def reactive_sheets(draw: st.DrawFn, frequency: float, *, lossy: bool = False) -> SheetPlacement:
    """Return an inductance or a capacitance whose reactance at `frequency` is 3 ohm to 30 kilohm."""
    omega = 2 * np.pi * frequency
    reactance = draw(decades(3.0, 3e4))
    resistance = draw(decades(1.0, 1e4)) if lossy else 0.0
    if draw(st.booleans()):
        return SheetPlacement(SeriesSheet(resistance, inductance=reactance / omega))
    return SheetPlacement(SeriesSheet(resistance, capacitance=1 / (omega * reactance)))


@st.composite
def elements(
    draw: st.DrawFn, frequency: float, *, lossless: bool = False, sheets: bool = True, most: int = 6, least: int = 1
) -> tuple[Element, ...]:
    """Return layers up to 2 wavelengths of their medium thick, and sheets unless `sheets` is False."""
    wavelength = SPEED_OF_LIGHT / frequency
    found: list[Element] = []
    for _ in range(draw(st.integers(least, most))):
        if sheets and draw(st.integers(0, 3)) == 0:
            resistive = resistive_sheets() if not lossless else reactive_sheets(frequency)
            found.append(draw(st.one_of(resistive, reactive_sheets(frequency, lossy=not lossless))))
            continue
        medium = draw(lossless_media() if lossless else media())
        values = medium.evaluate(np.array(frequency))
        index = max(1.0, abs(complex(values.permittivity * values.permeability)) ** 0.5)
        found.append(Layer(medium, draw(decades(1e-4, 2.0)) * wavelength / index))
    return tuple(found)


@st.composite
def cases(
    draw: st.DrawFn,
    *,
    lossless: bool = False,
    sheets: bool = True,
    fronts: st.SearchStrategy[ConstantMedium] | None = None,
    backs: st.SearchStrategy[AbstractMedium | PerfectConductor] | None = None,
    most: int = 6,
    least: int = 1,
    highest_deg: float = 85.0,
    frequency_range: tuple[float, float] = (1.0, 1e15),
) -> Case:
    """Return a plane wave on a random stack; the half-spaces are vacuum unless strategies are given for them."""
    frequency = draw(frequencies(*frequency_range))
    chosen = draw(elements(frequency, lossless=lossless, sheets=sheets, most=most, least=least))
    front = draw(fronts) if fronts is not None else VACUUM
    back = draw(backs) if backs is not None else VACUUM
    return Case(Stack(chosen, front=front, back=back), frequency, draw(angles(highest_deg)))


def any_back() -> st.SearchStrategy[AbstractMedium | PerfectConductor]:
    """Return vacuum, other lossless and lossy half-spaces, conductors and the perfect conductor."""
    return st.one_of(st.just(VACUUM), st.just(METAL), lossless_media(), lossy_media(), conductors())


def dense_fronts() -> st.SearchStrategy[ConstantMedium]:
    """Return vacuum and lossless half-spaces that are denser than it."""
    return st.one_of(st.just(VACUUM), st.builds(ConstantMedium, decades(1.0, 20.0), decades(1.0, 2.0)))
