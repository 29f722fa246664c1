"""Mass and cost of a stack by area, as far as its materials say what they weigh and cost."""

from dataclasses import dataclass

from stackcore.errors import LibraryError
from stackcore.job.records import LayerRecord, MaterialRecord
from stackcore.job.references import ALWAYS_DEFINED
from stackcore.job.resolve import Job
from stackcore.media.library import library_entry


@dataclass(frozen=True, slots=True)
class Sum:
    """A sum over the layers of a stack.

    Parameters
    ----------
    value
        Of what is known, in SI units: kg/m², or money by m².
    unknown
        Names of materials that do not say it, in the order they are met; without any the sum is whole.
    """

    value: float
    unknown: tuple[str, ...] = ()

    @property
    def whole(self) -> bool:
        """Whether every layer is in it."""
        return not self.unknown


def density_of(material: MaterialRecord) -> float | None:
    """Return the density of a material in kg/m³, from the job or else the library; None where none is given."""
    if material.density is not None:
        return material.density.value
    if not material.library or (material.model and material.constants):
        return None
    try:
        known = library_entry(material.library).density
    except LibraryError:
        return None
    return known.value if known is not None else None


def mass_per_area(job: Job, stack: int) -> Sum:
    """Return the mass of a stack in kg/m²; repeats of groups count, sheets and air weigh nothing.

    Examples
    --------
    >>> from stackcore.job.codec import job_from_json
    >>> job = Job(job_from_json('''{"format": "slabwright-job", "version": 1, "title": "Skin",
    ... "materials": {"skin": {"model": "constant", "permittivity": 4, "density": "2000 kg/m3"}},
    ... "stacks": [{"name": "A", "elements": [{"layer": "skin", "thickness": "3 mm"}]}],
    ... "sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}'''))
    >>> mass_per_area(job, 0).value
    6.0
    """
    return _sum(job, stack, priced=False)


def cost_per_area(job: Job, stack: int) -> Sum:
    """Return the cost of a stack by m², in the currency of the prices; likewise."""
    return _sum(job, stack, priced=True)


def _sum(job: Job, stack: int, *, priced: bool) -> Sum:
    total, unknown = 0.0, dict[str, None]()
    elements = job.record.stacks[stack].elements
    for row in job.rows[stack]:
        element = elements[row]
        if not isinstance(element, LayerRecord) or element.material in ALWAYS_DEFINED:
            continue
        material = job.record.material(element.material)
        assert material is not None
        density = density_of(material)
        if density is None or (priced and material.price is None):
            unknown[element.material] = None
            continue
        price = material.price if priced and material.price is not None else 1.0
        total += element.thickness.value * density * price
    return Sum(total, tuple(unknown))
