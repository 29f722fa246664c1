"""Thicknesses counted in plies: ``6 ply`` of a material that knows how thick one of its plies is when cured."""

import re
from collections.abc import Mapping, Sequence
from dataclasses import replace
from typing import Final

from stackcore.errors import LibraryError, UnitError
from stackcore.job.records import (
    ConditionRecord,
    ElementRecord,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    StackRecord,
)
from stackcore.media.library import library_entry
from stackcore.units import Dimension, Measure, measure

_PLIES: Final = re.compile(r"\s*(?P<count>\d+(?:[.,]\d+)?)\s*pl(?:y|ies)\s*", re.IGNORECASE)


def counts_plies(text: str) -> bool:
    """Return whether a text counts plies.

    Examples
    --------
    >>> counts_plies("6 ply"), counts_plies("12 plies"), counts_plies("6 mm")
    (True, True, False)
    """
    return _PLIES.fullmatch(text) is not None


def ply_of(material: MaterialRecord | None) -> float | None:
    """Return the thickness of one ply of a material in m, from the job or else the library; None if unknown."""
    if material is None:
        return None
    if material.ply_thickness is not None:
        return material.ply_thickness.value
    if not material.library or (material.model and material.constants):
        return None
    try:
        known = library_entry(material.library).ply_thickness
    except LibraryError:
        return None
    return known.value if known is not None else None


def plies_of(materials: Sequence[MaterialRecord]) -> dict[str, float]:
    """Return the ply thickness in m of every material that has one, by its name."""
    known = {material.name: ply_of(material) for material in materials}
    return {name: value for name, value in known.items() if value is not None}


def read_plies(text: str, ply: float | None) -> Measure:
    """Return the thickness of so many plies, its text as typed.

    Parameters
    ----------
    text
        Such as ``6 ply``.
    ply
        Thickness of one in m, or None where the material has none.

    Raises
    ------
    UnitError
        When the material has no ply thickness, or the text counts no plies.

    Examples
    --------
    >>> read_plies("6 ply", 0.25e-3)
    Measure(value=0.0015, text='6 ply')
    """
    match = _PLIES.fullmatch(text)
    if match is None:
        raise UnitError(f"{text!r} counts no plies", "a number of plies, for example '6 ply'")
    if ply is None:
        allowed = "a length, for example '1.5 mm', or a material with a ply thickness"
        raise UnitError(f"{text!r} counts plies, and the material has no ply thickness", allowed)
    return Measure(float(match["count"].replace(",", ".")) * ply, text.strip())


def with_plies(record: JobRecord) -> JobRecord:
    """Return `record` with every thickness that counts plies worked out anew from the materials of now.

    Where a material has no ply thickness any more the length stays as it was, written as a length.
    """
    if not any(counts_plies(layer.thickness.text) for layer in _layers(record)):
        return record
    plies = plies_of(record.materials)
    stacks = tuple(
        replace(stack, elements=tuple(_anew(element, plies) for element in stack.elements))
        for stack in record.stacks
    )
    conditions = tuple(
        replace(
            one,
            front=tuple(_anew(element, plies) for element in one.front),
            back=tuple(_anew(element, plies) for element in one.back),
        )
        for one in record.conditions
    )
    return replace(record, stacks=stacks, conditions=conditions)


def _layers(record: JobRecord) -> list[LayerRecord]:
    owners: list[StackRecord | ConditionRecord] = [*record.stacks, *record.conditions]
    elements = [
        element
        for owner in owners
        for element in (owner.elements if isinstance(owner, StackRecord) else (*owner.front, *owner.back))
    ]
    return [element for element in elements if isinstance(element, LayerRecord)]


def _anew(element: ElementRecord, plies: Mapping[str, float]) -> ElementRecord:
    if not isinstance(element, LayerRecord) or not counts_plies(element.thickness.text):
        return element
    ply = plies.get(element.material)
    if ply is None:
        # Twelve digits: the product of plies must not show its rounding.
        length = float(f"{element.thickness.value:.12g}")
        return replace(element, thickness=measure(length, Dimension.LENGTH))
    return replace(element, thickness=read_plies(element.thickness.text, ply))
