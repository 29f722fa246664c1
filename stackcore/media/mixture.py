"""Mixtures of other media."""

import math
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, replace

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.errors import Fault, InputError, nearest
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.mixing_rules import RULES, Mixed
from stackcore.media.parts import complex_of, everywhere, never_zero


@dataclass(frozen=True, slots=True)
class Inclusion:
    """One component of a mixture and its share of the volume, from 0 to 1."""

    medium: AbstractMedium
    fraction: float


@dataclass(frozen=True, slots=True)
class MixtureMedium(AbstractMedium):
    """A medium of two or more components by a mixing rule, for ε and for μ alike.

    Parameters
    ----------
    host
        The component that takes the volume the others leave. Maxwell Garnett's rule holds it for the connected one;
        to the other rules it is a component like any other.
    inclusions
        The other components, at least one; their fractions add up to 1 at most.
    rule
        A name of `stackcore.media.mixing_rules.RULES`.
    valid_range
        The intersection of the components' ranges when None.
    provenance
        See `stackcore.media.base`.

    Raises
    ------
    InputError
        With a fault for every fraction out of range, an unknown rule, or no inclusion.

    Notes
    -----
    Every rule assumes grains, bubbles or layers much thinner than the wavelength inside them, and no current
    between grains but what the rule says. `series` and `parallel` are layers crossed by the field and along it; a
    wave at normal incidence on thin layers has both of its fields along them. A mixture of components whose ranges
    have no frequency in common has a valid range that holds none: its lowest is above its highest.

    Examples
    --------
    >>> from stackcore.media.constant import VACUUM, ConstantMedium
    >>> foam = MixtureMedium(VACUUM, (Inclusion(ConstantMedium(3.78), 0.5),), "looyenga")
    >>> complex(np.round(foam.evaluate(np.array(1e10)).permittivity, 5))
    (2.09162+0j)
    """

    host: AbstractMedium
    inclusions: tuple[Inclusion, ...]
    rule: str = "maxwell-garnett"
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        if faults := tuple(_faults(self.inclusions, self.rule)):
            raise InputError(faults)
        if self.valid_range is None:
            object.__setattr__(self, "valid_range", common_range(self.media))

    @property
    def media(self) -> tuple[AbstractMedium, ...]:
        """The components, the host first."""
        return (self.host, *(inclusion.medium for inclusion in self.inclusions))

    @property
    def fractions(self) -> tuple[float, ...]:
        """The shares of the volume, the host's first."""
        shares = tuple(inclusion.fraction for inclusion in self.inclusions)
        return (max(0.0, 1 - math.fsum(shares)), *shares)

    @property
    def dispersive(self) -> bool:
        return any(medium.dispersive for medium in self.media)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        parts = [medium.evaluate(frequency) for medium in self.media]
        electric = RULES[self.rule]([part.permittivity for part in parts], self.fractions)
        epsilon = _passive(electric.value)
        epsilon_slope = _chain(electric.by_component, [part.permittivity_slope for part in parts])
        if not _magnetic(parts):
            one = np.ones_like(epsilon)
            return Constitutive(epsilon, one, epsilon_slope, np.zeros_like(one))
        magnetic = RULES[self.rule]([part.permeability for part in parts], self.fractions)
        mu_slope = _chain(magnetic.by_component, [part.permeability_slope for part in parts])
        return Constitutive(epsilon, _passive(magnetic.value), epsilon_slope, mu_slope)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        frequency = np.asarray(frequency, dtype=np.float64)
        parts = [medium.evaluate(frequency) for medium in self.media]
        electric = RULES[self.rule]([part.permittivity for part in parts], self.fractions)
        magnetic = _unmixed(frequency, self.fractions)
        if _magnetic(parts):
            magnetic = RULES[self.rule]([part.permeability for part in parts], self.fractions)
        slopes: dict[str, ConstantSlope] = {}
        for place, medium in enumerate(self.media):
            name = "host" if place == 0 else f"inclusions[{place - 1}].medium"
            if place:
                by_fraction = electric.by_fraction[place - 1], magnetic.by_fraction[place - 1]
                slopes[f"inclusions[{place - 1}].fraction"] = ConstantSlope(*map(np.asarray, by_fraction))
            for constant, slope in medium.constant_slopes(frequency).items():
                slopes[f"{name}.{constant}"] = ConstantSlope(
                    np.asarray(electric.by_component[place] * slope.permittivity),
                    np.asarray(magnetic.by_component[place] * slope.permeability),
                )
        return slopes

    def with_fraction(self, inclusion: int, fraction: float) -> "MixtureMedium":
        """Return the mixture with another fraction of one inclusion; the host gives way."""
        changed = list(self.inclusions)
        changed[inclusion] = replace(changed[inclusion], fraction=fraction)
        return replace(self, inclusions=tuple(changed))


def common_range(media: tuple[AbstractMedium, ...]) -> FrequencyRange | None:
    """Return the range in which all media hold, None when none has a limit; empty as `MixtureMedium` says.

    Examples
    --------
    >>> from stackcore.media.constant import VACUUM, ConstantMedium
    >>> common_range((VACUUM, ConstantMedium(3.0, valid_range=FrequencyRange(1e9, 2e9))))
    FrequencyRange(lowest=1000000000.0, highest=2000000000.0)
    """
    ranges = [medium.valid_range for medium in media if medium.valid_range is not None]
    if not ranges:
        return None
    return FrequencyRange(max(each.lowest for each in ranges), min(each.highest for each in ranges))


def _faults(inclusions: tuple[Inclusion, ...], rule: str) -> Iterator[Fault]:
    if rule not in RULES:
        yield Fault("rule", f"unknown mixing rule {rule!r}{nearest(rule, RULES)}", ", ".join(RULES))
    if not inclusions:
        yield Fault("inclusions", "a mixture without inclusions", "one inclusion or more beside the host")
    for place, inclusion in enumerate(inclusions):
        if not 0 <= inclusion.fraction <= 1:
            told = f"{inclusion.fraction:g} is no share of the volume"
            yield Fault(f"inclusions[{place}].fraction", told, "a number from 0 to 1; for example 0.3 for 30 %")
    total = math.fsum(inclusion.fraction for inclusion in inclusions)
    if total > 1 + 1e-12:
        yield Fault("inclusions", f"the fractions add up to {total:g}", "1 at most; the host takes what they leave")


def _magnetic(parts: list[Constitutive]) -> bool:
    return not all(bool((part.permeability == 1).all()) for part in parts)


def _unmixed(frequency: FloatArray, fractions: tuple[float, ...]) -> Mixed:
    """Return μ where no component is magnetic: 1, whatever the rule; the derivatives are those of a small μ − 1."""
    one, zero = everywhere(1.0, frequency), everywhere(0.0, frequency)
    return Mixed(one, tuple(share * one for share in fractions), (zero,) * len(fractions[1:]))


def _chain(outer: tuple[ComplexArray, ...], inner: list[ComplexArray]) -> ComplexArray:
    total = np.zeros_like(inner[0])
    for by_component, slope in zip(outer, inner, strict=True):
        total += by_component * slope
    return total


def _passive(value: ComplexArray) -> ComplexArray:
    """Return `value` without the last digits of gain that rounding may leave on a lossless mixture."""
    return never_zero(complex_of(value.real, np.minimum(value.imag, 0.0)))
