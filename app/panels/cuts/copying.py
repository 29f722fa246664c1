"""What leaves a cut by the clipboard: the numbers as a table."""

import numpy as np

from app.series.cuts import Cut, where_words
from stackcore.quantities import quantity_named


def data_table(cut: Cut, title: str, stack: str) -> str:
    """Return a cut as text with tabs: whose it is, then a column of what is varied and one a curve, full precision.

    A value that is infinite, and so not drawn, is written ``inf``.
    """
    question = cut.question
    axis = question.axis
    label = quantity_named(question.quantity).label
    heads = [f"{label} {curve.label}{f', {curve.unit}' if curve.unit else ''}" for curve in cut.curves]
    about = ", ".join(part for part in (title, stack, where_words(question)) if part)
    table = np.column_stack([axis.numbers(cut.curves[0].x), *(curve.raw for curve in cut.curves)])
    rows = ["\t".join(map(repr, row)) for row in table.tolist()]
    return "\n".join([about, "\t".join([axis.title, *heads]), *rows]) + "\n"
