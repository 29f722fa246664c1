"""What leaves the plot by the clipboard as text: the numbers as a table."""

from collections.abc import Sequence

import numpy as np

from app.series.curves import Curve
from stackcore.quantities import quantity_named


def data_table(curves: Sequence[Curve]) -> str:
    """Return curves as text with tabs between columns: full precision, units in the header.

    The first column is the frequency in Hz, then one column a curve; a value that is infinite, and so not
    drawn, is written ``inf``.
    """
    if not curves:
        return ""
    titles = [
        f"{quantity_named(curve.quantity).label} {curve.label}{f', {curve.unit}' if curve.unit else ''}"
        for curve in curves
    ]
    lines = ["\t".join(["Frequency, Hz", *titles])]
    table = np.column_stack([curves[0].x, *(curve.raw for curve in curves)])
    lines += ["\t".join(map(repr, row)) for row in table.tolist()]
    return "\n".join(lines) + "\n"
