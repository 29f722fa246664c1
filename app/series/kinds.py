"""What kind of thing a material is, for the drawing's tints and hatches and the mark in the table."""

import math
from typing import Final, Literal

import numpy as np

from app.document.library import PERFECT_METAL, pinned
from stackcore.job import Job
from stackcore.job.records import FrequencyGrid

Kind = Literal["dielectric", "foam", "metal", "magnetic", "glass", "liquid", "coating"]

FAMILY_KINDS: Final[dict[str, Kind]] = {
    "cores": "foam",
    "finishes": "coating",
    "laminates": "dielectric",
    "metals": "metal",
    "plastics": "dielectric",
}
"""Library family -> kind, for families of one kind."""

NAME_KINDS: Final[dict[str, Kind]] = {
    "glass": "glass",
    "quartz": "glass",
    "silica": "glass",
    "water": "liquid",
    "seawater": "liquid",
    "oil": "liquid",
    "ethanol": "liquid",
    "foam": "foam",
    "honeycomb": "foam",
    "ferrite": "magnetic",
    "paint": "coating",
    "film": "coating",
}
"""Word in the name of a library entry -> kind, for families of several kinds."""

MODEL_KINDS: Final[dict[str, Kind]] = {
    "drude": "metal",
    "drude-lorentz": "metal",
    "magnetic": "magnetic",
    "magnetic-debye": "magnetic",
    "magnetic-lorentz": "magnetic",
    "sellmeier": "glass",
    "cauchy": "glass",
    "sea-water": "liquid",
    "water-ellison": "liquid",
    "water-liebe": "liquid",
}
"""Model -> kind, for models that stand for one."""

LIGHTEST_SOLID: Final = 1.3
"""ε′ below which there is more gas than matter in a material: foams and honeycombs."""

LEAST_METAL: Final = 1e4
"""S/m; what conducts less reflects like a lossy dielectric at the frequencies of walls."""


def kind_of(job: Job, material_name: str) -> Kind:
    """Return the kind of a material of `job`.

    A library entry is known by its family or its name, everything else by its constants. Air, vacuum and what
    the job does not define count as foam, which is drawn lightest; ``metal`` is metal.

    Examples
    --------
    >>> from app.document.untitled import untitled_job
    >>> kind_of(untitled_job(), "ptfe"), kind_of(untitled_job(), "air")
    ('dielectric', 'foam')
    """
    if material_name == PERFECT_METAL:
        return "metal"
    record = job.record.material(material_name)
    if record is None:
        return "foam"
    if record.library:
        family, _, name = record.library.partition("/")
        words = name.split("-")
        known = FAMILY_KINDS.get(family) or next((NAME_KINDS[word] for word in words if word in NAME_KINDS), None)
        if known is not None:
            return known
    shown = pinned(record)
    if shown.conductivity is not None and shown.model == "conductor":
        return "metal" if shown.conductivity.value >= LEAST_METAL else "dielectric"
    return MODEL_KINDS.get(shown.model) or _kind_of_values(job, material_name)


def _kind_of_values(job: Job, name: str) -> Kind:
    """Return the kind that ε and μ at the middle of the sweep speak for."""
    values = job.media[name].evaluate(np.array([_middle(job)]))
    permittivity, permeability = complex(values.permittivity[0]), complex(values.permeability[0])
    if permeability != 1:
        return "magnetic"
    if permittivity.real < 0:
        return "metal"
    return "foam" if permittivity.real < LIGHTEST_SOLID else "dielectric"


def _middle(job: Job) -> float:
    swept = job.sweep.frequency
    ends = (swept.start, swept.stop) if isinstance(swept, FrequencyGrid) else (swept[0], swept[-1])
    return math.sqrt(ends[0].value * ends[1].value)
