"""Edits of the job's materials."""

from dataclasses import replace

from app.document.document import Document, Draft, material_and_constant
from app.document.edit import Edit, refuse, with_record
from app.document.library import ALWAYS_DEFINED, PERFECT_METAL, with_material
from stackcore.errors import Fault, JobError, nearest
from stackcore.job.inspector import join
from stackcore.job.materials import library_model, references_of
from stackcore.job.records import ElementRecord, JobRecord, LayerRecord, MaterialRecord, StackRecord
from stackcore.media.library import library_entry
from stackcore.media.models import MODELS


def add_material(material: MaterialRecord) -> Edit:
    """Return the edit that adds `material`; refused when the job has one of that name."""

    def change(document: Document) -> Document:
        _check_free(document.record, material.name)
        materials = (*document.record.materials, material)
        return with_record(document, replace(document.record, materials=materials))

    return Edit(f"add material {material.name}", change)


def replace_material(name: str, material: MaterialRecord) -> Edit:
    """Return the edit that puts `material` in place of the one called `name`; whatever uses it follows its name."""

    def change(document: Document) -> Document:
        return _renamed(document, name, material)

    return Edit(f"change material {name}", change)


def rename_material(name: str, new_name: str) -> Edit:
    """Return the edit that renames a material everywhere."""
    new_name = new_name.strip()

    def change(document: Document) -> Document:
        return _renamed(document, name, replace(material_of(document.record, name), name=new_name))

    return Edit(f"rename material {name} to {new_name}", change)


def remove_material(name: str) -> Edit:
    """Return the edit that removes a material; refused, with every place, while something is made of it."""

    def change(document: Document) -> Document:
        material_of(document.record, name)
        places = uses_of(document.record, name)
        if places:
            allowed = "choose another material there first"
            raise JobError(
                [Fault(place, f"{name!r} is used here and cannot be removed", allowed) for place in places]
            )
        rest = tuple(material for material in document.record.materials if material.name != name)
        drafts = without_drafts_of(document, name)
        return with_record(document, replace(document.record, materials=rest), drafts)

    return Edit(f"remove material {name}", change)


def use_library_entry(key: str) -> Edit:
    """Return the edit that adds the library entry `key` to the job, unless the job has it."""

    def change(document: Document) -> Document:
        library_entry(key)  # says so, with the nearest match, when there is none
        return with_record(document, with_material(document.record, key)[0])

    return Edit(f"add material {key}", change)


def material_of(record: JobRecord, name: str) -> MaterialRecord:
    """Return the material called `name`; refuses one the job does not define."""
    found = record.material(name)
    if found is None:
        names = [material.name for material in record.materials]
        allowed = f"one of {', '.join(names)}" if names else "the job defines no materials"
        raise refuse(f"materials.{name}", f"there is no material {name!r}{nearest(name, names)}", allowed)
    return found


def uses_of(record: JobRecord, name: str) -> tuple[str, ...]:
    """Return the paths of everything in `record` that is made of `name`."""
    places = []
    for number, stack in enumerate(record.stacks):
        place = f"stacks[{number}]"
        places += [f"{place}.{side}" for side in ("front", "back") if getattr(stack, side) == name]
        places += [
            f"{place}.elements[{row}].layer"
            for row, element in enumerate(stack.elements)
            if isinstance(element, LayerRecord) and element.material == name
        ]
    for material in record.materials:
        places += [
            f"{join('materials', material.name)}.{place}" for place, used in references_of(material) if used == name
        ]
    return tuple(places)


def without_drafts_of(document: Document, name: str) -> tuple[Draft, ...]:
    """Return the drafts of `document` but for those in the cells of the material called `name`."""
    return tuple(draft for draft in document.drafts if _material_name(draft) != name)


def _material_name(draft: Draft) -> str | None:
    column = draft.cell.column
    return material_and_constant(column)[0] if column.startswith("material:") else None


def _renamed(document: Document, name: str, material: MaterialRecord) -> Document:
    """Return the document with `material` in place of `name`; layers, half-spaces and drafts take its name."""
    record = document.record
    material_of(record, name)
    if material.name == name:
        return with_record(document, _with_materials(record, name, material))
    _check_free(record, material.name)

    def follow(used: str) -> str:
        return material.name if used == name else used

    def element(old: ElementRecord) -> ElementRecord:
        return replace(old, material=follow(old.material)) if isinstance(old, LayerRecord) else old

    def stack(old: StackRecord) -> StackRecord:
        elements = tuple(element(one) for one in old.elements)
        return replace(old, front=follow(old.front), back=follow(old.back), elements=elements)

    materials = tuple(
        _following(material if old.name == name else old, name, material.name) for old in record.materials
    )
    changed = replace(record, materials=materials, stacks=tuple(stack(one) for one in record.stacks))
    drafts = []
    for draft in document.drafts:
        if _material_name(draft) == name:
            constant = material_and_constant(draft.cell.column)[1]
            draft = draft.at(replace(draft.cell, column=f"material:{material.name}.{constant}"))
        drafts.append(draft)
    return with_record(document, changed, drafts)


def _following(material: MaterialRecord, name: str, new_name: str) -> MaterialRecord:
    """Return a material that is made of `new_name` where it was made of `name`."""
    if not any(used == name for _, used in references_of(material)):
        return material
    model = MODELS[material.model or library_model(material.library)]
    return replace(material, constants=model.renamed(material.given, name, new_name))


def _with_materials(record: JobRecord, name: str, material: MaterialRecord) -> JobRecord:
    materials = tuple(material if old.name == name else old for old in record.materials)
    return replace(record, materials=materials)


def _check_free(record: JobRecord, name: str) -> None:
    taken = (*ALWAYS_DEFINED, PERFECT_METAL, *(material.name for material in record.materials))
    if not name or name in taken:
        what = "is taken" if name else "is no name"
        raise refuse(f"materials.{name}", f"{name!r} {what}", f"a name other than {', '.join(taken)}")
