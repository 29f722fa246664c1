"""The constants of a material as texts."""

from dataclasses import replace
from typing import Final

from app.document.library import pinned
from app.document.material_edits import material_of
from app.document.reading import read_like, read_relative, relative_text
from stackcore.job.records import JobRecord, MaterialRecord
from stackcore.units import Dimension, parse_measure

MATERIAL_COLUMNS: Final = (
    "name",
    "label",
    "source",
    "permittivity",
    "permeability",
    "loss_tangent",
    "conductivity",
)


def material_text(material: MaterialRecord, column: str) -> str:
    """Return the text of one column of a material; empty for a constant that is not given.

    A material that is only a reference into the library shows the values of its entry.
    """
    material = pinned(material)
    match column:
        case "name":
            return material.name
        case "label":
            return material.label
        case "source":
            return material.source
        case "permittivity":
            return "" if material.permittivity is None else relative_text(material.permittivity)
        case "permeability":
            return "" if material.permeability is None else relative_text(material.permeability)
        case "loss_tangent":
            return "" if material.loss_tangent is None else repr(material.loss_tangent)
        case _:
            return "" if material.conductivity is None else material.conductivity.text


def with_material_text(record: JobRecord, name: str, column: str, text: str) -> JobRecord:
    """Return `record` with one column of the material `name` set; an empty text takes a constant away.

    A constant typed over one of the library cuts the tie: the reference goes, and the source says what it
    was. A name is not changed here, because whatever uses it must follow (`material_edits.rename_material`).
    """
    old = material_of(record, name)
    new = _with_column(old, column, text)
    return replace(record, materials=tuple(new if one is old else one for one in record.materials))


def _with_column(material: MaterialRecord, column: str, text: str) -> MaterialRecord:
    if column == "label":
        return replace(material, label=text.strip())
    if column == "source":
        return replace(material, source=text.strip())
    old = pinned(material)
    new = _with_constant(old, column, text.strip())
    if new == old:
        return material
    if old.library:
        return replace(new, library="", source=f"changed from {old.library}")
    return new


def _with_constant(material: MaterialRecord, column: str, text: str) -> MaterialRecord:
    match column:
        case "permittivity":
            return replace(material, permittivity=read_relative(text) if text else None)
        case "permeability":
            return replace(material, permeability=read_relative(text) if text else None)
        case "loss_tangent":
            tangent = parse_measure(text, Dimension.NUMBER).value if text else None
            return replace(material, loss_tangent=tangent)
        case _:
            old = material.conductivity
            conductivity = read_like(old, text, Dimension.CONDUCTIVITY) if text else None
            return replace(material, conductivity=conductivity)
