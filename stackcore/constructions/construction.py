"""What a construction is, what can be chosen of it, and what comes out."""

import math
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Final, Literal

import numpy as np

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.errors import Fault, InputError, LibraryError, UnitError, nearest
from stackcore.job.records import ElementRecord, FrequencyGrid, SweepRecord
from stackcore.media.base import AbstractMedium
from stackcore.media.constant import VACUUM
from stackcore.media.library import library_entry
from stackcore.units import Dimension, Measure, format_value, parse_measure

Polarization = Literal["TE", "TM"]


@dataclass(frozen=True, slots=True)
class DesignPoint:
    """What a construction is sized for.

    Parameters
    ----------
    frequency
        In Hz, more than 0.
    angle
        Of incidence in air, rad, 0 or more and below π/2.
    polarization
        ``TE`` or ``TM``, where the rule tells them apart.

    Raises
    ------
    ValueError
        For a frequency or an angle outside these.

    Examples
    --------
    >>> round(DesignPoint(10e9).wavelength * 1e3, 2)
    29.98
    """

    frequency: float
    angle: float = 0.0
    polarization: Polarization = "TE"

    def __post_init__(self) -> None:
        if not (math.isfinite(self.frequency) and self.frequency > 0):
            raise ValueError(f"frequency {self.frequency} Hz must be more than 0")
        if not 0 <= self.angle < math.pi / 2:
            raise ValueError(f"angle {self.angle} rad must be 0 or more and below 90 degrees")

    @property
    def wavelength(self) -> float:
        """Wavelength in vacuum, m."""
        return SPEED_OF_LIGHT / self.frequency

    @property
    def words(self) -> str:
        """Frequency and angle for a sentence: ``9.4 GHz and 55 deg``."""
        frequency = format_value(float(f"{self.frequency:.6g}"), Dimension.FREQUENCY)
        return f"{frequency} and {float(f'{math.degrees(self.angle):.4g}'):g} deg"


def design_point(sweep: SweepRecord) -> DesignPoint:
    """Return the middle of a sweep's band and of its angles: where a first cut is best begun.

    A half-wave wall for a range of angles is best sized below the largest (common practice); the band's middle is
    the geometric one where the band is swept by ratio.
    """
    frequencies, angles = sweep.frequencies(), sweep.angles()
    low, high = float(frequencies.min()), float(frequencies.max())
    by_ratio = isinstance(sweep.frequency, FrequencyGrid) and sweep.frequency.spacing == "log"
    middle = math.sqrt(low) * math.sqrt(high) if by_ratio else (low + high) / 2
    return DesignPoint(middle, float(angles.min() + angles.max()) / 2)


@dataclass(frozen=True, slots=True)
class Option:
    """Something that can be chosen of a construction.

    Parameters
    ----------
    name
        Key, in `Chosen`.
    label
        Words for people.
    default
        Text as it would be typed: ``0.15 mm``, ``377 ohm/sq``, ``2``, or the key of a library entry.
    dimension
        Of the value; None for a material.
    families
        Families of the library that suit, first those meant first; for a material.
    whole
        Whether only whole numbers are taken.
    least, most
        Limits of the value in SI; both allowed.
    """

    name: str
    label: str
    default: str
    dimension: Dimension | None = None
    families: tuple[str, ...] = ()
    whole: bool = False
    least: float = 0.0
    most: float = math.inf


class Chosen:
    """What was chosen: values by the names of the options, materials by library key or by a name of the job."""

    def __init__(
        self,
        values: Mapping[str, Measure],
        materials: Mapping[str, str],
        media: Callable[[str], AbstractMedium],
    ) -> None:
        self._values, self._materials, self._media = dict(values), dict(materials), media

    def value(self, name: str) -> float:
        """Return a value in SI."""
        return self._values[name].value

    def measure(self, name: str) -> Measure:
        """Return a value with its text as typed."""
        return self._values[name]

    def count(self, name: str) -> int:
        """Return a whole number."""
        return round(self._values[name].value)

    def material(self, name: str) -> str:
        """Return what a layer refers to."""
        return self._materials[name]

    def permittivity(self, name: str, point: DesignPoint) -> complex:
        """Return ε′ − jε″ of a material at the design frequency."""
        medium = self._media(self._materials[name])
        return complex(medium.evaluate(np.array([point.frequency])).permittivity[0])

    def medium(self, name: str) -> AbstractMedium:
        """Return the medium of a material."""
        return self._media(self._materials[name])


@dataclass(frozen=True, slots=True)
class Built:
    """What a construction gives.

    Parameters
    ----------
    elements
        From the front to the back; a layer names its material by library key or by its name in the job.
    rule
        The rule that sized it, with its numbers, in one or two sentences.
    source
        Where the rule comes from.
    back
        What stands behind when the construction needs it, such as ``metal``; empty leaves it.
    cautions
        What to mind before anybody is put at risk or an order is written.
    """

    elements: tuple[ElementRecord, ...]
    rule: str
    source: str
    back: str = ""
    cautions: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True, eq=False)
class Construction:
    """A recipe of the table `CONSTRUCTIONS`.

    Parameters
    ----------
    key, label
        Its name in files and for people.
    about
        One sentence on what it is and what it is for.
    options
        What can be chosen, in the order of a form.
    make
        Builds it from a design point and what was chosen; may raise InputError.
    """

    key: str
    label: str
    about: str
    options: tuple[Option, ...]
    make: Callable[[DesignPoint, Chosen], Built] = field(repr=False)

    def option(self, name: str) -> Option | None:
        """Return the option called `name`, or None."""
        return next((option for option in self.options if option.name == name), None)


_NUMBER: Final = "a number"


def build(
    construction: Construction,
    point: DesignPoint,
    given: Mapping[str, str] | None = None,
    media: Mapping[str, AbstractMedium] | None = None,
) -> Built:
    """Return the elements of a construction.

    Parameters
    ----------
    construction
        A row of `CONSTRUCTIONS`.
    point
        What it is sized for.
    given
        Texts by the name of the option; the default stands for what is left out.
    media
        Materials of the job by name; what is not there is looked up in the library.

    Raises
    ------
    InputError
        With every fault at once: an option that does not exist, a text that is no value or outside its limits, a
        material that is neither in `media` nor in the library, and dimensions that leave no room.

    Examples
    --------
    >>> from stackcore.constructions import CONSTRUCTIONS
    >>> point = DesignPoint(10e9)
    >>> built = build(CONSTRUCTIONS["sheet-absorber"], point, {"spacer": "air"})
    >>> built.back, len(built.elements)
    ('metal', 2)
    """
    given, media = dict(given or {}), dict(media or {})
    faults: list[Fault] = []
    names = [option.name for option in construction.options]
    for name in given:
        if name not in names:
            faults.append(Fault(name, f"there is no option {name!r}{nearest(name, names)}", ", ".join(names)))
    values: dict[str, Measure] = {}
    materials: dict[str, str] = {}
    for option in construction.options:
        text = given.get(option.name, option.default).strip()
        try:
            if option.dimension is None:
                _medium(text, media)
                materials[option.name] = text
            else:
                values[option.name] = _value(option, text)
        except LibraryError as error:
            faults += [Fault(option.name, fault.message, fault.allowed) for fault in error.faults]
        except (UnitError, ValueError) as error:
            faults.append(Fault(option.name, str(error), _allowed(option)))
    if faults:
        raise InputError(faults)
    return construction.make(point, Chosen(values, materials, lambda name: _medium(name, media)))


def no_room(name: str, message: str, allowed: str) -> InputError:
    """Return the error of a choice that leaves no room for the rest."""
    return InputError([Fault(name, message, allowed)])


def _medium(name: str, media: Mapping[str, AbstractMedium]) -> AbstractMedium:
    if name in media:
        return media[name]
    return VACUUM if name in ("air", "vacuum") else library_entry(name).medium


def _value(option: Option, text: str) -> Measure:
    assert option.dimension is not None
    value = parse_measure(text, option.dimension)
    if not option.least <= value.value <= option.most:
        raise ValueError(f"{text!r} is out of range")
    if option.whole and value.value != round(value.value):
        raise ValueError(f"{text!r} is not a whole number")
    return value


def _allowed(option: Option) -> str:
    assert option.dimension is not None
    low, high = (_shown(end, option.dimension) for end in (option.least, option.most))
    limits = f"{low} or more" if math.isinf(option.most) else f"{low} to {high}"
    return f"{limits}; for example {option.default}"


def _shown(value: float, dimension: Dimension) -> str:
    return "no limit" if math.isinf(value) else format_value(value, dimension)
