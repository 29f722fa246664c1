"""What leaves the plot by the clipboard as text: the numbers as a table."""

from collections.abc import Sequence

import numpy as np

from app.series.curves import Curve
from stackcore.arrays import FloatArray
from stackcore.quantities import quantity_named


def data_table(curves: Sequence[Curve]) -> str:
    """Return curves as text with tabs between columns: full precision, units in the header.

    The first column is the frequency in Hz, then one column a curve and two more for its envelope; a value that is
    infinite, and so not drawn, is written ``inf``.
    """
    if not curves:
        return ""
    columns = [column for curve in curves for column in _columns(curve)]
    lines = ["\t".join(["Frequency, Hz", *(title for title, _ in columns)])]
    table = np.column_stack([curves[0].x, *(values for _, values in columns)])
    lines += ["\t".join(map(repr, row)) for row in table.tolist()]
    return "\n".join(lines) + "\n"


def _columns(curve: Curve) -> list[tuple[str, FloatArray]]:
    """Return title and values of a curve, and of the ends of its envelope."""
    unit = f", {curve.unit}" if curve.unit else ""
    whose = f"{curve.label}, {curve.stack}" if curve.stack else curve.label
    less = f" less {curve.less}" if curve.less else ""
    name = f"{quantity_named(curve.quantity).label} {whose}{less}"
    columns = [(f"{name}{unit}", curve.raw)]
    if curve.low is not None and curve.high is not None:
        columns += [(f"{name}, lowest{unit}", curve.low), (f"{name}, highest{unit}", curve.high)]
    return columns
