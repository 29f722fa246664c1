"""The user's own library beside that of the program, and what is kept in it."""

from pathlib import Path

import pytest

from stackcore.errors import LibraryError
from stackcore.job.own_library import keep_material
from stackcore.job.records import MaterialRecord, StateRecord
from stackcore.media.library import (
    Library,
    forget_library,
    library_entry,
    materials_dir,
    own_materials_dir,
    read_library,
)
from stackcore.media.library_file import read_family
from stackcore.media.mixture import MixtureMedium
from stackcore.units import Dimension, parse_measure

ENTRY = """
[[material]]
name = "{name}"
label = "{label}"
model = "constant"
permittivity = {value}
range = ["1 GHz", "2 GHz"]
source = "coupon 7"
certainty = "read"
spread = {{ permittivity = 0.01 }}
"""


def own(folder: Path, family: str, *entries: tuple[str, str, str]) -> None:
    """Write a file of the user's: name, label and permittivity of each entry."""
    folder.mkdir(parents=True, exist_ok=True)
    text = f'[family]\nlabel = "{family}"\n' + "".join(
        ENTRY.format(name=name, label=label, value=value) for name, label, value in entries
    )
    (folder / f"{family}.toml").write_text(text, encoding="utf-8")


def test_own_entries_stand_beside_and_in_place(tmp_path: Path) -> None:
    """An own entry of a shipped key takes its place and is marked; another is added; the rest stays."""
    own(tmp_path, "plastics", ("ptfe", "Our PTFE", "2.1"), ("ours", "Ours", "3.3"))
    own(tmp_path, "mine", ("skin", "Skin", "4.4"))
    shipped = Library(materials_dir())
    library = Library(materials_dir(), tmp_path)
    assert library.faults == ()
    assert set(library.families()) == {*shipped.families(), "mine"}
    ptfe, ours, skin = (library.entry(key) for key in ("plastics/ptfe", "plastics/ours", "mine/skin"))
    marks = [(entry.own, entry.shadows) for entry in (ptfe, ours, skin)]
    assert marks == [(True, True), (True, False), (True, False)]
    assert ptfe.constants == {"permittivity": 2.1 + 0j}
    assert not library.entry("plastics/polyethylene").own
    assert len(library.entries) == len(shipped.entries) + 2
    assert library.family("plastics").label == shipped.family("plastics").label


def test_a_faulty_own_file_leaves_the_rest(tmp_path: Path) -> None:
    """A broken file of the user's is told with its path, and every shipped entry can be used."""
    own(tmp_path, "plastics", ("ptfe", "Our PTFE", "-0.0"))
    (tmp_path / "metals.toml").write_text("[family", encoding="utf-8")
    library = Library(materials_dir(), tmp_path)
    places = [fault.path for fault in library.faults]
    assert places == [str(tmp_path / "metals.toml"), f"{tmp_path / 'plastics.toml'}: ptfe.permittivity"]
    assert not library.entry("metals/copper").own
    assert not library.entry("plastics/ptfe").own


def test_the_folder_is_where_the_variable_says(program_home: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """SLABWRIGHT_HOME moves it; without that it is where the system keeps a user's data."""
    assert own_materials_dir() == program_home / "materials"
    monkeypatch.delenv("SLABWRIGHT_HOME")
    monkeypatch.setattr("sys.platform", "linux")
    monkeypatch.setenv("XDG_DATA_HOME", "/data")
    assert own_materials_dir() == Path("/data/slabwright/materials")


@pytest.mark.usefixtures("program_home")
def test_a_material_is_kept_and_found_again() -> None:
    """A material of a job becomes an entry of the user's library, with all that was said of it."""
    ends = (parse_measure("8 GHz", Dimension.FREQUENCY), parse_measure("12 GHz", Dimension.FREQUENCY))
    record = MaterialRecord(
        "skin",
        "Skin",
        "constant",
        constants={"permittivity": 4.2 + 0j, "loss_tangent": 0.015},
        source="coupon",
        valid_range=ends,
        spread=(("permittivity", 0.02),),
    )
    path = keep_material(record, "ours/skin")
    keep_material(MaterialRecord("foam", model="constant", constants={"permittivity": 1.1 + 0j}), "ours/foam")
    entry, foam = library_entry("ours/skin"), library_entry("ours/foam")
    assert entry.own
    assert (entry.label, entry.constants, entry.provenance.source) == ("Skin", record.constants, "coupon")
    assert dict(entry.provenance.spread) == {"permittivity": 0.02, "loss_tangent": 0.0}
    assert entry.valid_range.highest == 12e9
    assert (foam.provenance.source, foam.provenance.note) == ("Not stated", "Range not stated.")
    assert read_family("ours", path.read_bytes()).faults == ()


@pytest.mark.usefixtures("program_home")
def test_facts_and_states_are_kept() -> None:
    """Density, ply thickness and states of a material go into the user's library; its price does not."""
    wet = StateRecord("wet, 20 °C", {"permittivity": 4.6 + 0j, "loss_tangent": 0.03}, note="saturated")
    record = MaterialRecord(
        "skin",
        model="constant",
        constants={"permittivity": 4.2 + 0j},
        density=parse_measure("1900", Dimension.MASS_DENSITY),
        ply_thickness=parse_measure("0.25 mm", Dimension.LENGTH),
        price=12.5,
        states=(wet,),
    )
    path = keep_material(record, "ours/skin")
    entry = library_entry("ours/skin")
    assert entry.density is not None
    assert entry.density.value == 1900
    assert entry.ply_thickness is not None
    assert entry.ply_thickness.value == 0.25e-3
    (state,) = entry.states
    assert (state.name, state.constants, state.note) == (wet.name, wet.constants, wet.note)
    assert "price" not in path.read_text(encoding="utf-8")


@pytest.mark.usefixtures("program_home")
def test_what_cannot_be_kept_leaves_the_file() -> None:
    """A key twice, no key, or a material made of others of the job: told, and the file is as it was."""
    foam = MaterialRecord("foam", model="constant", constants={"permittivity": 1.1 + 0j})
    path = keep_material(foam, "ours/foam")
    before = path.read_bytes()
    with pytest.raises(LibraryError, match="used twice"):
        keep_material(foam, "ours/foam")
    with pytest.raises(LibraryError, match="is no key"):
        keep_material(foam, "Foam")
    rows = MaterialRecord(
        "mix",
        model="magnetic",
        constants={"permittivity_from": "foam", "permeability_from": "plastics/ptfe"},
    )
    with pytest.raises(LibraryError, match="'foam' of this job"):
        keep_material(rows, "ours/mix")
    assert path.read_bytes() == before


def test_a_library_reference_is_kept_with_its_values() -> None:
    """A mere reference is written with the values of its entry, which it then shadows."""
    keep_material(MaterialRecord("cu", library="metals/copper"), "metals/copper")
    entry = library_entry("metals/copper")
    assert (entry.own, entry.shadows) == (True, True)
    assert entry.medium == Library(materials_dir()).entry("metals/copper").medium


def test_entries_made_of_others(tmp_path: Path) -> None:
    """An own mixture of a shipped entry takes its range from it; a circle and a missing part are told."""
    mixture = """
[[material]]
name = "{name}"
label = "{name}"
model = "mixture"
host = "{host}"
inclusions = [{{ material = "plastics/ptfe", fraction = 0.25 }}]
source = "a sum"
certainty = "common practice"
"""
    texts = [("good", "plastics/polyethylene"), ("round", "mine/round"), ("lost", "mine/gone")]
    text = '[family]\nlabel = "Mine"\n' + "".join(mixture.format(name=name, host=host) for name, host in texts)
    (tmp_path / "mine.toml").write_text(text, encoding="utf-8")
    library = Library(materials_dir(), tmp_path)
    good = library.entry("mine/good").medium
    assert isinstance(good, MixtureMedium)
    assert good.host == library.entry("plastics/polyethylene").medium
    assert library.entry("mine/good").valid_range == good.valid_range
    told = {fault.path.rpartition(": ")[2]: fault.message for fault in library.faults}
    assert told == {
        "round.host": "'mine/round → mine/round' does not end",
        "lost.host": "there is no entry 'mine/gone'",
    }


def test_the_library_is_read_once_until_it_is_forgotten(program_home: Path) -> None:
    """A file that appears later is seen after `forget_library`."""
    assert read_library() is read_library()
    own(program_home / "materials", "mine", ("skin", "Skin", "4.4"))
    assert "mine" not in read_library().families()
    forget_library()
    assert library_entry("mine/skin").own
