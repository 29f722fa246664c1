"""The lines of the table of materials as values, made from the document. No toolkit."""

from dataclasses import dataclass
from typing import Final

from app.document.document import Document, material_cell
from app.document.library import pinned
from app.document.material_cells import material_text
from app.panels.materials.words import range_caution, reading_at
from app.series.kinds import kind_of
from stackcore.errors import Fault
from stackcore.job.records import MaterialRecord
from stackcore.media.models import MODELS


@dataclass(frozen=True, slots=True)
class MaterialColumn:
    """One column: the name of its place in the document, its title, what it means, and whether it holds numbers."""

    name: str
    title: str
    definition: str
    is_number: bool = False


NAME: Final = MaterialColumn(
    "name", "Name", "What the material is called in the job file; layers follow a new name."
)
READING: Final = MaterialColumn(
    "reading",
    "At the marker",
    "ε′ and loss tangent at the frequency of the active marker, and the skin depth of a conductor.",
)
COLUMNS: Final = (
    NAME,
    MaterialColumn("label", "Label", "What the material is called in tables, drawings and reports."),
    MaterialColumn(
        "permittivity", "ε", "Relative permittivity: 4.2, or with its loss 4.2 - 0.06j or [4.2, 0.06].", True
    ),
    MaterialColumn(
        "loss_tangent", "tan δ", "Loss tangent ε″/ε′, 0 or more. Empty when the loss is part of ε.", True
    ),
    MaterialColumn(
        "permeability", "μ", "Relative permeability: 1 when empty; with loss 2 - 0.8j or [2, 0.8].", True
    ),
    MaterialColumn(
        "conductivity", "Conductivity", "Conductivity of a conductor, more than 0: 59.6 MS/m or 100 %IACS.", True
    ),
    READING,
    MaterialColumn(
        "model",
        "Model",
        "How ε and μ follow from the constants: the same at every frequency, by a relaxation, by a table, ...",
    ),
    MaterialColumn("source", "Source", "Where the numbers come from: publication, test report or data sheet."),
)
ALWAYS_TYPED: Final = ("name", "label", "source")


@dataclass(frozen=True, slots=True)
class MaterialCell:
    """What one cell shows: the text as typed, whether it can be typed into, and why it has no value."""

    text: str = ""
    editable: bool = False
    fault: Fault | None = None


@dataclass(frozen=True, slots=True)
class MaterialLine:
    """One material: its name, cells by `COLUMNS`, its kind, and a sentence where it is not known."""

    name: str
    cells: tuple[MaterialCell, ...]
    kind: str
    library: str
    caution: str


def lines_of(document: Document, frequency: float) -> tuple[MaterialLine, ...]:
    """Return one line a material, with its reading at `frequency` in Hz."""
    return tuple(_line(document, material, frequency) for material in document.record.materials)


def _line(document: Document, material: MaterialRecord, frequency: float) -> MaterialLine:
    model = pinned(material).model
    takes = MODELS[model].names if model in MODELS else ()
    cells = []
    for column in COLUMNS:
        if column is READING:
            cells.append(MaterialCell(reading_at(document.job.media[material.name], frequency)))
        elif column.name == "model":
            cells.append(MaterialCell(model))
        else:
            cells.append(_typed_cell(document, material, column.name, column.name in takes))
    caution = range_caution(document.job, material.name)
    return MaterialLine(
        material.name, tuple(cells), kind_of(document.job, material.name), material.library, caution
    )


def _typed_cell(document: Document, material: MaterialRecord, column: str, taken: bool) -> MaterialCell:
    draft = document.draft(material_cell(material.name, column))
    if draft is not None:
        return MaterialCell(draft.text, True, draft.fault)
    return MaterialCell(material_text(material, column), taken or column in ALWAYS_TYPED)
