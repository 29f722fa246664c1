"""Values that are possible but more likely a slip: a unit left out, a loss entered twice, two columns swapped."""

from collections.abc import Iterator
from dataclasses import fields, is_dataclass
from typing import Final

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.media.base import AbstractMedium, FrequencyRange
from stackcore.media.conductor import ConductorMedium
from stackcore.media.health.findings import Finding
from stackcore.media.health.words import span
from stackcore.media.tabulated import TabulatedMedium

_LOW: Final = 1e3
"""Hz. Below, a table of permittivities is rarely meant: 8.2 to 12.4 are GHz, 0.4 to 0.8 are µm."""

_HIGH: Final = 1e17
"""Hz. Above lie X rays."""

_BEST_CONDUCTOR: Final = 7e7
"""S/m, a little above silver at room temperature."""

_LEAST_CONDUCTOR: Final = 1e-5
"""S/m. No conductor has less; metals have resistivities of 1e-8 to 1e-6 Ω·m."""

_LONGEST_RELAXATION: Final = 1e-3
"""s. Relaxations that matter to waves take femtoseconds to microseconds."""


def suspicious_units(medium: AbstractMedium) -> Iterator[Finding]:
    """Yield constants and columns whose size points to another unit."""
    if isinstance(medium, TabulatedMedium):
        yield from _suspicious_frequencies("frequency", medium.frequency[0], medium.frequency[-1])
    elif medium.valid_range is not None and np.isfinite(medium.valid_range.highest):
        yield from _suspicious_frequencies("valid_range", medium.valid_range.lowest, medium.valid_range.highest)
    yield from _suspicious_conductivity(medium)
    yield from _suspicious_loss(medium)
    for name, time in _constants_called(medium, "relaxation_time"):
        if time > _LONGEST_RELAXATION:
            yield Finding(
                "warning",
                "units",
                name,
                f"a relaxation time of {time:g} s is far too long for a wave to meet",
                "it may have been meant in ps or ns",
            )


def suspicious_sweep(frequencies: FloatArray) -> Iterator[Finding]:
    """Yield a sweep whose frequencies look as if they were in another unit."""
    yield from _suspicious_frequencies("frequencies", float(frequencies.min()), float(frequencies.max()))


def loss_counted_twice(medium: AbstractMedium, band: FrequencyRange | None) -> Iterator[Finding]:
    """Yield a conductivity that makes just as much loss as the rest of the medium's constants do.

    A measured loss tangent or ε″ holds the conduction already; a conductivity worked out from it and given beside
    it doubles the loss.
    """
    sigma = _constant(medium, "conductivity")
    if band is None or sigma is None or not sigma > 0:
        return
    frequency = np.geomspace(band.lowest, band.highest, 21)
    total = -medium.evaluate(frequency).permittivity.imag
    conducted = -sigma * medium.constant_slopes(frequency)["conductivity"].permittivity.imag
    rest = total - conducted
    if not (rest > 1e-6 * conducted).all():
        return
    ratio = conducted / rest
    everywhere = bool((ratio > 0.8).all() and (ratio < 1.25).all())
    steady = float(np.ptp(rest)) < 1e-6 * float(rest.max())
    if everywhere or (steady and 0.95 < ratio[10] < 1.05):
        where = f"throughout {span(band)}" if everywhere else f"in the middle of {span(band)}"
        yield Finding(
            "warning",
            "loss",
            "conductivity",
            f"the conductivity of {sigma:g} S/m makes as much loss as the other constants do {where}, so the same "
            "loss may have been entered twice",
            "give the loss once: the conductivity, or the loss tangent that was measured with it",
        )


def _suspicious_frequencies(place: str, lowest: float, highest: float) -> Iterator[Finding]:
    if highest < _LOW:
        yield Finding(
            "warning",
            "units",
            place,
            f"{lowest:g} Hz to {highest:g} Hz look like another unit: frequencies in GHz or THz, or wavelengths in "
            "µm",
            f"if GHz was meant, multiply by 1e9 or give the unit, '{highest:g} GHz'",
        )
    elif highest > _HIGH:
        yield Finding(
            "warning",
            "units",
            place,
            f"{highest:g} Hz lies beyond ultraviolet light, where ε and μ of this kind have no meaning",
            "see whether the unit was counted twice",
        )


def _suspicious_conductivity(medium: AbstractMedium) -> Iterator[Finding]:
    sigma = _constant(medium, "conductivity")
    if sigma is None or not sigma > 0:
        return
    if isinstance(medium, ConductorMedium) and sigma < _LEAST_CONDUCTOR:
        yield Finding(
            "warning",
            "units",
            "conductivity",
            f"{sigma:g} S/m is no conductor and looks like a resistivity in Ω·m",
            f"if it is one, the conductivity is {1 / sigma:.4g} S/m",
        )
    elif isinstance(medium, ConductorMedium) and 1 <= sigma <= 100:
        yield Finding(
            "note",
            "units",
            "conductivity",
            f"{sigma:g} S/m is that of sea water or damp carbon, not of a metal",
            f"if a metal is meant, give '{sigma:g} MS/m'",
        )
    elif sigma > _BEST_CONDUCTOR:
        yield Finding(
            "warning",
            "units",
            "conductivity",
            f"{sigma:g} S/m is more than any metal has at room temperature",
            "silver has 63 MS/m, copper 58 MS/m; see whether the unit was S/m, S/cm or MS/m",
        )


def _suspicious_loss(medium: AbstractMedium) -> Iterator[Finding]:
    if isinstance(medium, TabulatedMedium):
        values = np.asarray(medium.permittivity)
        log_frequency = np.log(np.asarray(medium.frequency))
    elif not medium.dispersive:
        values, log_frequency = np.atleast_1d(medium.evaluate(np.array(1e9)).permittivity), np.zeros(1)
    else:
        return
    real, loss = values.real, -values.imag
    if not ((real > 0) & (real <= 20) & (loss > 10 * real)).all():
        return
    fall = np.log(loss[0] / loss[-1]) / (log_frequency[-1] - log_frequency[0]) if values.size > 1 else 0.0
    if fall > 0.5:
        return  # the loss falls nearly as 1/f: a conductor, which may well have a loss tangent above 10
    tangent = float((loss / real).min())
    yield Finding(
        "warning",
        "units",
        "permittivity",
        f"a loss tangent of {tangent:.3g} and more beside an ε′ of {real.min():.3g} belongs to no dielectric",
        f"see whether it was in per cent ({tangent:.3g} % is {tangent / 100:.3g}), or ε″ and ε′ were swapped",
    )


def _constants_called(medium: AbstractMedium, name: str) -> Iterator[tuple[str, float]]:
    """Yield the path and value of each constant of that name, of the medium itself and in its lists of terms."""
    if (own := _constant(medium, name)) is not None:
        yield name, own
    for place, term in enumerate(getattr(medium, "terms", ())):
        if (value := _constant(term, name)) is not None:
            yield f"terms[{place}].{name}", value


def _constant(holder: object, name: str) -> float | None:
    """Return a real constant that `holder` was built from, None when it has no such field."""
    if is_dataclass(holder) and name in {each.name for each in fields(holder)}:
        value = getattr(holder, name)
        return float(value) if isinstance(value, float | int) else None
    return None
