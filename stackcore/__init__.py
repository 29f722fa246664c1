"""Plane waves through flat multilayer walls: the physics of Slabwright, usable without its window.

import numpy as np
import stackcore as sc

job = sc.read_job("cover.slabjob")
response = sc.solve(job.stacks[0], frequency=np.linspace(8e9, 12e9, 401), angle=np.radians([0, 30, 45]))
response.transmittance  # (401, 3, 2): frequency, angle, polarization (TE, TM)
"""

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
