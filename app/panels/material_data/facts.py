"""The form of a material as values, made from the document and the table of models. No toolkit."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Final

import numpy as np

from app.document.document import Document, material_cell
from app.document.fact_cells import FACTS
from app.document.library import ALWAYS_DEFINED, pinned
from app.document.material_cells import material_text, model_of
from app.series.material_quantities import plain_number
from app.series.texts import frequency_text
from stackcore.errors import Fault
from stackcore.job.records import MaterialRecord
from stackcore.media.base import AbstractMedium
from stackcore.media.library_file import CERTAINTIES
from stackcore.media.mixing_rules import hashin_shtrikman_bounds, wiener_bounds
from stackcore.media.mixture import MixtureMedium
from stackcore.media.models import Choice, Constant, Flag, Model, Reference, Terms, value_text

NO_FACT: Final = "not given"
_LABEL: Final = "What the material is called in tables, drawings and reports."
_RANGE: Final = "Lowest and highest frequency at which the constants hold, for example 8 GHz to 12.4 GHz."
_SOURCE: Final = "Where the numbers come from: publication with edition, test report or data sheet."
_CERTAINTY: Final = "How the numbers are known."
_FACTS: Final = {
    "density": ("Density", "Mass by volume, for the mass of a wall: 1900 kg/m3. It changes no curve."),
    "ply_thickness": ("Ply", "Thickness of one cured ply: thicknesses can then be typed as 6 ply."),
    "price": ("Price per kg", "Of a kilogram in your own currency, for the cost of a wall."),
    "spread": ("Spread", "One standard deviation in production: permittivity 3 %; loss_tangent 20 %."),
    "states": (
        "States",
        "What differs when it is wet or hot; conditions use it: wet: permittivity 4.6, loss_tangent 0.03.",
    ),
}
_NOTE: Final = "Temperature, form, direction, or anything else a user must know."


@dataclass(frozen=True, slots=True)
class FieldFacts:
    """One field of the form.

    Parameters
    ----------
    column
        Its place in the document, as `material_cell` takes it.
    label, tip
        Words before the field, and what it means.
    text
        As typed, also where it is no value.
    fault
        Why it is no value, or None.
    hint
        What holds while the field is empty.
    options
        What can be chosen; empty for a field to type into.
    wide
        Whether it holds words rather than a number.
    """

    column: str
    label: str
    tip: str
    text: str
    fault: Fault | None = None
    hint: str = ""
    options: tuple[str, ...] = ()
    wide: bool = False

    @property
    def shape(self) -> tuple[str, tuple[str, ...]]:
        """What the widget depends on: two fields of one shape need no other widget."""
        return self.column, self.options


def fields_of(document: Document, name: str) -> tuple[FieldFacts, ...]:
    """Return the fields of the material called `name`: constants of its model first, then words about them."""
    material = _material(document, name)
    model = model_of(material)
    single = [constant for constant in model.constants if not isinstance(constant.kind, Terms)]
    fields = [_constant_field(document, material, model, constant) for constant in single]
    fields.append(_words(document, material, "label", "Label", _LABEL))
    if model.ranged:
        fields.append(_words(document, material, "range", "Holds from", _RANGE))
    fields += [_fact(document, material, column) for column in FACTS]
    fields.append(_words(document, material, "source", "Source", _SOURCE))
    fields.append(_words(document, material, "certainty", "Certainty", _CERTAINTY, ("", *CERTAINTIES)))
    fields.append(_words(document, material, "note", "Note", _NOTE))
    return tuple(fields)


def lists_of(document: Document, name: str) -> tuple[Constant, ...]:
    """Return the constants of a material that are lists of rows."""
    model = model_of(_material(document, name))
    return tuple(constant for constant in model.constants if isinstance(constant.kind, Terms))


def material_names(document: Document, name: str) -> tuple[str, ...]:
    """Return what the material `name` can be made of: all others of the job, and those always there."""
    return tuple(other.name for other in document.record.materials if other.name != name) + ALWAYS_DEFINED


def part_texts(constant: Constant) -> tuple[tuple[str, str], ...]:
    """Return title and meaning of each column of a list."""
    assert isinstance(constant.kind, Terms)
    return tuple((_titled(part), f"{part.about} {_allowed(part)}") for part in constant.kind.of)


def heading_of(document: Document, name: str) -> tuple[str, str]:
    """Return what a material is called, and what ties it to the library; empty for one of the job's own."""
    material = _material(document, name)
    tie = f"From the library, {material.library}. A constant typed here cuts the tie." if material.library else ""
    return material.label or name, tie


def bounds_note(medium: AbstractMedium, frequency: float) -> str:
    """Return between which bounds the ε′ of a mixture lies at `frequency` in Hz; empty for what is no mixture.

    The bounds are those of lossless components; none are told where a component has an ε′ of 0 or less.
    """
    if not isinstance(medium, MixtureMedium):
        return ""
    at = np.array([frequency])
    parts = [each.evaluate(at).permittivity.real for each in medium.media]
    if any(float(part[0]) <= 0 for part in parts):
        return ""
    wide, narrow = wiener_bounds(parts, medium.fractions), hashin_shtrikman_bounds(parts, medium.fractions)
    real = plain_number(float(medium.evaluate(at).permittivity.real[0]))
    return (
        f"At {frequency_text(frequency)} this rule gives ε′ {real}. Without loss any mixture of these lies between "
        f"{_between(wide)} (layers across and along the field), one without a direction between {_between(narrow)}."
    )


def _between(bounds: Sequence[np.ndarray[tuple[int, ...], np.dtype[np.float64]]]) -> str:
    low, high = (plain_number(float(bound[0])) for bound in bounds)
    return f"{low} and {high}"


def _material(document: Document, name: str) -> MaterialRecord:
    material = document.record.material(name)
    assert material is not None
    return material


def _constant_field(document: Document, material: MaterialRecord, model: Model, constant: Constant) -> FieldFacts:
    default = model.default(constant.name)
    hint = "" if default is None else value_text(default)
    options: tuple[str, ...] = ()
    if isinstance(constant.kind, Choice):
        options = constant.kind.options if constant.required else ("", *constant.kind.options)
    elif isinstance(constant.kind, Flag):
        options = ("yes", "no") if constant.required else ("", "yes", "no")
    elif isinstance(constant.kind, Reference):
        own = pinned(material).constants.get(constant.name)
        names = material_names(document, material.name)
        options = names if own in names or own is None else (str(own), *names)
    tip = f"{constant.about} {_allowed(constant)}" + (f" Left out: {hint}." if hint else "")
    text, fault = _typed(document, material, constant.name)
    return FieldFacts(constant.name, _titled(constant), tip, text, fault, hint, options)


def _fact(document: Document, material: MaterialRecord, column: str) -> FieldFacts:
    label, tip = _FACTS[column]
    text, fault = _typed(document, material, column)
    return FieldFacts(column, label, tip, text, fault, NO_FACT, wide=column in ("spread", "states"))


def _words(
    document: Document,
    material: MaterialRecord,
    column: str,
    label: str,
    tip: str,
    options: tuple[str, ...] = (),
) -> FieldFacts:
    text, fault = _typed(document, material, column)
    return FieldFacts(column, label, tip, text, fault, options=options, wide=True)


def _typed(document: Document, material: MaterialRecord, column: str) -> tuple[str, Fault | None]:
    draft = document.draft(material_cell(material.name, column))
    return (draft.text, draft.fault) if draft is not None else (material_text(material, column), None)


def _titled(constant: Constant) -> str:
    return f"{constant.label} {constant.symbol}".strip()


def _allowed(constant: Constant) -> str:
    allowed = constant.kind.allowed
    return f"Allowed: {allowed}."
