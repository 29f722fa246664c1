"""Edits of what a material is made of: its model, its constants, and the rows of its lists."""

from dataclasses import replace

from app.document.document import Document
from app.document.edit import Edit, refuse, with_record
from app.document.library import pinned
from app.document.material_cells import model_of, with_constant, with_model
from app.document.material_edits import material_of, without_drafts_of
from stackcore.errors import nearest
from stackcore.job.inspector import join
from stackcore.job.records import MaterialRecord
from stackcore.media.models import MODELS, Constants, Terms, Value


def set_constant(name: str, constant: str, value: Value | None) -> Edit:
    """Return the edit that sets a constant, ``terms[0].relaxation_time`` for one in a list; None takes it away.

    Raises nothing itself; the edit is refused, with every fault, when the material is none with it.
    """

    def change(document: Document) -> Document:
        return _changed(document, name, with_constant(material_of(document.record, name), constant, value))

    return Edit(f"change {constant.replace('_', ' ')} of {name}", change)


def set_model(name: str, model: str) -> Edit:
    """Return the edit that gives a material another model; constants that both have stay."""

    def change(document: Document) -> Document:
        if model not in MODELS:
            known = f"one of {', '.join(MODELS)}"
            place = f"{join('materials', name)}.model"
            raise refuse(place, f"{model!r} is not known{nearest(model, MODELS)}", known)
        return _changed(document, name, with_model(material_of(document.record, name), model))

    return Edit(f"give {name} the model {model}", change)


def add_row(name: str, constant: str, at: int | None = None) -> Edit:
    """Return the edit that adds a row to a list of constants, at its end unless `at` says where.

    The new row is a copy of the one before it, or of the one behind it where there is none.
    """

    def change(document: Document) -> Document:
        material = material_of(document.record, name)
        rows = _rows(material, constant)
        place = len(rows) if at is None else min(max(at, 0), len(rows))
        new = rows[max(place - 1, 0)] if rows else _first_row(material, constant)
        return _changed(document, name, with_constant(material, constant, (*rows[:place], new, *rows[place:])))

    return Edit(f"add a row to {constant.replace('_', ' ')} of {name}", change)


def remove_row(name: str, constant: str, at: int) -> Edit:
    """Return the edit that removes a row from a list of constants."""

    def change(document: Document) -> Document:
        material = material_of(document.record, name)
        rows = _rows(material, constant)
        if not 0 <= at < len(rows):
            place = f"{join('materials', name)}.{constant}[{at}]"
            raise refuse(place, "there is no such row", f"0 to {len(rows) - 1}")
        return _changed(document, name, with_constant(material, constant, (*rows[:at], *rows[at + 1 :])))

    return Edit(f"remove row {at + 1} from {constant.replace('_', ' ')} of {name}", change)


def _changed(document: Document, name: str, material: MaterialRecord) -> Document:
    """Return the document with `material` in place of `name`; what was typed at its old constants is gone."""
    materials = tuple(material if old.name == name else old for old in document.record.materials)
    record = replace(document.record, materials=materials)
    return with_record(document, record, without_drafts_of(document, name))


def _rows(material: MaterialRecord, constant: str) -> tuple[Constants, ...]:
    model = model_of(material)
    found = model.constant(constant)
    if found is None or not isinstance(found.kind, Terms):
        lists = [one.name for one in model.constants if isinstance(one.kind, Terms)]
        allowed = f"one of {', '.join(lists)}" if lists else f"the model {model.name!r} has no lists"
        raise refuse(f"{join('materials', material.name)}.{constant}", "is no list of constants", allowed)
    # Those of a reference into the library are those of its entry.
    value = pinned(material).constants.get(constant)
    return value if isinstance(value, tuple) else ()


def _first_row(material: MaterialRecord, constant: str) -> Constants:
    found = model_of(material).constant(constant)
    assert found is not None
    assert isinstance(found.kind, Terms)
    return found.kind.first_row()
