"""Plane waves through flat multilayer walls: the physics of Slabwright, usable without its window.

import numpy as np
import stackcore as sc

job = sc.read_job("cover.slabjob")
response = sc.solve(job.stacks[0], frequency=np.linspace(8e9, 12e9, 401), angle=np.radians([0, 30, 45]))
response.transmittance  # (401, 3, 2): frequency, angle, polarization (TE, TM)
"""

import importlib
from typing import TYPE_CHECKING, Final

if TYPE_CHECKING:
    from stackcore.conventions import CONVENTIONS
    from stackcore.errors import Fault, InputError, JobError, LibraryError, SlabwrightError, StackError, UnitError
    from stackcore.job import Job, read_job, write_job
    from stackcore.media.base import AbstractMedium, Constitutive, FrequencyRange, Provenance
    from stackcore.media.conductor import ConductorMedium
    from stackcore.media.constant import VACUUM, ConstantMedium
    from stackcore.polarizations import CIRCULAR, TE, TM, Polarization, polarization, tilted
    from stackcore.propagation import Response, solve
    from stackcore.quantities import QUANTITIES, ElementAbsorptance, Quantity
    from stackcore.sheets.base import AbstractSheet
    from stackcore.sheets.series import SeriesSheet
    from stackcore.stack import METAL, Layer, SheetPlacement, Stack

_HOMES: Final = {
    "stackcore.conventions": ("CONVENTIONS",),
    "stackcore.errors": (
        "Fault",
        "InputError",
        "JobError",
        "LibraryError",
        "SlabwrightError",
        "StackError",
        "UnitError",
    ),
    "stackcore.job": ("Job", "read_job", "write_job"),
    "stackcore.media.base": ("AbstractMedium", "Constitutive", "FrequencyRange", "Provenance"),
    "stackcore.media.conductor": ("ConductorMedium",),
    "stackcore.media.constant": ("VACUUM", "ConstantMedium"),
    "stackcore.polarizations": ("CIRCULAR", "TE", "TM", "Polarization", "polarization", "tilted"),
    "stackcore.propagation": ("Response", "solve"),
    "stackcore.quantities": ("QUANTITIES", "ElementAbsorptance", "Quantity"),
    "stackcore.sheets.base": ("AbstractSheet",),
    "stackcore.sheets.series": ("SeriesSheet",),
    "stackcore.stack": ("METAL", "Layer", "SheetPlacement", "Stack"),
}
"""Module -> public names in it. Each is imported when it is first used: the command line says what is wrong with
its arguments, and helps, without loading the solver."""

__all__ = [
    "CIRCULAR",
    "CONVENTIONS",
    "METAL",
    "QUANTITIES",
    "TE",
    "TM",
    "VACUUM",
    "AbstractMedium",
    "AbstractSheet",
    "ConductorMedium",
    "ConstantMedium",
    "Constitutive",
    "ElementAbsorptance",
    "Fault",
    "FrequencyRange",
    "InputError",
    "Job",
    "JobError",
    "Layer",
    "LibraryError",
    "Polarization",
    "Provenance",
    "Quantity",
    "Response",
    "SeriesSheet",
    "SheetPlacement",
    "SlabwrightError",
    "Stack",
    "StackError",
    "UnitError",
    "polarization",
    "read_job",
    "solve",
    "tilted",
    "write_job",
]


def __getattr__(name: str) -> object:
    """Return a public name from the module it lives in."""
    for module, names in _HOMES.items():
        if name in names:
            value: object = getattr(importlib.import_module(module), name)
            globals()[name] = value
            return value
    raise AttributeError(f"module {__name__!r} has no attribute {name!r}")


def __dir__() -> list[str]:
    return sorted({*globals(), *__all__})
