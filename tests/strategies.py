"""What Hypothesis draws from: media, sheets, stacks, frequencies and angles. The one such file of the tests.

A `Case` is one plane wave on one stack, the unit that most properties speak of. Thicknesses are drawn in
vacuum wavelengths, so that every frequency meets electrically thin and thick walls alike.
"""

from dataclasses import dataclass, replace

import numpy as np
from hypothesis import assume
from hypothesis import strategies as st

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.cauchy import CauchyMedium, CauchyTerm
from stackcore.media.cole_cole import ColeColeMedium
from stackcore.media.cole_davidson import ColeDavidsonMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.drude import DrudeMedium
from stackcore.media.drude_lorentz import DrudeLorentzMedium
from stackcore.media.havriliak_negami import HavriliakNegamiMedium
from stackcore.media.lorentz import LorentzMedium
from stackcore.media.lossy_dielectric import LossyDielectricMedium
from stackcore.media.magnetic import MagneticMedium
from stackcore.media.magnetic_debye import MagneticDebyeMedium
from stackcore.media.magnetic_lorentz import MagneticLorentzMedium
from stackcore.media.multi_debye import MultiDebyeMedium, RelaxationTerm
from stackcore.media.multi_lorentz import MultiLorentzMedium
from stackcore.media.plasma import PlasmaMedium
from stackcore.media.power_law import PowerLawMedium
from stackcore.media.resonance import LorentzTerm
from stackcore.media.roughness import ROUGHNESS_RULES
from stackcore.media.sellmeier import SellmeierMedium, SellmeierTerm
from stackcore.media.wideband import WidebandMedium, WidebandStepMedium
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


def usual_or_any(lowest: float, highest: float) -> st.SearchStrategy[float]:
    """Return constants of real matter, from `lowest` to `highest`, and any that a model allows."""
    return st.one_of(decades(lowest, highest), decades(lowest, highest), decades(1e-40, 1e40))


def or_nothing(constants: st.SearchStrategy[float]) -> st.SearchStrategy[float]:
    """Return `constants`, now and then 0."""
    return st.one_of(constants, constants, st.just(0.0))


_HIGH = usual_or_any(0.5, 20.0)
_STEP = or_nothing(usual_or_any(1e-3, 1e3))
_TIME = usual_or_any(1e-15, 1.0)
_SIGMA = or_nothing(usual_or_any(1e-9, 1e8))
_PLACE = usual_or_any(1e3, 1e17)
_WIDTH = usual_or_any(1e3, 1e16)
_RATE = or_nothing(usual_or_any(1e3, 1e17))


def relaxing_media() -> st.SearchStrategy[AbstractMedium]:
    """Return Debye, multi-Debye, Cole-Cole, Cole-Davidson and Havriliak-Negami media."""
    terms = st.lists(st.builds(RelaxationTerm, _STEP, _TIME), min_size=1, max_size=4).map(tuple)
    exponent = st.floats(1e-3, 1.0)

    def broadened(
        high: float, step: float, time: float, a: float, share: float, sigma: float
    ) -> HavriliakNegamiMedium:
        return HavriliakNegamiMedium(high, step, time, a, max(share / a, 1e-3), sigma)

    return st.one_of(
        st.builds(DebyeMedium, _HIGH, _STEP, _TIME, _SIGMA),
        st.builds(MultiDebyeMedium, _HIGH, terms, _SIGMA),
        st.builds(ColeColeMedium, _HIGH, _STEP, _TIME, exponent, _SIGMA),
        st.builds(ColeDavidsonMedium, _HIGH, _STEP, _TIME, exponent, _SIGMA),
        st.builds(broadened, _HIGH, _STEP, _TIME, exponent, exponent, _SIGMA),
    )


@st.composite
def wideband_media(draw: st.DrawFn) -> AbstractMedium:
    """Return wideband logarithmic media, by a point or by the step."""
    lower = draw(usual_or_any(1.0, 1e9))
    upper = lower * draw(decades(1.0 + 1e-9, 1e12))
    assume(lower < upper < 1e40)
    if draw(st.booleans()):
        return WidebandStepMedium(draw(_HIGH), draw(_STEP), lower, upper)
    tangent = draw(or_nothing(decades(1e-6, 1.0)))
    try:
        return WidebandMedium(draw(_HIGH), tangent, draw(usual_or_any(1e3, 1e12)), lower, upper)
    except ValueError:  # so much loss that ε would fall below 0; no other constant drawn here is refused
        assume(False)
        raise


def resonant_media() -> st.SearchStrategy[AbstractMedium]:
    """Return Lorentz, multi-Lorentz, Drude, Drude-Lorentz and plasma media."""
    terms = st.lists(st.builds(LorentzTerm, _STEP, _PLACE, _WIDTH), min_size=1, max_size=4).map(tuple)
    return st.one_of(
        st.builds(LorentzMedium, _HIGH, _STEP, _PLACE, _WIDTH),
        st.builds(MultiLorentzMedium, _HIGH, terms),
        st.builds(DrudeMedium, _HIGH, _PLACE, _RATE),
        st.builds(DrudeLorentzMedium, _HIGH, _PLACE, _RATE, terms),
        st.builds(PlasmaMedium, usual_or_any(1e6, 1e29), _RATE),
    )


def index_media() -> st.SearchStrategy[AbstractMedium]:
    """Return Sellmeier and Cauchy media, most of the frequencies far outside their range."""
    poles = st.builds(SellmeierTerm, _STEP, usual_or_any(1e-8, 1e-3))
    signed = st.builds(lambda size, sign: size * sign, decades(1e-6, 1e6), st.sampled_from((-1, 1)))
    powers = st.builds(CauchyTerm, signed, st.integers(-10, 10).filter(bool))
    return st.one_of(
        st.builds(SellmeierMedium, st.lists(poles, min_size=1, max_size=4).map(tuple), _HIGH, or_nothing(signed)),
        st.builds(
            CauchyMedium,
            signed,
            st.lists(powers, max_size=5).map(tuple),
            or_nothing(decades(1e-9, 10.0)),
            st.booleans(),
        ),
    )


def real_conductors() -> st.SearchStrategy[AbstractMedium]:
    """Return conductors with slow carriers, rough surfaces or both."""
    return st.builds(
        ConductorMedium,
        usual_or_any(1e-3, 6.3e7),
        usual_or_any(1.0, 1e4),
        relaxation_time=or_nothing(_TIME),
        roughness=or_nothing(usual_or_any(1e-9, 1e-4)),
        roughness_rule=st.sampled_from(ROUGHNESS_RULES),
    )


def band_media() -> st.SearchStrategy[AbstractMedium]:
    """Return what is fitted over a band: power laws and lossy dielectrics."""
    power = st.floats(-10.0, 10.0) | st.floats(-1.0, 2.0)
    loss = or_nothing(usual_or_any(1e-6, 10.0))
    return st.one_of(
        st.builds(PowerLawMedium, _HIGH, power, _SIGMA, power),
        st.builds(LossyDielectricMedium, _HIGH, loss, conductivity=_SIGMA),
        st.builds(LossyDielectricMedium, _HIGH, loss_part=loss, conductivity=_SIGMA),
        st.builds(ConstantMedium.with_loss_tangent, decades(0.5, 100.0), or_nothing(decades(1e-6, 10.0))),
    )


def magnetic_media() -> st.SearchStrategy[AbstractMedium]:
    """Return media whose μ relaxes or resonates, alone and with the ε of a relaxing medium."""
    alone = st.one_of(
        st.builds(MagneticDebyeMedium, _HIGH, _STEP, _TIME),
        st.builds(MagneticLorentzMedium, _HIGH, _STEP, _PLACE, _WIDTH),
    )
    return st.one_of(alone, st.builds(MagneticMedium, relaxing_media(), alone))


def model_media() -> st.SearchStrategy[AbstractMedium]:
    """Return media of every model that `media` does not draw, over all constants that they allow."""
    return st.one_of(
        relaxing_media(),
        wideband_media(),
        resonant_media(),
        index_media(),
        real_conductors(),
        band_media(),
        magnetic_media(),
    )
