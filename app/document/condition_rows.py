"""A condition as rows that are typed into: what it adds, exchanges, thickens, and the states it asks for."""

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Final, Literal, TypeVar

from app.document.condition_edits import change_condition
from app.document.edit import Edit, refuse
from stackcore.errors import UnitError
from stackcore.job.records import ConditionRecord, ElementRecord, JobRecord, LayerRecord, SheetRecord
from stackcore.job.states import states_of
from stackcore.units import Dimension, parse_measure

Kind = Literal["front", "back", "exchange", "factor", "state"]
Part = Literal["subject", "value"]
_Item = TypeVar("_Item")

KINDS: Final[dict[Kind, str]] = {
    "front": "In front",
    "back": "Behind",
    "exchange": "Material",
    "factor": "Thickness",
    "state": "State",
}
"""What a row does -> words for it."""

_WATER: Final = "water/water-20c"
_FILM: Final = "0.1 mm"
_NO_MATERIAL: Final = "give the job a material first"


@dataclass(frozen=True, slots=True)
class ConditionRow:
    """One thing that a condition changes.

    Parameters
    ----------
    kind
        What it does, a key of `KINDS`.
    subject
        Name of the material, or of the state; for a sheet its resistance as text.
    value
        Thickness as typed, the material that comes instead, or the factor; empty where there is none.
    place
        Among the rows of its kind.
    sheet
        Whether it is a sheet, which is shown and moved but not typed into.
    """

    kind: Kind
    subject: str
    value: str
    place: int
    sheet: bool = False


def rows_of(condition: ConditionRecord) -> tuple[ConditionRow, ...]:
    """Return what a condition changes: in front, behind, materials, thicknesses, states."""
    rows = [_element_row("front", place, one) for place, one in enumerate(condition.front)]
    rows += [_element_row("back", place, one) for place, one in enumerate(condition.back)]
    rows += [ConditionRow("exchange", one, other, place) for place, (one, other) in enumerate(condition.materials)]
    factors = enumerate(condition.thickness_factors)
    rows += [ConditionRow("factor", name, f"{factor:g}", place) for place, (name, factor) in factors]
    rows += [ConditionRow("state", state, "", place) for place, state in enumerate(condition.states)]
    return tuple(rows)


def type_change(name: str, row: ConditionRow, part: Part, text: str) -> Edit:
    """Return the edit that takes a text for a part of a row of the condition called `name`.

    Materials are given by name, label, or key of the library. What has no value is refused with its reason.
    """

    def change(condition: ConditionRecord) -> ConditionRecord:
        match row.kind:
            case "front" | "back":
                elements = list(_elements(condition, row.kind))
                elements[row.place] = _typed_layer(elements[row.place], part, text)
                return _with_elements(condition, row.kind, tuple(elements))
            case "exchange":
                pair = condition.materials[row.place]
                new = (text.strip(), pair[1]) if part == "subject" else (pair[0], text.strip())
                return replace(condition, materials=_put(condition.materials, row.place, new))
            case "factor":
                pair_of = condition.thickness_factors[row.place]
                scaled = (text.strip(), pair_of[1]) if part == "subject" else (pair_of[0], _factor(text))
                return replace(condition, thickness_factors=_put(condition.thickness_factors, row.place, scaled))
            case "state":
                return replace(condition, states=_put(condition.states, row.place, text.strip()))

    return change_condition(name, change)


def add_change(record: JobRecord, name: str, kind: Kind) -> Edit:
    """Return the edit that adds a usual row of a kind; refused where the job has nothing for it."""
    own = [material.name for material in record.materials]

    def change(condition: ConditionRecord) -> ConditionRecord:
        match kind:
            case "front" | "back":
                layer = LayerRecord(_WATER, parse_measure(_FILM, Dimension.LENGTH))
                return _with_elements(condition, kind, (*_elements(condition, kind), layer))
            case "exchange":
                free = _free(own, [one for one, _ in condition.materials], _NO_MATERIAL)
                other = next((one for one in own if one != free), free)
                return replace(condition, materials=(*condition.materials, (free, other)))
            case "factor":
                free = _free(own, [one for one, _ in condition.thickness_factors], _NO_MATERIAL)
                return replace(condition, thickness_factors=(*condition.thickness_factors, (free, 2.0)))
            case "state":
                known = list(dict.fromkeys(state.name for one in record.materials for state in states_of(one)))
                free = _free(known, condition.states, "give a material a state, under Constants and curves")
                return replace(condition, states=(*condition.states, free))

    return change_condition(name, change)


def remove_change(name: str, row: ConditionRow) -> Edit:
    """Return the edit that takes a row away."""

    def change(condition: ConditionRecord) -> ConditionRecord:
        match row.kind:
            case "front" | "back":
                return _with_elements(condition, row.kind, _without(_elements(condition, row.kind), row.place))
            case "exchange":
                return replace(condition, materials=_without(condition.materials, row.place))
            case "factor":
                return replace(condition, thickness_factors=_without(condition.thickness_factors, row.place))
            case "state":
                return replace(condition, states=_without(condition.states, row.place))

    return change_condition(name, change)


def note_condition(name: str, note: str) -> Edit:
    """Return the edit that notes something with a condition."""
    return change_condition(name, lambda condition: replace(condition, note=note.strip()))


def _element_row(kind: Kind, place: int, element: ElementRecord) -> ConditionRow:
    if isinstance(element, LayerRecord):
        return ConditionRow(kind, element.material, element.thickness.text, place)
    return ConditionRow(kind, _sheet_words(element), "", place, sheet=True)


def _sheet_words(sheet: SheetRecord) -> str:
    given = (sheet.resistance, sheet.inductance, sheet.capacitance, sheet.conductivity, sheet.thickness)
    return f"sheet, {', '.join(one.text for one in given if one is not None)}"


def _typed_layer(element: ElementRecord, part: Part, text: str) -> ElementRecord:
    if not isinstance(element, LayerRecord):
        raise refuse("conditions", "a sheet of a condition is changed in the job file", "take the row away")
    if part == "subject":
        return replace(element, material=text.strip())
    try:
        return replace(element, thickness=parse_measure(text, Dimension.LENGTH))
    except UnitError as error:
        raise refuse("conditions", error.message, error.allowed) from error


def _factor(text: str) -> float:
    try:
        return parse_measure(text, Dimension.NUMBER).value
    except UnitError as error:
        raise refuse("conditions", error.message, error.allowed) from error


def _elements(condition: ConditionRecord, kind: Kind) -> tuple[ElementRecord, ...]:
    return condition.front if kind == "front" else condition.back


def _with_elements(condition: ConditionRecord, kind: Kind, elements: tuple[ElementRecord, ...]) -> ConditionRecord:
    return replace(condition, front=elements) if kind == "front" else replace(condition, back=elements)


def _free(known: Sequence[str], taken: Sequence[str], otherwise: str) -> str:
    found = next((one for one in known if one not in taken), None)
    if found is None:
        told = "there is nothing left to add" if known else "the job has nothing for it"
        raise refuse("conditions", told, otherwise)
    return found


def _put(items: tuple[_Item, ...], place: int, item: _Item) -> tuple[_Item, ...]:
    return (*items[:place], item, *items[place + 1 :])


def _without(items: tuple[_Item, ...], place: int) -> tuple[_Item, ...]:
    return (*items[:place], *items[place + 1 :])
