"""A job with one of its numbers changed: the whole job, or quickly just the one stack that is solved."""

from collections.abc import Iterator, Mapping
from dataclasses import replace
from typing import Any

from stackcore.arrays import FloatArray
from stackcore.errors import Fault, JobError
from stackcore.job import Job
from stackcore.job.inspector import join
from stackcore.job.limits import limit_faults
from stackcore.job.materials import medium_of, references_of, with_library_values
from stackcore.job.records import ElementRecord, JobRecord, LayerRecord, MaterialRecord
from stackcore.job.references import building_order
from stackcore.media.base import AbstractMedium
from stackcore.media.models import MODELS, Constants, Kind, Quantity, Relative, Terms, Value
from stackcore.sheets.film import FilmSheet
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import Element, Layer, PerfectConductor, SheetPlacement, Stack
from stackcore.studies.variation import ElementPart, MaterialPart, Variation, places_of
from stackcore.units import format_value, measure


def varied_stack(job: Job, variation: Variation, value: float) -> Stack:
    """Return the stack of `variation` with `value` (SI) in place of the present one.

    Only what depends on it is made anew; it equals ``varied(job, variation, value).stacks[variation.stack]``.

    Raises
    ------
    JobError
        For a value that is not allowed, or with which a material is not passive.
    """
    _refuse(variation, value)
    stack, part = job.stacks[variation.stack], variation.part
    if isinstance(part, MaterialPart):
        return _with_media(job, variation.stack, _varied_media(job, part, value))
    elements = list(stack.elements)
    for place in places_of(job, variation.stack, part.row):
        elements[place] = _varied_element(elements[place], part.name, value, variation)
    return replace(stack, elements=tuple(elements))


def varied(job: Job, variation: Variation, value: float) -> Job:
    """Return the job with `value` (SI) in place of the present one, everything checked and resolved again.

    A thickness counted in plies becomes a length. Values of a library material stand in the job afterwards.

    Raises
    ------
    JobError
        With every fault that the value makes.
    """
    _refuse(variation, value)
    record, part = job.record, variation.part
    if isinstance(part, MaterialPart):
        materials = tuple(
            _varied_material(one, part, value) if one.name == part.material else one for one in record.materials
        )
        return Job(replace(record, materials=materials))
    return Job(_with_element(record, variation, part, value))


def check_values(variation: Variation, values: FloatArray) -> None:
    """Raise `JobError` when one of `values` (SI) lies outside what is allowed, at the place of the variation."""
    faults = [fault for value in values.tolist() for fault in _outside(variation, value)]
    if faults:
        raise JobError(faults[:1])


def _refuse(variation: Variation, value: float) -> None:
    faults = tuple(_outside(variation, value))
    if faults:
        raise JobError(faults)


def _outside(variation: Variation, value: float) -> Iterator[Fault]:
    if not variation.limits.contains(value):
        text = format_value(value, variation.dimension, digits=6)
        yield from limit_faults(value, text, variation.limits, variation.path)


def _with_element(record: JobRecord, variation: Variation, part: ElementPart, value: float) -> JobRecord:
    stacks = list(record.stacks)
    elements: list[ElementRecord] = list(stacks[variation.stack].elements)
    given: dict[str, Any] = {part.name: measure(value, variation.dimension)}
    elements[part.row] = replace(elements[part.row], **given)
    stacks[variation.stack] = replace(stacks[variation.stack], elements=tuple(elements))
    return replace(record, stacks=tuple(stacks))


def _varied_element(element: Element, name: str, value: float, variation: Variation) -> Element:
    if isinstance(element, Layer):
        return Layer(element.medium, value)
    sheet = element.sheet
    assert isinstance(sheet, SeriesSheet | FilmSheet)
    try:
        changed: dict[str, Any] = {name: value}
        return SheetPlacement(replace(sheet, **changed))
    except ValueError as error:  # nothing is left in the sheet
        raise JobError([Fault(variation.path, str(error), "a value other than 0")]) from error


def _varied_material(material: MaterialRecord, part: MaterialPart, value: float) -> MaterialRecord:
    """Return a material with one number changed; the library's range and source hold for its own values only."""
    whole = with_library_values(material)
    constant = MODELS[whole.model].constant(part.constant)
    assert constant is not None
    old = whole.given.get(part.constant)
    make = _scalar if part.term is None else _in_terms
    new = make(constant.kind, old, part, value)
    if material.constants:
        changed = replace(material, constants=material.given.with_value(part.constant, new))
        return with_library_values(changed)
    return with_library_values(replace(material, constants=Constants({part.constant: new})))


def _in_terms(kind: Kind, old: Value | None, part: MaterialPart, value: float) -> Value:
    assert isinstance(kind, Terms)
    assert isinstance(old, tuple)
    assert part.term is not None
    inner = next(one for one in kind.of if one.name == part.inner)
    rows = list(old)
    new = _scalar(inner.kind, rows[part.term].get(part.inner), part, value)
    rows[part.term] = rows[part.term].with_value(part.inner, new)
    return tuple(rows)


def _scalar(kind: Kind, old: Value | None, part: MaterialPart, value: float) -> Value:
    if isinstance(kind, Quantity):
        return measure(value, kind.dimension)
    if isinstance(kind, Relative):
        assert isinstance(old, complex | float | int)
        old = complex(old)
        return complex(old.real, 0.0 - value) if part.loss else complex(value, old.imag)
    return float(value)


def _varied_media(job: Job, part: MaterialPart, value: float) -> Mapping[str, AbstractMedium]:
    """Return the media that change, by name: the material itself and all that are made of it."""
    media = dict(job.media)
    changed: dict[str, AbstractMedium] = {}
    for material in building_order(job.materials):
        if material.name == part.material:
            material = _varied_material(material, part, value)
        elif not any(used in changed for _, used in references_of(material)):
            continue
        changed[material.name] = media[material.name] = _medium(material, media)
    return changed


def _medium(material: MaterialRecord, media: Mapping[str, AbstractMedium]) -> AbstractMedium:
    path = join("materials", material.name)
    model = MODELS[with_library_values(material).model]
    faults = tuple(model.faults(material.given, path)) if material.constants else ()
    if faults:
        raise JobError(faults)
    try:
        return medium_of(material, media)
    except ValueError as error:
        raise JobError(model.located(error, path)) from error


def _with_media(job: Job, stack: int, media: Mapping[str, AbstractMedium]) -> Stack:
    """Return a stack with some media exchanged by name."""
    record, resolved = job.record.stacks[stack], job.stacks[stack]
    elements = list(resolved.elements)
    for row, written in enumerate(record.elements):
        if isinstance(written, LayerRecord) and written.material in media:
            for place in places_of(job, stack, row):
                held = elements[place]
                assert isinstance(held, Layer)
                elements[place] = Layer(media[written.material], held.thickness)
    back = resolved.back if isinstance(resolved.back, PerfectConductor) else media.get(record.back, resolved.back)
    return Stack(tuple(elements), media.get(record.front, resolved.front), back, resolved.name)
