"""Material records -> media, with what the library has to say to it.

A material that refers to the library and also names its model has been resolved before: its own constants count
and the library is not asked. Without a model the library supplies what is not given beside the reference.
"""

from collections.abc import Mapping
from dataclasses import replace

from stackcore.errors import Fault, LibraryError
from stackcore.job.records import JobRecord, MaterialRecord, StateRecord
from stackcore.media.base import AbstractMedium, FrequencyRange, Provenance
from stackcore.media.constant import VACUUM
from stackcore.media.library import LibraryEntry, library_entry
from stackcore.media.library_entry import EVERYWHERE
from stackcore.media.models import MODELS
from stackcore.media.models.completing import completed
from stackcore.units import Dimension, measure


def library_model(key: str) -> str:
    """Return the model of a library entry, empty when there is no such entry."""
    if not key:
        return ""
    try:
        return library_entry(key).model
    except LibraryError:
        return ""


def references_of(material: MaterialRecord) -> tuple[tuple[str, str], ...]:
    """Return place and name of each material that the constants of `material` refer to."""
    if not material.constants:
        return ()
    model = MODELS.get(material.model or library_model(material.library))
    return model.references(material.constants) if model is not None else ()


def medium_of(material: MaterialRecord, media: Mapping[str, AbstractMedium] | None = None) -> AbstractMedium:
    """Return the medium a material stands for.

    Parameters
    ----------
    material
        Without faults of its own.
    media
        The other materials of the job by name, for one that is made of them.

    Raises
    ------
    LibraryError
        When it needs a library entry that does not exist, with the nearest match.
    InputError, ValueError
        When its constants do not make a passive medium; `stackcore.media.models.Model.located` says where.
    """
    entry = _entry(material)
    told = (material.valid_range, material.certainty, material.spread, material.note, material.source)
    if entry is not None and not material.constants and not any(told):
        return entry.medium
    constants, name = material.given, material.model
    if entry is not None and (not name or not constants):
        constants, name = completed(constants, entry.constants), entry.model
    model = MODELS[name]
    used = {other: _referred(other, media or {}) for _, other in model.references(constants)} or None
    valid_range, provenance = _known_range(material), material.about_values
    if entry is not None and name == entry.model:
        same = model.build(constants, entry.valid_range, entry.provenance, used) == entry.medium
        if same:  # the library's range, spread and source hold for its own values only
            valid_range, provenance = valid_range or entry.valid_range, _filled(provenance, entry.provenance)
    medium = model.build(constants, valid_range, provenance, used)
    return entry.medium if entry is not None and medium == entry.medium else medium


def _known_range(material: MaterialRecord) -> FrequencyRange | None:
    if material.valid_range is None:
        return None
    lowest, highest = material.valid_range
    return FrequencyRange(lowest.value, highest.value)


def _filled(own: Provenance, other: Provenance) -> Provenance:
    """Return `own` with what it leaves open taken from `other`."""
    return Provenance(
        own.source or other.source,
        own.certainty or other.certainty,
        own.spread or other.spread,
        own.note or other.note,
    )


def _referred(name: str, media: Mapping[str, AbstractMedium]) -> AbstractMedium:
    """Return the medium that a reference names: one of the job, else of the library."""
    if name in media:
        return media[name]
    return VACUUM if name in ("air", "vacuum") else library_entry(name).medium


def _entry(material: MaterialRecord) -> LibraryEntry | None:
    """Return the library entry a material refers to; None when there is none and none is needed."""
    if not material.library:
        return None
    try:
        entry = library_entry(material.library)
    except LibraryError:
        if material.model and material.constants:
            return None
        raise
    if material.model and not material.constants and material.model != entry.model:
        message = f"{material.library!r} has the model {entry.model!r}, not {material.model!r}"
        raise LibraryError([Fault("", message, "a reference without a model, or with that one")])
    return entry


def with_resolved_library(record: JobRecord) -> JobRecord:
    """Return `record` with model, constants, range and source written beside every library reference.

    So a job means the same where the library has moved on. Constants that stand there already stay. Entries that
    a material is made of become materials of the job, called by their key.

    Raises
    ------
    LibraryError
        For a reference to an entry that does not exist and whose values are needed.
    """
    materials = [with_library_values(material) for material in record.materials]
    names = {material.name for material in materials}
    for material in materials:  # which grows while it is walked
        for _, used in references_of(material):
            if "/" in used and used not in names:
                names.add(used)
                materials.append(with_library_values(MaterialRecord(used, library=used)))
    return replace(record, materials=tuple(materials))


def with_library_values(material: MaterialRecord) -> MaterialRecord:
    """Return a material with model, constants and facts of its library entry written beside the reference.

    One that has its model and constants beside it already, or no reference, comes back as it is.

    Raises
    ------
    LibraryError
        For a reference to an entry that does not exist and whose values are needed.
    """
    entry = _entry(material)
    if entry is None or (material.model and material.constants):
        return material
    material = _with_facts(material, entry)
    constants = completed(material.given, entry.constants)
    if material.constants:  # the library's source and range vouch for its own values only
        return replace(material, model=entry.model, constants=constants)
    provenance = _filled(material.about_values, entry.provenance)
    ends = material.valid_range
    if ends is None and MODELS[entry.model].ranged and entry.valid_range != EVERYWHERE:
        known = entry.valid_range
        ends = measure(known.lowest, Dimension.FREQUENCY), measure(known.highest, Dimension.FREQUENCY)
    return replace(
        material,
        model=entry.model,
        constants=constants,
        valid_range=ends,
        source=provenance.source,
        certainty=provenance.certainty,
        spread=provenance.spread,
        note=provenance.note,
    )


def _with_facts(material: MaterialRecord, entry: LibraryEntry) -> MaterialRecord:
    """Return a material with density, ply thickness and states of its entry, where it has none of its own."""
    own = {state.name for state in material.states}
    states = tuple(
        StateRecord(state.name, state.constants, state.source, state.note)
        for state in entry.states
        if state.name not in own
    )
    return replace(
        material,
        density=material.density or entry.density,
        ply_thickness=material.ply_thickness or entry.ply_thickness,
        states=(*material.states, *states),
    )
