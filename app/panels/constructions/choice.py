"""What is chosen in the panel of constructions, as a value, and what it gives. No toolkit."""

import math
from dataclasses import dataclass, replace
from typing import Final

from app.document.construction_edits import preview_record
from app.document.library import ALWAYS_DEFINED
from app.panels.material_data.facts import FieldFacts
from stackcore.constructions import CONSTRUCTIONS, Built, Construction, DesignPoint, Option, build, design_point
from stackcore.errors import Fault, InputError, UnitError
from stackcore.job import Job
from stackcore.job.records import SweepRecord
from stackcore.media.library import read_library
from stackcore.units import Dimension, format_value, parse_measure

FREQUENCY: Final = "point.frequency"
ANGLE: Final = "point.angle"
POLARIZATION: Final = "point.polarization"

_FREQUENCY_TIP: Final = "What the rule sizes the construction for; empty follows the middle of the sweep."
_ANGLE_TIP: Final = "Angle of incidence in air that the rule sizes for; empty follows the middle of the sweep."
_SIDE_TIP: Final = "Polarization that is matched, where the rule tells them apart."


@dataclass(frozen=True, slots=True)
class Choosing:
    """What stands in the panel.

    Parameters
    ----------
    key
        Of the construction.
    texts
        As typed or chosen, by the name of the option, `FREQUENCY`, `ANGLE` or `POLARIZATION`; what is not there is
        at its default.
    """

    key: str = next(iter(CONSTRUCTIONS))
    texts: tuple[tuple[str, str], ...] = ()

    @property
    def construction(self) -> Construction:
        """The construction chosen."""
        return CONSTRUCTIONS[self.key]

    def text(self, name: str) -> str:
        """Return what was typed, empty for the default."""
        return dict(self.texts).get(name, "")

    def with_text(self, name: str, text: str) -> "Choosing":
        """Return the choice with another text; an empty one is the default again."""
        kept = {key: old for key, old in self.texts if key != name}
        if text.strip():
            kept[name] = text.strip()
        return replace(self, texts=tuple(kept.items()))

    def with_key(self, key: str) -> "Choosing":
        """Return the choice of another construction; what it is sized for stays, and options it shares."""
        names = {FREQUENCY, ANGLE, POLARIZATION, *(option.name for option in CONSTRUCTIONS[key].options)}
        shared = {option.name: option for option in CONSTRUCTIONS[key].options}
        own = {option.name: option for option in self.construction.options}
        alike = {name for name in names if name not in own or _same_kind(own[name], shared.get(name))}
        return Choosing(key, tuple((name, text) for name, text in self.texts if name in names & alike))


@dataclass(frozen=True, slots=True)
class Outcome:
    """What a choice gives: the construction and a job with it alone for the drawing, or every fault."""

    point: DesignPoint | None
    built: Built | None
    preview: Job | None
    faults: tuple[Fault, ...] = ()


def outcome(choosing: Choosing, job: Job) -> Outcome:
    """Return what the choice gives in `job`."""
    point, faults = _point(choosing, job.sweep)
    options = {option.name for option in choosing.construction.options}
    texts = {name: text for name, text in choosing.texts if name in options}
    try:
        standing = point or design_point(job.sweep)
        built = build(choosing.construction, standing, texts, job.media)
        preview = Job(preview_record(job.record, built))
    except InputError as error:
        return Outcome(point, None, None, (*faults, *error.faults))
    if faults:
        return Outcome(None, None, None, tuple(faults))
    return Outcome(point, built, preview)


def fields_of(choosing: Choosing, job: Job, faults: tuple[Fault, ...]) -> tuple[FieldFacts, ...]:
    """Return the fields of the form: what it is sized for, then the options of the construction."""
    by_place = {fault.path: fault for fault in faults}
    point = design_point(job.sweep)
    frequency = format_value(float(f"{point.frequency:.6g}"), Dimension.FREQUENCY)
    angle = f"{float(f'{math.degrees(point.angle):.4g}'):g} deg"

    side = choosing.text(POLARIZATION) or "TE"

    def typed(name: str, label: str, tip: str, hint: str) -> FieldFacts:
        return FieldFacts(name, label, tip, choosing.text(name), by_place.get(name), hint)

    fields = [
        typed(FREQUENCY, "Sized at", _FREQUENCY_TIP, frequency),
        typed(ANGLE, "at an angle of", _ANGLE_TIP, angle),
        FieldFacts(POLARIZATION, "Matched for", _SIDE_TIP, side, options=("TE", "TM")),
    ]
    for option in choosing.construction.options:
        if option.dimension is None:
            fields.append(_material_field(option, choosing, job))
        else:
            tip = f"{option.label}; empty means {option.default}."
            fields.append(typed(option.name, option.label, tip, option.default))
    return tuple(fields)


def _material_field(option: Option, choosing: Choosing, job: Job) -> FieldFacts:
    """Return the field of a material: those of the job first, then the families that suit."""
    own = [material.name for material in job.materials]
    shipped = read_library()
    families = [family for family in option.families if family in shipped.families()]
    library = [entry.key for family in families for entry in shipped.family(family).entries]
    chosen = choosing.text(option.name) or option.default
    offered = dict.fromkeys((chosen, option.default, *own, *ALWAYS_DEFINED, *library))
    tip = f"What the {option.label.lower()} is made of: a material of the job or of the library."
    return FieldFacts(option.name, option.label, tip, chosen, options=tuple(offered))


def _point(choosing: Choosing, sweep: SweepRecord) -> tuple[DesignPoint | None, list[Fault]]:
    middle, faults = design_point(sweep), []
    frequency, angle = middle.frequency, middle.angle
    try:
        if text := choosing.text(FREQUENCY):
            frequency = parse_measure(text, Dimension.FREQUENCY, default_unit="GHz").value
            DesignPoint(frequency)
    except (UnitError, ValueError) as error:
        faults.append(Fault(FREQUENCY, str(error), "more than 0, for example 9.4 GHz"))
    try:
        if text := choosing.text(ANGLE):
            angle = parse_measure(text, Dimension.ANGLE, default_unit="deg").value
            DesignPoint(middle.frequency, angle)
    except (UnitError, ValueError) as error:
        faults.append(Fault(ANGLE, str(error), "0 deg or more and below 90 deg, for example 45 deg"))
    if faults:
        return None, faults
    return DesignPoint(frequency, angle, "TM" if choosing.text(POLARIZATION) == "TM" else "TE"), faults


def _same_kind(one: Option, other: Option | None) -> bool:
    return other is not None and one.dimension is other.dimension and one.families == other.families
