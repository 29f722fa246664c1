"""The models a file can name: one table, from which reading, checking, writing, editing and help derive.

A new model is one row; a new kind of constant is one class in `stackcore.media.models.kinds`.
"""

from collections.abc import Mapping
from typing import Final

from stackcore.media.models import dielectrics, others, resonances
from stackcore.media.models.constants import Constant, Terms
from stackcore.media.models.kinds import Choice, Flag, Kind, Number, Quantity, Reference, Relative, Tell
from stackcore.media.models.model import Media, Model
from stackcore.media.models.values import Constants, Value, relative_text, value_text

__all__ = [
    "CONSTANT_NAMES",
    "MODELS",
    "Choice",
    "Constant",
    "Constants",
    "Flag",
    "Kind",
    "Media",
    "Model",
    "Number",
    "Quantity",
    "Reference",
    "Relative",
    "Tell",
    "Terms",
    "Value",
    "relative_text",
    "value_text",
]

MODELS: Final[Mapping[str, Model]] = {
    model.name: model for model in (*dielectrics.MODELS, *resonances.MODELS, *others.MODELS)
}
"""Name of the model in a file -> the model."""

CONSTANT_NAMES: Final = tuple(dict.fromkeys(name for model in MODELS.values() for name in model.names))
"""Every name a constant of some model has."""
