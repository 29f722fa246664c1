"""What to look at first when a job is opened: a quantity that says something about it. No toolkit."""

from app.document.view import ViewState
from app.series.kinds import kind_of
from stackcore.job.records import FrequencyGrid, LayerRecord
from stackcore.job.resolve import Job


def first_view(job: Job) -> ViewState:
    """Return the view a job begins with.

    Behind a perfect conductor nothing passes, so reflection is shown; a wall with a metal layer is looked at
    for its shielding; anything else for what passes. The frequency axis follows the sweep's spacing.
    """
    stack = job.record.stacks[0]
    materials = {element.material for element in stack.elements if isinstance(element, LayerRecord)}
    if stack.back == "metal":
        quantity = "return_loss_dB"
    elif any(kind_of(job, material) == "metal" for material in materials):
        quantity = "shielding_effectiveness_dB"
    else:
        quantity = "transmittance"
    frequency = job.sweep.frequency
    log = isinstance(frequency, FrequencyGrid) and frequency.spacing == "log"
    return ViewState(quantity=quantity, log_frequency=log)
