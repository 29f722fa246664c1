"""Studies: a stack while something is varied, and maps; generators that tell what there is so far.

Every generator does nothing until it is advanced, yields about every 10 ms, and gives up on ``close()``.
"""

from stackcore.studies.curves import VariedResponse, curve_over
from stackcore.studies.maps import MapLevel, map_over
from stackcore.studies.variation import ElementPart, MaterialPart, Variation, variations_of
from stackcore.studies.varying import check_values, varied, varied_stack
from stackcore.studies.worst import CurvePlace, MapPlace, worst, worst_of_curve

__all__ = [
    "CurvePlace",
    "ElementPart",
    "MapLevel",
    "MapPlace",
    "MaterialPart",
    "Variation",
    "VariedResponse",
    "check_values",
    "curve_over",
    "map_over",
    "variations_of",
    "varied",
    "varied_stack",
    "worst",
    "worst_of_curve",
]
