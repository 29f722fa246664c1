"""Material records -> media, with what the library has to say to it.

A material that refers to the library and also names its model has been resolved before: its own constants count
and the library is not asked. Without a model the library supplies what is not given beside the reference.
"""

from collections.abc import Mapping
from dataclasses import replace
from typing import Any

import numpy as np

from stackcore.errors import Fault, LibraryError
from stackcore.job.checks import JOB_MODELS, given_constants
from stackcore.job.records import JobRecord, MaterialRecord
from stackcore.media.base import AbstractMedium, Provenance
from stackcore.media.library import LibraryEntry, library_entry
from stackcore.media.models import MODELS, Constant


def medium_of(material: MaterialRecord) -> AbstractMedium:
    """Return the medium a material stands for.

    Raises
    ------
    LibraryError
        When it needs a library entry that does not exist, with the nearest match.
    ValueError
        When its constants do not make a passive medium.
    """
    entry = _entry(material)
    constants, model = _constants(material), material.model
    if entry is not None and not constants:
        return entry.medium
    if not model and entry is not None:
        constants, model = _completed(constants, entry), entry.model
    medium = MODELS[model].build(constants, None, Provenance(material.source))
    if entry is not None and _same_constants(medium, entry.medium):
        return entry.medium  # which also knows its range, spread and source
    return medium


def _entry(material: MaterialRecord) -> LibraryEntry | None:
    """Return the library entry a material refers to; None when there is none and none is needed."""
    if not material.library:
        return None
    try:
        entry = library_entry(material.library)
    except LibraryError:
        if material.model and _constants(material):
            return None
        raise
    if material.model and not _constants(material) and material.model != entry.model:
        message = f"{material.library!r} has the model {entry.model!r}, not {material.model!r}"
        raise LibraryError([Fault("", message, "a reference without a model, or with that one")])
    return entry


def _constants(material: MaterialRecord) -> dict[str, Constant]:
    return {name: getattr(material, name) for name in given_constants(material)}


def _completed(given: Mapping[str, Constant], entry: LibraryEntry) -> dict[str, Constant]:
    """Return the constants of `entry` with those `given` in their place, the loss of ε counted once."""
    constants = dict(entry.constants)
    for name in given:
        if name not in MODELS[entry.model].readers:
            raise ValueError(f"{entry.key!r} has the model {entry.model!r}, which has no {name}")
    permittivity = given.get("permittivity")
    if isinstance(permittivity, complex) and permittivity.imag:
        constants.pop("loss_tangent", None)
    stored = constants.get("permittivity")
    if "loss_tangent" in given and isinstance(stored, complex):
        constants["permittivity"] = complex(stored.real)
    return {**constants, **given}


def _same_constants(medium: AbstractMedium, other: AbstractMedium) -> bool:
    """Return whether two media have the same values at every frequency."""
    probe = np.array([1e9])
    if type(medium) is not type(other):
        return False
    one, two = medium.evaluate(probe), other.evaluate(probe)
    return bool((one.permittivity == two.permittivity).all() and (one.permeability == two.permeability).all())


def with_resolved_library(record: JobRecord) -> JobRecord:
    """Return `record` with model, constants and source written beside every library reference.

    So a job means the same where the library has moved on. Constants that stand there already stay; a model that
    a job file cannot spell out stays a reference.

    Raises
    ------
    LibraryError
        For a reference to an entry that does not exist and whose values are needed.
    """
    return replace(record, materials=tuple(_with_library_values(material) for material in record.materials))


def _with_library_values(material: MaterialRecord) -> MaterialRecord:
    entry = _entry(material)
    if entry is None or entry.model not in JOB_MODELS or (material.model and _constants(material)):
        return material
    given = _constants(material)
    constants: dict[str, Any] = dict(_completed(given, entry))
    # The library's source vouches for its own values only.
    source = material.source or ("" if given else entry.provenance.source)
    return replace(material, model=entry.model, source=source, **constants)
