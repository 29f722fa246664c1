"""The curves: one quantity over frequency, a curve for each angle and polarization."""

from app.panels.curves.panel import CurvesPanel

__all__ = ["CurvesPanel"]
