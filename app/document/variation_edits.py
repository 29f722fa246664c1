"""The edit that gives one number of a job, by its path, another value: what a study found, or what is dragged."""

from collections.abc import Hashable
from math import isfinite
from typing import Final

from app.document.document import Cell, Document
from app.document.edit import Edit, element_at, refuse, with_record, without_draft
from stackcore.job.records import LayerRecord
from stackcore.studies import ElementPart, Variation, variations_of, varied
from stackcore.units import Dimension, format_value

TAKEN_DIGITS: Final = 4
"""Significant digits of a value that is taken from a plot: no finer than anyone can point."""


def taken(variation: Variation, value: float) -> float:
    """Return a value (SI) as it is taken: to `TAKEN_DIGITS`, a temperature to a hundredth of a kelvin."""
    if not isfinite(value):
        return value
    return round(value, 2) if variation.dimension is Dimension.TEMPERATURE else float(f"{value:.{TAKEN_DIGITS}g}")


def take_value(variation: Variation, value: float, *, merge_key: Hashable | None = None) -> Edit:
    """Return the edit that gives what is varied the value (SI), rounded to `TAKEN_DIGITS`.

    Refused where the number is no longer there, a thickness is locked, or the value is not allowed.

    Examples
    --------
    >>> from app.document.untitled import untitled_job
    >>> take_value(variations_of(untitled_job(), 0)[0], 0.00212345).sentence
    'set thickness of element 1 (ptfe) to 2.123 mm'
    """
    rounded = taken(variation, value)
    text = format_value(rounded, variation.dimension)

    def change(document: Document) -> Document:
        found = [one for one in variations_of(document.job, variation.stack) if one.path == variation.path]
        if not found:
            raise refuse(variation.path, "it is no longer there", "choose again what is varied")
        drafts = document.drafts
        part = variation.part
        if isinstance(part, ElementPart):
            element = element_at(document.record, variation.stack, part.row)
            if isinstance(element, LayerRecord) and element.locked:
                raise refuse(variation.path, "the thickness is locked", "unlock it first, or type the thickness")
            drafts = without_draft(drafts, Cell(variation.stack, part.row, part.name))
        return with_record(document, varied(document.job, found[0], rounded).record, drafts)

    words = f"{variation.label[:1].lower()}{variation.label[1:]}"
    return Edit(f"set {words} to {text}", change, merge_key=merge_key)
