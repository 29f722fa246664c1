"""A material in one of its named states: wet, hot, aged."""

from collections.abc import Iterator
from dataclasses import replace

from stackcore.errors import Fault, LibraryError
from stackcore.job.inspector import join
from stackcore.job.materials import library_model, with_library_values
from stackcore.job.records import MaterialRecord, StateRecord
from stackcore.media.library import library_entry
from stackcore.media.models import MODELS
from stackcore.media.models.completing import completed


def states_of(material: MaterialRecord) -> tuple[StateRecord, ...]:
    """Return the states of a material: its own, and where it has its values from the library those of the entry.

    An own state takes the place of one of the library that has its name.
    """
    own = {state.name: state for state in material.states}
    if not material.library or (material.model and material.constants):
        return material.states
    try:
        entry = library_entry(material.library)
    except LibraryError:
        return material.states
    known = {
        state.name: StateRecord(state.name, state.constants, state.source, state.note) for state in entry.states
    }
    return tuple({**known, **own}.values())


def in_state(material: MaterialRecord, name: str) -> MaterialRecord:
    """Return a material as it is in a state: its constants with those of the state in their place.

    The loss of ε counts once: a loss tangent of the state takes the place of a loss part, and the other way round.
    A material that has no such state comes back as it is.

    Examples
    --------
    >>> skin = MaterialRecord("skin", model="constant", constants={"permittivity": 4.2 + 0j, "loss_tangent": 0.015},
    ...     states=(StateRecord("wet", {"permittivity": 4.6 + 0j, "loss_tangent": 0.04}),))
    >>> in_state(skin, "wet").loss_tangent
    0.04
    """
    state = next((one for one in states_of(material) if one.name == name), None)
    if state is None:
        return material
    dry = with_library_values(material)
    note = "; ".join(part for part in (f"state {name}", state.note) if part)
    source = state.source or dry.source
    return replace(dry, constants=completed(state.given, dry.given), source=source, note=note)


def state_faults(material: MaterialRecord, path: str) -> Iterator[Fault]:
    """Yield what is wrong with the states that stand in a record."""
    names = [state.name for state in material.states]
    model = MODELS.get(material.model or library_model(material.library))
    for place, state in enumerate(material.states):
        where = join(join(path, "states"), state.name)
        if not state.name.strip():
            yield Fault(where, "the name of the state is empty", "a name, for example wet")
        if state.name in names[:place]:
            yield Fault(where, f"there is another state {state.name!r}", "a name of its own")
        if not state.constants:
            yield Fault(where, "nothing differs in this state", 'a constant, for example "loss_tangent": 0.03')
        if model is not None and state.constants:
            merged = completed(state.given, with_library_values(material).given)
            yield from model.faults(merged, where)
