"""The check itself: one list of findings, the same for window and command line."""

import math
from collections.abc import Iterator

import numpy as np
from numpy.typing import ArrayLike

from stackcore.arrays import FloatArray
from stackcore.media.base import AbstractMedium, FrequencyRange
from stackcore.media.health.causality import causality_findings
from stackcore.media.health.findings import Finding, worst_first
from stackcore.media.health.ranges import (
    components,
    condition_findings,
    join_findings,
    passivity_findings,
    range_findings,
)
from stackcore.media.health.suspicions import loss_counted_twice, suspicious_sweep, suspicious_units
from stackcore.media.joined import JoinedMedium
from stackcore.media.mixture import MixtureMedium

_EVERYWHERE = FrequencyRange(0.0, math.inf)


def check_medium(medium: AbstractMedium, frequencies: ArrayLike | None = None) -> tuple[Finding, ...]:
    """Return all that speaks against a medium, or that a user should know of it, the worst first.

    Parameters
    ----------
    medium
        Of any kind; the components of a mixture and the parts of a joined medium are checked too.
    frequencies
        The sweep it is to serve, in Hz; None looks at the medium's own range alone.

    Raises
    ------
    ValueError
        For frequencies that are not finite or not above 0.

    Examples
    --------
    >>> from stackcore.media.conductor import ConductorMedium
    >>> [finding.topic for finding in check_medium(ConductorMedium(1.7e-8))]
    ['units']
    """
    sweep = None if frequencies is None else np.unique(np.ravel(np.asarray(frequencies, dtype=np.float64)))
    if sweep is not None and not (np.isfinite(sweep).all() and (sweep > 0).all()):
        raise ValueError("frequencies must be finite and above 0 Hz")
    if sweep is not None and sweep.size == 0:
        sweep = None
    findings = [] if sweep is None else [*suspicious_sweep(sweep)]
    findings += _findings(medium, sweep, _EVERYWHERE)
    return worst_first(findings)


def _findings(medium: AbstractMedium, sweep: FloatArray | None, span: FrequencyRange | None) -> Iterator[Finding]:
    """Yield the findings of a medium that answers only within `span`."""
    band = _band(medium, sweep, span)
    if band is not None:
        grid = np.geomspace(band.lowest, band.highest, 201) if sweep is None else sweep
        yield from passivity_findings(medium, grid)
    yield from condition_findings(medium)
    if isinstance(medium, JoinedMedium):
        yield from join_findings(medium)
    else:
        yield from range_findings(medium, sweep)
    made_of_others = isinstance(medium, JoinedMedium | MixtureMedium)
    if not made_of_others:
        yield from suspicious_units(medium)
        yield from loss_counted_twice(medium, band)
        yield from causality_findings(medium, band)
    for place, component, share, own in components(medium, sweep):
        if share is not None and share.size == 0:
            continue
        for finding in _findings(component, share, own):
            # The range of a mixture is that of its components, and was told once.
            if not (isinstance(medium, MixtureMedium) and finding.topic == "range"):
                yield finding.within(place)


def _band(medium: AbstractMedium, sweep: FloatArray | None, span: FrequencyRange | None) -> FrequencyRange | None:
    """Return where to look: the sweep, otherwise the medium's range within `span`; None when nothing is known."""
    if sweep is not None:
        return FrequencyRange(float(sweep[0]), float(sweep[-1]))
    own, span = medium.valid_range or _EVERYWHERE, span or _EVERYWHERE
    lowest, highest = max(own.lowest, span.lowest), min(own.highest, span.highest)
    if 0 < lowest <= highest < math.inf:
        return FrequencyRange(lowest, highest)
    return None
