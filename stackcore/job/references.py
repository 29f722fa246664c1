"""Materials made of other materials: which must be built first, and which lead nowhere or back to themselves."""

from collections.abc import Sequence
from typing import Final

from stackcore.errors import Fault, LibraryError
from stackcore.job.inspector import join, near, one_of, shown
from stackcore.job.materials import references_of
from stackcore.job.records import MaterialRecord
from stackcore.media.library import library_entry

ALWAYS_DEFINED: Final = ("air", "vacuum")
"""Materials of every job."""

MOST_NESTED: Final = 8
"""Levels of materials made of materials."""

MOST_PARTS: Final = 500
"""Of one material, counted through all levels: each is worked out at every frequency."""


def reference_faults(materials: Sequence[MaterialRecord]) -> tuple[Fault, ...]:
    """Return a fault for every reference to no material, round in a circle, or too deep."""
    return _ordered(materials)[1]


def building_order(materials: Sequence[MaterialRecord]) -> tuple[MaterialRecord, ...]:
    """Return materials such that each comes behind those it refers to; those in a circle are left out."""
    return _ordered(materials)[0]


def _ordered(materials: Sequence[MaterialRecord]) -> tuple[tuple[MaterialRecord, ...], tuple[Fault, ...]]:
    waiting = {material.name: references_of(material) for material in materials}
    if not any(waiting.values()):
        return tuple(materials), ()
    by_name = {material.name: material for material in materials}
    faults = _unknown(by_name)
    order: list[MaterialRecord] = []
    size: dict[str, tuple[int, int]] = {}
    while ready := [name for name, used in waiting.items() if not any(other in waiting for _, other in used)]:
        for name in ready:
            inner = [size.get(other, (0, 1)) for _, other in waiting.pop(name)]
            depth = 1 + max((levels for levels, _ in inner), default=-1)
            parts = max(1, sum(count for _, count in inner))
            if depth > MOST_NESTED or parts > MOST_PARTS:
                allowed = f"at most {MOST_NESTED} levels and {MOST_PARTS} parts"
                faults.append(
                    Fault(
                        join("materials", name), f"is made of {parts} parts in {depth} levels of materials", allowed
                    )
                )
                depth, parts = 0, 1  # told once, and not again for what is made of it
            size[name] = depth, parts
            order.append(by_name[name])
    return tuple(order), (*faults, *_circles(waiting))


def _unknown(by_name: dict[str, MaterialRecord]) -> list[Fault]:
    known = (*by_name, *ALWAYS_DEFINED)
    faults = []
    for name, material in by_name.items():
        for place, used in references_of(material):
            if used in known:
                continue
            path = f"{join('materials', name)}.{place}"
            if "/" not in used:
                faults.append(Fault(path, f"unknown material {shown(used)}{near(used, known)}", one_of(known)))
                continue
            try:
                library_entry(used)
            except LibraryError as error:
                faults.append(Fault(path, error.faults[0].message, error.faults[0].allowed))
    return faults


def _circles(waiting: dict[str, tuple[tuple[str, str], ...]]) -> list[Fault]:
    """Return one fault for each circle among materials that wait for each other."""
    faults, seen = [], set[str]()
    for start in waiting:
        trail: list[tuple[str, str]] = []
        name = start
        while name not in seen:
            seen.add(name)
            place, following = next(pair for pair in waiting[name] if pair[1] in waiting)
            trail.append((name, place))
            name = following
        names = [one for one, _ in trail]
        if name in names:
            circle = trail[names.index(name) :]
            ring = " → ".join([*(one for one, _ in circle), name])
            path = f"{join('materials', circle[0][0])}.{circle[0][1]}"
            faults.append(
                Fault(path, f"{shown(ring)} leads back to itself", "a material that is not made of this one")
            )
    return faults
