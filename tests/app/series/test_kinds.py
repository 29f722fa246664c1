"""What kind of thing a material is."""

import pytest

from app.document import edits
from app.series.kinds import FAMILY_KINDS, NAME_KINDS, kind_of
from stackcore.job.records import MaterialRecord
from stackcore.media.library import read_library
from stackcore.units import Dimension, parse_measure
from tests.app.document.jobs import harbour


@pytest.mark.parametrize(
    ("material", "kind"),
    [
        (MaterialRecord("m", model="constant", constants={"permittivity": 4 - 0.1j}), "dielectric"),
        (MaterialRecord("m", model="constant", constants={"permittivity": 1.1 + 0j}), "foam"),
        (
            MaterialRecord("m", model="constant", constants={"permittivity": 12 - 1j, "permeability": 2 - 1j}),
            "magnetic",
        ),
        (
            MaterialRecord("m", model="constant", constants={"permittivity": 1.1 + 0j, "permeability": 2 + 0j}),
            "magnetic",
        ),
        (
            MaterialRecord("m", model="constant", constants={"permittivity": 4 + 0j, "permeability": 1 + 0j}),
            "dielectric",
        ),
        (MaterialRecord("m", model="constant", constants={"permittivity": -10 - 1j}), "metal"),
        (
            MaterialRecord(
                "m", model="conductor", constants={"conductivity": parse_measure("6 MS/m", Dimension.CONDUCTIVITY)}
            ),
            "metal",
        ),
        (
            MaterialRecord(
                "m", model="conductor", constants={"conductivity": parse_measure("4 S/m", Dimension.CONDUCTIVITY)}
            ),
            "dielectric",
        ),
        (MaterialRecord("m", library="metals/copper"), "metal"),
        (MaterialRecord("m", library="ceramics/window-glass"), "glass"),
        (MaterialRecord("m", library="ceramics/alumina"), "dielectric"),
        (MaterialRecord("m", library="finishes/radome-paint"), "coating"),
        (MaterialRecord("m", library="cores/honeycomb"), "foam"),
    ],
)
def test_kinds(material: MaterialRecord, kind: str) -> None:
    """The library family or name decides, and without one the constants."""
    session = harbour()
    assert session.apply(edits.add_material(material)) == ()
    assert kind_of(session.job, "m") == kind


def test_names_that_are_no_materials_of_the_job() -> None:
    """Air is drawn as foam is, and the perfect conductor as metal."""
    job = harbour().job
    assert [kind_of(job, name) for name in ("air", "vacuum", "metal")] == ["foam", "foam", "metal"]


def test_the_families_named_here_exist() -> None:
    """Every family with a kind is a family of the library, and every library entry has a kind."""
    library = read_library()
    assert set(FAMILY_KINDS) <= set(library.families())
    session = harbour()
    for entry in library.entries:
        session.apply(edits.use_library_entry(entry.key))
    kinds = {kind_of(session.job, material.name) for material in session.record.materials}
    assert kinds <= {*FAMILY_KINDS.values(), *NAME_KINDS.values()}
