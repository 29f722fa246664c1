"""The job as it is written: frozen records that keep every text as typed beside its SI value.

A record is what a person edits and a file stores. `stackcore.job.resolve` turns records into the media and
stacks that the solver takes; nothing else knows both sides.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

import numpy as np

from stackcore.media.base import FloatArray, Provenance
from stackcore.media.models import Constants, Value
from stackcore.units import Measure, degrees_of

Spacing = Literal["linear", "log"]


@dataclass(frozen=True, slots=True)
class StateRecord:
    """A named state of a material, such as wet or hot: the constants that differ in it.

    Parameters
    ----------
    name
        No other state of the material has it; conditions refer to it.
    constants
        Of the material's own model; they take the place of the material's.
    source, note
        Where they come from, and what else to know.
    """

    name: str
    constants: Mapping[str, Value] = Constants()
    source: str = ""
    note: str = ""

    def __post_init__(self) -> None:
        if not isinstance(self.constants, Constants):
            object.__setattr__(self, "constants", Constants(self.constants))

    @property
    def given(self) -> Constants:
        """The constants as the frozen mapping they are kept in."""
        assert isinstance(self.constants, Constants)
        return self.constants


@dataclass(frozen=True, slots=True)
class MaterialRecord:
    """One material of a job: a model with constants, or a reference into the library, or both.

    Parameters
    ----------
    name
        Key in the job's ``materials``; what layers refer to.
    label
        Name for people; empty means `name`.
    model
        A name of `stackcore.media.models.MODELS`; empty only when `library` gives everything.
    library
        ``family/name`` of a library entry, or empty. When constants stand beside it, they count.
    constants
        Those of the model, by name, as given; any mapping is taken.
    source
        Where the numbers come from.
    valid_range
        Lowest and highest frequency at which they hold, or None.
    certainty
        How they are known: see `stackcore.media.base.Provenance`.
    spread
        Relative spread in production by name of the constant.
    note
        Anything else a user must know.
    density
        Mass by volume, or None.
    price
        Of a kilogram, in whatever currency the user counts in, or None.
    ply_thickness
        Of one cured ply, for what is built up of plies, or None.
    states
        Named states in which constants differ.
    """

    name: str
    label: str = ""
    model: str = ""
    library: str = ""
    constants: Mapping[str, Value] = Constants()
    source: str = ""
    valid_range: tuple[Measure, Measure] | None = None
    certainty: str = ""
    spread: tuple[tuple[str, float], ...] = ()
    note: str = ""
    density: Measure | None = None
    price: float | None = None
    ply_thickness: Measure | None = None
    states: tuple[StateRecord, ...] = ()

    def __post_init__(self) -> None:
        if not isinstance(self.constants, Constants):
            object.__setattr__(self, "constants", Constants(self.constants))

    def state(self, name: str) -> StateRecord | None:
        """Return the state called `name`, or None."""
        return next((state for state in self.states if state.name == name), None)

    @property
    def given(self) -> Constants:
        """The constants as the frozen mapping they are kept in."""
        assert isinstance(self.constants, Constants)
        return self.constants

    @property
    def permittivity(self) -> complex | None:
        """ε′ − jε″ with the loss part as given, or None; of some models a real number."""
        value = self.constants.get("permittivity")
        return complex(value) if isinstance(value, complex | float | int) else None

    @property
    def permeability(self) -> complex | None:
        """μ′ − jμ″, or None."""
        value = self.constants.get("permeability")
        return complex(value) if isinstance(value, complex | float | int) else None

    @property
    def loss_tangent(self) -> float | None:
        """ε″/ε′, or None when the loss is part of `permittivity`."""
        value = self.constants.get("loss_tangent")
        return float(value) if isinstance(value, float | int) else None

    @property
    def conductivity(self) -> Measure | None:
        """σ, or None."""
        value = self.constants.get("conductivity")
        return value if isinstance(value, Measure) else None

    @property
    def about_values(self) -> Provenance:
        """Source, certainty, spread and note together."""
        return Provenance(self.source, self.certainty, self.spread, self.note)


@dataclass(frozen=True, slots=True)
class LayerRecord:
    """A layer: the name of its material and its thickness.

    Parameters
    ----------
    material
        Name of a material of the job.
    thickness
        Its text may count plies, ``6 ply``; the value is then so many times the ply of the material.
    enabled
        Whether it is computed; one that is not stays in the list.
    locked
        Whether its thickness is held: it cannot be dragged, and refining leaves it.
    """

    material: str
    thickness: Measure
    enabled: bool = True
    locked: bool = False


@dataclass(frozen=True, slots=True)
class SheetRecord:
    """A sheet without thickness in the computation.

    Parameters
    ----------
    kind
        ``series``: those of its three parts that are present, in series. ``film``: a conducting film much thinner
        than its skin depth, of resistance 1/(σd).
    resistance, inductance, capacitance
        Of ``series``, per square.
    conductivity, thickness
        Of ``film``.
    enabled, locked
        As of `LayerRecord`.
    """

    kind: str = "series"
    resistance: Measure | None = None
    inductance: Measure | None = None
    capacitance: Measure | None = None
    conductivity: Measure | None = None
    thickness: Measure | None = None
    enabled: bool = True
    locked: bool = False


ElementRecord = LayerRecord | SheetRecord


@dataclass(frozen=True, slots=True)
class Group:
    """Neighbouring elements that are repeated as a whole: rows `first` to `last`, both included."""

    first: int
    last: int
    repeat: int


@dataclass(frozen=True, slots=True)
class StackRecord:
    """A named stack.

    Parameters
    ----------
    name
        No other stack of the job has it.
    elements
        From front to back, each once, also those of groups.
    front, back
        Names of materials; `back` may be ``metal``.
    groups
        Parts of `elements` that are repeated, in their order; none overlap.
    """

    name: str
    elements: tuple[ElementRecord, ...] = ()
    front: str = "air"
    back: str = "air"
    groups: tuple[Group, ...] = ()


@dataclass(frozen=True, slots=True)
class ConditionRecord:
    """What is different in rain, in heat or after a repaint, without an edit of any stack.

    Parameters
    ----------
    name
        No other condition of the job has it.
    front, back
        Elements added before the first and behind the last of every stack.
    materials
        Name of a material -> name of the one that takes its place.
    states
        Every material that has one of these states is in it, the first that it has.
    thickness_factors
        Name of a material -> factor of the thickness of all its layers.
    note
        Anything a user must know.
    """

    name: str
    front: tuple[ElementRecord, ...] = ()
    back: tuple[ElementRecord, ...] = ()
    materials: tuple[tuple[str, str], ...] = ()
    states: tuple[str, ...] = ()
    thickness_factors: tuple[tuple[str, float], ...] = ()
    note: str = ""


@dataclass(frozen=True, slots=True)
class FrequencyGrid:
    """Evenly spaced frequencies, linear or logarithmic, both ends included."""

    start: Measure
    stop: Measure
    points: int
    spacing: Spacing = "linear"

    def values(self) -> FloatArray:
        """Return the frequencies in Hz; the ends are exactly the ones given."""
        if self.points == 1:
            return np.array([self.start.value])
        make = np.geomspace if self.spacing == "log" else np.linspace
        grid: FloatArray = make(self.start.value, self.stop.value, self.points)
        return grid


@dataclass(frozen=True, slots=True)
class AngleGrid:
    """Evenly spaced angles of incidence, both ends included."""

    start: Measure
    stop: Measure
    points: int

    def values(self) -> FloatArray:
        """Return the angles in rad; the ends are exactly the ones given.

        The steps are even in degrees, so that those between 0° and 60° at 7 points are 10°, 20° and so on, to the
        last digit.
        """
        if self.points == 1:
            return np.array([self.start.value])
        ends = (degrees_of(self.start.value), degrees_of(self.stop.value))
        grid: FloatArray = np.radians(np.linspace(*ends, self.points))
        grid[[0, -1]] = self.start.value, self.stop.value
        return grid


@dataclass(frozen=True, slots=True)
class SweepRecord:
    """What is computed: frequencies and angles, each a grid or a list."""

    frequency: FrequencyGrid | tuple[Measure, ...]
    angle: AngleGrid | tuple[Measure, ...]

    def frequencies(self) -> FloatArray:
        """Return the frequencies in Hz."""
        if isinstance(self.frequency, FrequencyGrid):
            return self.frequency.values()
        return np.array([measure.value for measure in self.frequency])

    def angles(self) -> FloatArray:
        """Return the angles of incidence in rad."""
        if isinstance(self.angle, AngleGrid):
            return self.angle.values()
        return np.array([measure.value for measure in self.angle])


@dataclass(frozen=True, slots=True)
class JobRecord:
    """Everything a job file holds, in its order."""

    title: str
    stacks: tuple[StackRecord, ...]
    sweep: SweepRecord
    materials: tuple[MaterialRecord, ...] = ()
    notes: str = ""
    conditions: tuple[ConditionRecord, ...] = ()

    def condition(self, name: str) -> ConditionRecord | None:
        """Return the condition called `name`, or None."""
        return next((record for record in self.conditions if record.name == name), None)

    def material(self, name: str) -> MaterialRecord | None:
        """Return the material called `name`, or None."""
        return next((record for record in self.materials if record.name == name), None)
