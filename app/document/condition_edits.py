"""Edits of the conditions of a job: rain, ice, heat, another coat of paint."""

from collections.abc import Callable
from dataclasses import dataclass, replace
from typing import Final

from app.document.construction_edits import with_elements
from app.document.document import Document
from app.document.edit import Edit, refuse, with_record
from app.document.library import free_name, with_material
from stackcore.errors import nearest
from stackcore.job.records import ConditionRecord, ElementRecord, JobRecord, LayerRecord
from stackcore.job.states import states_of
from stackcore.units import Dimension, parse_measure


@dataclass(frozen=True, slots=True)
class Preset:
    """A usual condition: what it adds in front, the states it asks for, and what it multiplies.

    Parameters
    ----------
    name, note
        As of the condition.
    film
        Library key and thickness of a layer in front, or None.
    states
        Those that materials may have.
    paint
        Factor of the thickness of every material of the family of finishes, 1 for none.
    """

    name: str
    note: str
    film: tuple[str, str] | None = None
    states: tuple[str, ...] = ()
    paint: float = 1.0


PRESETS: Final = (
    Preset(
        "Wet",
        "A film of rain 0.1 mm thick on the front, and materials wet where a state says how.",
        ("water/water-20c", "0.1 mm"),
        ("wet",),
    ),
    Preset("Ice", "A layer of clear ice 2 mm thick on the front.", ("water/ice-minus-10c", "2 mm")),
    Preset("Repaint", "Every finish twice as thick.", paint=2.0),
    Preset("Hot", "Materials hot where a state says how.", states=("hot", "120 °C", "80 °C")),
)
"""What the menu offers; common practice, to be changed to what the job asks for."""


def add_condition(preset: Preset) -> Edit:
    """Return the edit that adds a usual condition; its materials come from the library.

    States that no material of the job has are left out; what would then change nothing is refused with the reason.
    """

    def change(document: Document) -> Document:
        record = document.record
        front: tuple[ElementRecord, ...] = ()
        if preset.film is not None:
            key, thickness = preset.film
            layer = LayerRecord(key, parse_measure(thickness, Dimension.LENGTH))
            record, front = with_elements(record, (layer,))
        known = {state.name for material in record.materials for state in states_of(material)}
        states = tuple(state for state in preset.states if state in known)
        factors = tuple((name, preset.paint) for name in _finishes(record)) if preset.paint != 1 else ()
        if not (front or states or factors):
            what = "no material of the job has a state for it" if preset.states else "the job has no finish"
            allowed = "give a material a state, or take a finish from the library"
            raise refuse("conditions", f"{preset.name} would change nothing: {what}", allowed)
        name = free_name(preset.name, [one.name for one in record.conditions])
        condition = ConditionRecord(name, front=front, states=states, thickness_factors=factors, note=preset.note)
        return with_record(document, replace(record, conditions=(*record.conditions, condition)))

    return Edit(f"add condition {preset.name}", change)


def new_condition() -> Edit:
    """Return the edit that adds a condition that changes nothing yet."""

    def change(document: Document) -> Document:
        record = document.record
        name = free_name("Condition", [one.name for one in record.conditions])
        return with_record(document, replace(record, conditions=(*record.conditions, ConditionRecord(name))))

    return Edit("add condition", change)


def change_condition(name: str, change: Callable[[ConditionRecord], ConditionRecord]) -> Edit:
    """Return the edit that puts ``change(condition)`` in the place of the condition called `name`.

    What the new one calls its materials may be names, labels, or keys of the library, whose entries are then added
    to the job. A material that comes twice where it may come once is refused.
    """

    def whole(document: Document) -> Document:
        place = _place(document.record, name)
        condition = change(document.record.conditions[place])
        record, front = with_elements(document.record, condition.front)
        record, back = with_elements(record, condition.back)
        exchanged = []
        for one, other in condition.materials:
            record, known = with_material(record, one)
            record, taken = with_material(record, other)
            exchanged.append((known, taken))
        factors = []
        for one, factor in condition.thickness_factors:
            record, known = with_material(record, one)
            factors.append((known, factor))
        for pairs in (exchanged, factors):
            names = [one for one, _ in pairs]
            twice = next((one for one in names if names.count(one) > 1), None)
            if twice is not None:
                raise refuse(f"conditions[{place}]", f"{twice} comes twice", "each material once")
        new = replace(
            condition, front=front, back=back, materials=tuple(exchanged), thickness_factors=tuple(factors)
        )
        conditions = (*record.conditions[:place], new, *record.conditions[place + 1 :])
        return with_record(document, replace(record, conditions=conditions))

    return Edit(f"change condition {name}", whole)


def rename_condition(name: str, new_name: str) -> Edit:
    """Return the edit that renames a condition."""
    new_name = new_name.strip()

    def change(document: Document) -> Document:
        place = _place(document.record, name)
        conditions = list(document.record.conditions)
        conditions[place] = replace(conditions[place], name=new_name)
        return with_record(document, replace(document.record, conditions=tuple(conditions)))

    return Edit(f"rename condition {name} to {new_name}", change)


def remove_condition(name: str) -> Edit:
    """Return the edit that removes a condition; no stack changes by it."""

    def change(document: Document) -> Document:
        place = _place(document.record, name)
        old = document.record.conditions
        return with_record(document, replace(document.record, conditions=(*old[:place], *old[place + 1 :])))

    return Edit(f"remove condition {name}", change)


def _place(record: JobRecord, name: str) -> int:
    names = [condition.name for condition in record.conditions]
    if name not in names:
        allowed = f"one of {', '.join(names)}" if names else "the job has no conditions"
        raise refuse("conditions", f"there is no condition {name!r}{nearest(name, names)}", allowed)
    return names.index(name)


def _finishes(record: JobRecord) -> list[str]:
    """Return the materials that are paints and coats: those taken from the library's finishes."""
    return [one.name for one in record.materials if one.library.partition("/")[0] == "finishes"]
