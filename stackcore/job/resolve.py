"""Records -> the media and stacks that the solver takes; the one place that knows both."""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from types import MappingProxyType
from typing import Final

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.errors import Fault, JobError, LibraryError
from stackcore.job import checks, limits
from stackcore.job.conditions import record_under, rows_shifted
from stackcore.job.groups import expanded_rows
from stackcore.job.inspector import join, near, one_of
from stackcore.job.materials import library_model, medium_of, references_of
from stackcore.job.records import (
    ElementRecord,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    SheetRecord,
    StackRecord,
    SweepRecord,
)
from stackcore.job.references import building_order
from stackcore.job.states import in_state, states_of
from stackcore.media.base import AbstractMedium
from stackcore.media.constant import VACUUM
from stackcore.media.models import MODELS, Model
from stackcore.sheets.film import FilmSheet
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
    _derived: "_Derived | None" = field(init=False, compare=False, repr=False)

    def __post_init__(self) -> None:
        object.__setattr__(self, "_derived", _derive(self.record))

    @property
    def stacks(self) -> tuple[Stack, ...]:
        """In SI units, each ready for `stackcore.propagation.solve`."""
        return self._resolved().stacks

    @property
    def media(self) -> Mapping[str, AbstractMedium]:
        """Name of the material -> medium, ``air`` and ``vacuum`` included."""
        return self._resolved().media

    @property
    def rows(self) -> tuple[tuple[int, ...], ...]:
        """For each stack the row of the record that each of its elements came from.

        Groups stand there repeated, disabled elements not at all.
        """
        return self._resolved().rows

    def forget(self) -> None:
        """Let go of what the record resolves to, until somebody asks: for a job that is only kept, as by undo."""
        object.__setattr__(self, "_derived", None)

    def _resolved(self) -> "_Derived":
        derived = self._derived
        if derived is None:
            # Two threads may both work it out: they find the same.
            derived = _derive(self.record)
            object.__setattr__(self, "_derived", derived)
        return derived

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

    def under(self, condition: str) -> "Job":
        """Return the job as it is under a condition.

        Raises
        ------
        JobError
            When there is no condition of this name, with the nearest match, or when a stack cannot be computed
            under it.
        """
        known = self._resolved().under
        if condition not in known:
            found = self.record.condition(condition)
            if found is None:
                names = [one.name for one in self.record.conditions]
                allowed = one_of(names) if names else "the job has no conditions"
                raise JobError(
                    [Fault("conditions", f"there is no condition {condition!r}{near(condition, names)}", allowed)]
                )
            # Two threads may both work it out: they find the same.
            known[condition] = Job(record_under(self.record, found))
        return known[condition]

    def stack_under(self, stack: int, condition: str) -> Stack:
        """Return a stack as it is under a condition; raises as `under` does."""
        return self.under(condition).stacks[stack]

    def rows_under(self, stack: int, condition: str) -> tuple[int, ...]:
        """Return the row of each element of `stack_under`, −1 for one that the condition added."""
        found = self.record.condition(condition)
        rows = self.under(condition).rows[stack]
        assert found is not None
        return rows_shifted(rows, found, len(self.record.stacks[stack].elements))

    def medium_in(self, material: str, state: str) -> AbstractMedium:
        """Return the medium of a material in one of its states.

        Raises
        ------
        JobError
            When the job has no such material or the material no such state, with the nearest match.
        """
        record = self.record.material(material)
        names = [one.name for one in states_of(record)] if record is not None else []
        if record is None or state not in names:
            what = f"state {state!r} of {material!r}" if record is not None else f"material {material!r}"
            given, known = (
                (state, names) if record is not None else (material, [one.name for one in self.materials])
            )
            allowed = one_of(known) if known else "it has no states"
            raise JobError([Fault(join("materials", material), f"there is no {what}{near(given, known)}", allowed)])
        return medium_of(in_state(record, state), self.media)


@dataclass(frozen=True, slots=True)
class _Derived:
    """What a record resolves to, and the jobs under its conditions as far as they were asked for."""

    stacks: tuple[Stack, ...]
    media: Mapping[str, AbstractMedium]
    rows: tuple[tuple[int, ...], ...]
    under: dict[str, Job]


def _derive(record: JobRecord) -> _Derived:
    resolution = resolve(record)
    if resolution.faults:
        raise JobError(resolution.faults)
    rows = tuple(expanded_rows(stack) for stack in record.stacks)
    return _Derived(resolution.stacks, MappingProxyType(dict(resolution.media)), rows, {})


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
    for material in building_order(record.materials):
        path = join("materials", material.name)
        if any(fault.path == path or fault.path.startswith((f"{path}.", f"{path}[")) for fault in faults):
            continue
        if any("/" not in used and used not in media for _, used in references_of(material)):
            continue  # what it is made of has a fault of its own
        try:
            media[material.name] = medium_of(material, media)
        except LibraryError as error:
            faults += [Fault(join(path, "library"), fault.message, fault.allowed) for fault in error.faults]
        except ValueError as error:
            faults += _model_of(material).located(error, path)
    swept = not any(fault.path.startswith("sweep") for fault in faults)
    frequencies = record.sweep.frequencies() if swept else np.array([1e10])
    for place, stack in enumerate(record.stacks):
        faults += _front_faults(stack.front, media, frequencies, join(join("stacks", place), "front"))
    if faults:
        return Resolution(media, (), tuple(faults))
    # In the order of the job, whatever the order of building was.
    media = {name: media[name] for name in (*_AIR, *(material.name for material in record.materials))}
    return Resolution(media, tuple(_stack(stack, media) for stack in record.stacks), ())


def _model_of(material: MaterialRecord) -> Model:
    return MODELS[material.model or library_model(material.library)]


def _front_faults(
    name: str, media: Mapping[str, AbstractMedium], frequencies: FloatArray, path: str
) -> Iterator[Fault]:
    """Yield a fault when no wave of the sweep can come from the medium called `name`."""
    medium = media.get(name)
    if medium is None or medium is VACUUM:
        return
    values = medium.evaluate(frequencies if medium.dispersive else frequencies[:1])
    constants = np.stack([values.permittivity, values.permeability])
    if constants.imag.any():
        yield Fault(path, f"the front half-space {name!r} absorbs", "a material without loss, such as 'air'")
    elif not (constants.real > 0).all():
        yield Fault(
            path, f"no wave travels in the front half-space {name!r}", "positive permittivity and permeability"
        )


def _stack(record: StackRecord, media: Mapping[str, AbstractMedium]) -> Stack:
    back: AbstractMedium | PerfectConductor = METAL if record.back == checks.METAL_NAME else media[record.back]
    each = [_element(element, media) if element.enabled else None for element in record.elements]
    expanded = [each[row] for row in expanded_rows(record)]
    elements = tuple(element for element in expanded if element is not None)
    return Stack(elements, media[record.front], back, record.name)


def _element(record: ElementRecord, media: Mapping[str, AbstractMedium]) -> Element:
    if isinstance(record, LayerRecord):
        return Layer(media[record.material], record.thickness.value)
    return SheetPlacement(_film(record) if record.kind == "film" else _series(record))


def _film(record: SheetRecord) -> FilmSheet:
    assert record.conductivity is not None
    assert record.thickness is not None
    return FilmSheet(record.conductivity.value, record.thickness.value)


def _series(record: SheetRecord) -> SeriesSheet:
    resistance, inductance, capacitance = (getattr(record, name) for name in limits.SHEET_PARTS)
    return SeriesSheet(
        resistance.value if resistance is not None else 0.0,
        inductance.value if inductance is not None else 0.0,
        capacitance.value if capacitance is not None else None,
    )
