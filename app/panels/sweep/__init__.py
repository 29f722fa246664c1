"""The quiet line that says what is computed and shown."""

from app.panels.sweep.panel import SweepPanel

__all__ = ["SweepPanel"]
