"""Records -> the media and stacks that the solver takes; the one place that knows both."""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from types import MappingProxyType
from typing import Final

from stackcore.errors import Fault, JobError, LibraryError
from stackcore.job import checks, limits
from stackcore.job.inspector import join
from stackcore.job.materials import medium_of
from stackcore.job.records import (
    ElementRecord,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    SheetRecord,
    StackRecord,
    SweepRecord,
)
from stackcore.media.base import AbstractMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Element, Layer, PerfectConductor, SheetPlacement, Stack

_AIR: Final = dict.fromkeys(checks.ALWAYS_DEFINED, VACUUM)


@dataclass(frozen=True, slots=True)
class Job:
    """A record without faults, and the media and stacks it resolves to. Two jobs with equal records are equal.

    Parameters
    ----------
    record
        What a person writes.

    Raises
    ------
    JobError
        With every fault of the record, each with its path in the file.

    Examples
    --------
    >>> from stackcore.job.codec import job_from_json
    >>> text = '''{"format": "slabwright-job", "version": 1, "title": "Bare wall",
    ... "stacks": [{"name": "A", "elements": [{"layer": "air", "thickness": "2 mm"}]}],
    ... "sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}'''
    >>> Job(job_from_json(text)).stacks[0].thickness
    0.002
    """

    record: JobRecord
    stacks: tuple[Stack, ...] = field(init=False, compare=False, repr=False)
    """In SI units, each ready for `stackcore.propagation.solve`."""
    media: Mapping[str, AbstractMedium] = field(init=False, compare=False, repr=False)
    """Name of the material -> medium, ``air`` and ``vacuum`` included."""

    def __post_init__(self) -> None:
        resolution = resolve(self.record)
        if resolution.faults:
            raise JobError(resolution.faults)
        object.__setattr__(self, "stacks", resolution.stacks)
        object.__setattr__(self, "media", MappingProxyType(dict(resolution.media)))

    def __reduce__(self) -> tuple[type["Job"], tuple[JobRecord]]:
        # What is derived is derived again in the other process.
        return Job, (self.record,)

    @property
    def title(self) -> str:
        """Name of the job for people."""
        return self.record.title

    @property
    def sweep(self) -> SweepRecord:
        """The frequencies and angles to compute."""
        return self.record.sweep

    @property
    def materials(self) -> tuple[MaterialRecord, ...]:
        """The materials as written."""
        return self.record.materials

    def stack(self, name: str) -> Stack | None:
        """Return the stack called `name`, or None."""
        return next((stack for stack in self.stacks if stack.name == name), None)


@dataclass(frozen=True, slots=True)
class Resolution:
    """What a record resolves to: media by name and stacks, or the faults that forbid it.

    Where there are faults, `stacks` is empty and `media` holds those that could be built.
    """

    media: Mapping[str, AbstractMedium]
    stacks: tuple[Stack, ...]
    faults: tuple[Fault, ...]


def resolve(record: JobRecord) -> Resolution:
    """Return the media and stacks of `record`, and all its faults; raises nothing."""
    faults = list(checks.faults_of(record))
    media: dict[str, AbstractMedium] = dict(_AIR)
    for material in record.materials:
        path = join("materials", material.name)
        if any(fault.path == path or fault.path.startswith((f"{path}.", f"{path}[")) for fault in faults):
            continue
        try:
            media[material.name] = medium_of(material)
        except LibraryError as error:
            faults += [Fault(join(path, "library"), fault.message, fault.allowed) for fault in error.faults]
        except ValueError as error:
            faults.append(Fault(path, str(error), "the constants of a passive material"))
    for place, stack in enumerate(record.stacks):
        faults += _front_faults(stack.front, media, join(join("stacks", place), "front"))
    if faults:
        return Resolution(media, (), tuple(faults))
    return Resolution(media, tuple(_stack(stack, media) for stack in record.stacks), ())


def _front_faults(name: str, media: Mapping[str, AbstractMedium], path: str) -> Iterator[Fault]:
    """Yield a fault when no wave can come from the medium called `name`."""
    medium = media.get(name)
    if medium is None or medium is VACUUM:
        return
    allowed = "a material without loss, such as 'air'"
    if not isinstance(medium, ConstantMedium):
        yield Fault(path, f"the front half-space {name!r} absorbs", allowed)
        return
    constants = (complex(medium.permittivity), complex(medium.permeability))
    if any(value.imag for value in constants):
        yield Fault(path, f"the front half-space {name!r} absorbs", allowed)
    elif any(value.real < 0 for value in constants):
        yield Fault(
            path, f"no wave travels in the front half-space {name!r}", "positive permittivity and permeability"
        )


def _stack(record: StackRecord, media: Mapping[str, AbstractMedium]) -> Stack:
    back: AbstractMedium | PerfectConductor = METAL if record.back == checks.METAL_NAME else media[record.back]
    elements = tuple(_element(element, media) for element in record.elements)
    return Stack(elements, media[record.front], back, record.name)


def _element(record: ElementRecord, media: Mapping[str, AbstractMedium]) -> Element:
    if isinstance(record, LayerRecord):
        return Layer(media[record.material], record.thickness.value)
    return SheetPlacement(_series(record))


def _series(record: SheetRecord) -> SeriesSheet:
    resistance, inductance, capacitance = (getattr(record, name) for name in limits.SHEET_PARTS)
    return SeriesSheet(
        resistance.value if resistance is not None else 0.0,
        inductance.value if inductance is not None else 0.0,
        capacitance.value if capacitance is not None else None,
    )
