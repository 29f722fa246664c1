"""What to look at first when a job is opened: a quantity that says something about it. No toolkit."""

from dataclasses import replace
from typing import Final

import numpy as np

from app.document.view import ViewState
from stackcore.errors import SlabwrightError
from stackcore.job.records import FrequencyGrid
from stackcore.job.resolve import Job
from stackcore.media.base import FloatArray
from stackcore.propagation.solve import solve

DEEP: Final = 1e-5
"""Transmittance below which a wall is a shield: 50 dB."""
LOSSY: Final = 0.5
"""Transmittance below which decibels say more than a fraction."""


def first_view(job: Job) -> ViewState:
    """Return the view a job begins with.

    Behind a perfect conductor nothing passes, so reflection is shown; a wall that lets little pass is looked at
    for its loss or its shielding; anything else for what passes. The frequency axis follows the sweep's spacing,
    and one marker stands at a round frequency near the middle.
    """
    frequency = job.sweep.frequency
    log = isinstance(frequency, FrequencyGrid) and frequency.spacing == "log"
    state = ViewState(quantity=_quantity(job), log_frequency=log)
    return replace(state, markers=(_round_middle(state, job),))


def _quantity(job: Job) -> str:
    if job.record.stacks[0].back == "metal":
        return "return_loss_dB"
    most = _most_that_passes(job, np.sort(job.sweep.frequencies()))
    if most < DEEP:
        return "shielding_effectiveness_dB"
    return "insertion_loss_dB" if most < LOSSY else "transmittance"


def _most_that_passes(job: Job, frequencies: FloatArray) -> float:
    """Return the largest transmittance at the ends and the middle of the sweep, at normal incidence."""
    probes = frequencies[[0, len(frequencies) // 2, -1]]
    try:
        return float(solve(job.stacks[0], probes, np.array([0.0])).transmittance.max())
    except SlabwrightError:
        # The calculation of the whole sweep says what is wrong.
        return 1.0


def _round_middle(state: ViewState, job: Job) -> float:
    middle = state.marker_frequency(job.sweep)
    frequencies = job.sweep.frequencies()
    rounded = float(f"{middle:.2g}")
    return rounded if frequencies.min() <= rounded <= frequencies.max() else middle
