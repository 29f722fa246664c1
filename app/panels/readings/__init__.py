"""The readings: one row a marker, one column a curve."""

from app.panels.readings.panel import ReadingsPanel

__all__ = ["ReadingsPanel"]
