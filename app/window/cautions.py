"""What a flat-wall calculation does not say, told where it matters: short notes beside the result. No toolkit.

A note never blocks. The tool computes electrical results of flat, infinite walls; structure, health, fire,
approvals and law have their own codes and their own licensed people.
"""

import math
from dataclasses import dataclass
from typing import Final

from app.document.view import ViewState
from app.series.curves import takes_long
from app.series.shown import shown
from app.series.texts import BEYOND_PRACTICAL, PRACTICAL_DECIBELS
from stackcore.job.resolve import Job
from stackcore.propagation.response import Response
from stackcore.quantities import quantity_named

STANDING: Final = "Infinite flat sheets, plane wave; verify by test."
"""Holds for every result and is always shown."""


GRAZING: Final = math.radians(80.0)
"""Angle beyond which a real panel is too short for the footprint of the wave."""


@dataclass(frozen=True, slots=True)
class Caution:
    """A note: `brief` for one line, `full` for the help panel."""

    brief: str
    full: str


MATERIAL_FIGURE: Final = Caution(
    "Material figure: seams and apertures govern the enclosure.",
    "Shielding effectiveness and a metal back describe the sheet, not an enclosure. Seams, slots, vents, doors, "
    "cables and their filters usually decide; a source closer than about a sixth of a wavelength meets the "
    "sheet with other fields than a plane wave. Measure the finished enclosure.",
)
BEYOND: Final = Caution(
    f"{BEYOND_PRACTICAL[0].upper()}{BEYOND_PRACTICAL[1:]}.",
    f"More than {PRACTICAL_DECIBELS:.0f} dB is a number for an unbroken sheet without end. Joints and "
    "penetrations limit what is built, and no test set-up can measure it.",
)
CONDUCTIVE_COAT: Final = Caution(
    "A conductive layer changes static drain and lightning attachment.",
    "A conductive coating over antennas or in lightning zones of a craft may change where lightning attaches and "
    "how static charge drains. That is judged and approved separately.",
)
STEEP: Final = Caution(
    "Near grazing, finite size and curvature govern.",
    "Beyond about 80° a real panel is short against the footprint of the wave: edges, curvature and surface "
    "waves decide.",
)
VALID_RANGE: Final = Caution(
    "Part of the band is outside the stated range of a material.",
    "Outside its stated range a material model is continued, not known. Those parts of the curves are dotted.",
)

ALWAYS: Final = (
    (
        "What is computed",
        (
            "A plane wave on flat layers without end, made of linear, passive, isotropic, homogeneous materials. "
            "Curvature, edges, seams, apertures, roughness, fibres, droplets and near fields are not in it. Verify "
            "by test on the article."
        ),
    ),
    (
        "Aircraft, ships and vehicles",
        (
            "The result is electrical only. Structure, bird strike, hail, lightning protection, static, erosion, "
            "fuel vapour, crash behaviour and airworthiness or type approval are separate. Do not thin, paint or "
            "repair a part on the strength of this result; follow the approved manuals and the responsible "
            "licensed engineers."
        ),
    ),
    (
        "People and fields",
        (
            "No exposure is computed. A wall with low loss does not make its far side safe, and reflections can "
            "raise the field in front. Compare with the exposure limits in force where you are."
        ),
    ),
    (
        "Heat and fire",
        (
            "Absorbed power becomes heat. Foams, absorbers and wet or burnt spots can ignite: check temperature "
            "limits and fire codes. Breakdown at high power depends on pressure, edges and dirt, which are not "
            "computed."
        ),
    ),
    (
        "Shielded rooms",
        (
            "Wall figures say nothing of escape, door entrapment, alarms, ventilation or fire detection. Power "
            "filters leak current: an ungrounded room can kill. Grounding is for a licensed electrician under the "
            "local code."
        ),
    ),
    (
        "Glass",
        (
            "No structural, thermal or safety-glazing claim is made. A coating that absorbs sunlight can break a "
            "pane by heat; windscreens have legal limits of light transmission; transmission of light is no "
            "laser-safety result."
        ),
    ),
    (
        "Materials",
        (
            "Library values are typical, with their source; batches, moisture, temperature and direction of fibre "
            "change them. Use values measured on your own panels. Dust of ferrites, ceramics, fluoropolymers and "
            "carbon fibre is hazardous to machine: follow the safety data sheets."
        ),
    ),
    (
        "Law",
        (
            "Some uses of low-reflection, shielding and radome designs fall under export control. You are "
            "responsible for the law where you are. Local codes and licensed practice come before anything shown "
            "here. Nothing here is a certification."
        ),
    ),
)
"""Heading and text of each caution of the help panel, in order."""


def cautions(job: Job, stack: int, view: ViewState, response: Response | None) -> tuple[Caution, ...]:
    """Return the notes that the present stack and view call for, the weightiest first.

    Parameters
    ----------
    stack
        Index of the stack looked at.
    response
        The newest result, or None before there is one.
    """
    found: list[Caution] = []
    record = job.record.stacks[stack]
    shows_shielding = view.quantity == "shielding_effectiveness_dB"
    if record.back == "metal" or shows_shielding:
        found.append(MATERIAL_FIGURE)
    if response is not None and _deep(response, view.quantity):
        found.append(BEYOND)
    if _outside_range(job, stack):
        found.append(VALID_RANGE)
    if float(job.sweep.angles().max()) > GRAZING:
        found.append(STEEP)
    if _conducts(job, stack) and not found:
        found.append(CONDUCTIVE_COAT)
    return tuple(found)


def _deep(response: Response, quantity: str) -> bool:
    """Whether a loss that is shown is somewhere more than a real wall keeps; what is not worked out yet is not."""
    if not shown(quantity).practical or takes_long(response, quantity):
        return False
    loss = quantity_named(quantity).values(response)
    return bool((loss[loss < float("inf")] > PRACTICAL_DECIBELS).any())


def _outside_range(job: Job, stack: int) -> bool:
    frequency = job.sweep.frequencies()
    ranges = [job.media[name].valid_range for name in _materials(job, stack) if name in job.media]
    return any(limits is not None and not limits.contains(frequency).all() for limits in ranges)


def _conducts(job: Job, stack: int) -> bool:
    materials = [job.record.material(name) for name in _materials(job, stack)]
    return any(material is not None and material.conductivity is not None for material in materials)


def _materials(job: Job, stack: int) -> set[str]:
    """Return the names of the materials the stack uses."""
    record = job.record.stacks[stack]
    layers = {getattr(element, "material", "") for element in record.elements}
    return (layers | {record.front, record.back}) - {""}
