"""Walls as they are really built, sized for a band and an angle by closed formulas.

A construction is a recipe: what it is, what can be chosen, and how bonds, paint and coats belong to it. `build`
gives elements for a stack and the rule that sized them, in words with its numbers. The result is a first cut for
the engineer to refine, not a design that is done.
"""

from stackcore.constructions.construction import (
    Built,
    Chosen,
    Construction,
    DesignPoint,
    Option,
    build,
    design_point,
)
from stackcore.constructions.table import CONSTRUCTIONS

__all__ = [
    "CONSTRUCTIONS",
    "Built",
    "Chosen",
    "Construction",
    "DesignPoint",
    "Option",
    "build",
    "design_point",
]
