"""What leaves the plot by the clipboard: the numbers as a table, and the plot as a picture."""

from collections.abc import Sequence

import numpy as np
from PySide6.QtCore import QBuffer, QByteArray, QIODevice, QMimeData
from PySide6.QtGui import QImage, QImageWriter

from app.series.curves import Curve
from stackcore.quantities import QUANTITIES


def data_table(curves: Sequence[Curve]) -> str:
    """Return curves as text with tabs between columns: full precision, units in the header.

    The first column is the frequency in Hz, then one column a curve; a value that is infinite, and so not
    drawn, is written ``inf``.
    """
    if not curves:
        return ""
    titles = [
        f"{QUANTITIES[curve.quantity].label} {curve.label}{f', {curve.unit}' if curve.unit else ''}"
        for curve in curves
    ]
    lines = ["\t".join(["Frequency, Hz", *titles])]
    table = np.column_stack([curves[0].x, *(curve.raw for curve in curves)])
    lines += ["\t".join(map(repr, row)) for row in table.tolist()]
    return "\n".join(lines) + "\n"


def picture_data(image: QImage, svg: QByteArray) -> QMimeData:
    """Return a picture for the clipboard, in pixels and as a drawing."""
    data = QMimeData()
    data.setImageData(image)
    if not svg.isEmpty():
        data.setData("image/svg+xml", svg)
    png = QBuffer()
    png.open(QIODevice.OpenModeFlag.WriteOnly)
    QImageWriter(png, QByteArray(b"png")).write(image)
    data.setData("image/png", png.data())
    return data
