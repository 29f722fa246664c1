"""Passivity over the sweep, the sweep against the range of the medium, conditions against those of the source."""

from collections.abc import Iterator

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.media.base import AbstractMedium, FrequencyRange
from stackcore.media.health.findings import Finding
from stackcore.media.health.words import hertz, percent, span
from stackcore.media.ice import IceMedium
from stackcore.media.joined import JoinedMedium
from stackcore.media.mixture import MixtureMedium
from stackcore.media.sea_water import SeaWaterMedium
from stackcore.media.tabulated import TabulatedMedium
from stackcore.media.water import EllisonWaterMedium, LiebeWaterMedium

_LARGE_STEP = 0.05


def passivity_findings(medium: AbstractMedium, frequencies: FloatArray) -> Iterator[Finding]:
    """Yield gain and values that are not finite, at `frequencies` in Hz."""
    values = medium.evaluate(frequencies)
    for name, column in (("permittivity", values.permittivity), ("permeability", values.permeability)):
        for wrong, told, hint in (
            (~np.isfinite(column), "is not finite", "look for a constant that is far too large or too small"),
            (
                column.imag > 1e-12 * np.abs(column),
                "has gain",
                "a passive material loses power: see the signs of its loss",
            ),
        ):
            if wrong.any():
                first = hertz(float(frequencies[wrong][0]))
                many = f" and at {int(wrong.sum()) - 1} more frequencies" if wrong.sum() > 1 else ""
                yield Finding("error", "passivity", name, f"the {name} {told} at {first}{many}", hint)


def range_findings(medium: AbstractMedium, frequencies: FloatArray | None) -> Iterator[Finding]:
    """Yield what part of the sweep lies where the medium is not known to hold."""
    known = medium.valid_range
    if known is None:
        return
    if known.lowest > known.highest:
        yield Finding(
            "warning",
            "range",
            "valid_range",
            "the components are known in ranges that have no frequency in common",
            "look for data of the components in one band",
        )
        return
    if frequencies is None:
        return
    outside = ~known.contains(frequencies)
    if not outside.any():
        return
    sides = (frequencies[frequencies < known.lowest], frequencies[frequencies > known.highest])
    left = " and ".join(span(FrequencyRange(float(side.min()), float(side.max()))) for side in sides if side.size)
    there = "; there the values of its ends are held" if isinstance(medium, TabulatedMedium) else ""
    yield Finding(
        "warning",
        "range",
        "valid_range",
        f"{percent(float(outside.mean()))} of the sweep ({left}) lies outside {span(known)}, where the values "
        f"hold{there}",
        "narrow the sweep, or look for data beyond; results outside are extrapolated",
    )


def condition_findings(medium: AbstractMedium) -> Iterator[Finding]:
    """Yield temperatures and salinities outside those of the source."""
    if not isinstance(medium, LiebeWaterMedium | EllisonWaterMedium | SeaWaterMedium | IceMedium):
        return
    for condition in medium.condition_ranges:
        if not condition.held:
            yield Finding(
                "warning",
                "condition",
                condition.name,
                f"a {condition.name} of {condition.given:g} {condition.unit} lies outside {condition.lowest:g} "
                f"{condition.unit} to {condition.highest:g} {condition.unit}, where the source's fit holds",
                "the values are extrapolated",
            )


def join_findings(medium: JoinedMedium) -> Iterator[Finding]:
    """Yield the step at each join, and gaps where no part holds."""
    for place, step in enumerate(medium.steps()):
        size = max(step.permittivity_step, step.permeability_step)
        symbol = "ε" if step.permittivity_step >= step.permeability_step else "μ"
        if size > 0:
            yield Finding(
                "warning" if size > _LARGE_STEP else "note",
                "join",
                f"joins[{place}]",
                f"{symbol} jumps by {percent(size)} at {hertz(step.frequency)}",
                "move the join to where the parts agree; curves and pulses across it show the jump",
            )
    for gap in medium.gaps:
        yield Finding(
            "note",
            "range",
            "valid_range",
            f"from {span(gap)} no part is known to hold",
            "look for data between the parts",
        )


def components(
    medium: AbstractMedium, frequencies: FloatArray | None
) -> Iterator[tuple[str, AbstractMedium, FloatArray | None, FrequencyRange | None]]:
    """Yield place and medium of each component, with the part of the sweep and the span it answers for."""
    if isinstance(medium, MixtureMedium):
        yield "host", medium.host, frequencies, medium.valid_range
        for place, inclusion in enumerate(medium.inclusions):
            yield f"inclusions[{place}].medium", inclusion.medium, frequencies, medium.valid_range
    elif isinstance(medium, JoinedMedium):
        which = None if frequencies is None else medium.part_at(frequencies)
        for number, (part, own) in enumerate(zip(medium.parts, medium.spans, strict=True)):
            share = None if frequencies is None or which is None else frequencies[which == number]
            yield f"parts[{number}]", part, share, own
