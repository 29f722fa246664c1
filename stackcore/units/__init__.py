"""Quantities as text with units: read at the door, SI numbers inside.

``parse_measure`` and ``format_value`` are each other's inverse to the last bit.
"""

from stackcore.units.dimensions import Dimension
from stackcore.units.measure import Measure, degrees_of, format_value, known_units, measure, parse_measure

__all__ = ["Dimension", "Measure", "degrees_of", "format_value", "known_units", "measure", "parse_measure"]
