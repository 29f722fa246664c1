"""Keeping a material of a job in the user's own library."""

import re
from pathlib import Path
from typing import Final

from stackcore.errors import Fault, LibraryError
from stackcore.job.encode import fact_members
from stackcore.job.materials import with_resolved_library
from stackcore.job.records import JobRecord, MaterialRecord, SweepRecord
from stackcore.job.replacing import replacing
from stackcore.media.base import Provenance
from stackcore.media.library import forget_library, own_materials_dir, read_library
from stackcore.media.library_file import parse_family
from stackcore.media.library_text import entry_text, toml_text
from stackcore.media.models import MODELS
from stackcore.units import Dimension, parse_measure

_NAME: Final = re.compile(r"[a-z0-9]+(-[a-z0-9]+)*")
_ALL: Final = tuple(parse_measure(end, Dimension.FREQUENCY) for end in ("1 Hz", "1 PHz"))


def keep_material(material: MaterialRecord, key: str, folder: Path | None = None) -> Path:
    """Write a material into the user's library as the entry `key`; return the file that was written.

    A key that the program has as well takes its place from then on. What a library entry must say and the material
    does not is said honestly: source not stated, common practice, range not stated, spread of 0.

    Parameters
    ----------
    material
        Without faults; a reference into the library is written with its values.
    key
        ``family/name``; small letters, digits and hyphens.
    folder
        The user's folder; None takes `stackcore.media.library.own_materials_dir`.

    Raises
    ------
    LibraryError
        For a key that is none or that the user has already, a material made of others of the job, or a file that
        has faults; the file is left as it is.
    OSError
        When the file cannot be written.
    """
    folder = folder or own_materials_dir()
    family, _, name = key.partition("/")
    if not (_NAME.fullmatch(family) and _NAME.fullmatch(name)):
        raise LibraryError([Fault("", f"{key!r} is no key", "family/name in small letters, digits and hyphens")])
    path = folder / f"{family}.toml"
    before = path.read_bytes() if path.exists() else _head(family).encode("utf-8")
    after = before.rstrip(b"\n") + b"\n\n" + _entry(material, name).encode("utf-8")
    if faults := parse_family(family, after, str(path)).faults:
        raise LibraryError(faults)
    folder.mkdir(parents=True, exist_ok=True)
    with replacing(path) as file:
        file.write(after)
    forget_library()
    return path


def _head(family: str) -> str:
    library = read_library()
    known = family in library.families()
    label = library.family(family).label if known else family.replace("-", " ").capitalize()
    return f"[family]\nlabel = {toml_text(label)}\n"


def _entry(material: MaterialRecord, name: str) -> str:
    alone = JobRecord("", (), SweepRecord((), ()), (material,))
    shown = with_resolved_library(alone).materials[0]
    model = MODELS[shown.model]
    for place, used in model.references(shown.constants):
        if "/" not in used:
            told = f"the material is made of {used!r} of this job"
            raise LibraryError([Fault(place, told, "materials of the library, family/name")])
    spread = {one.name: 0.0 for one in model.constants if one.varies and one.name in shown.constants}
    told_spread = tuple({**spread, **dict(shown.spread)}.items())
    note, ends = shown.note, shown.valid_range
    if ends is None and model.ranged and not model.nested:
        ends, note = (_ALL[0], _ALL[1]), f"{note} Range not stated.".strip()
    certainty = shown.certainty or "common practice"
    provenance = Provenance(shown.source or "Not stated", certainty, told_spread, note)
    return entry_text(
        name, shown.label or shown.name, shown.model, shown.constants, ends, provenance, _library_facts(shown)
    )


def _library_facts(material: MaterialRecord) -> dict[str, object]:
    """Return what the library keeps of the facts: all but the price, which is the job's; numbers with units."""
    units = {"density": "kg/m3", "ply_thickness": "m"}
    written = {key: value for key, value in fact_members(material).items() if key != "price"}
    return {
        key: f"{value} {units[key]}" if key in units and not isinstance(value, str) else value
        for key, value in written.items()
    }
