"""What the plot of materials says in words. No toolkit."""

from collections.abc import Sequence

from app.series.material_curves import MaterialCurve, crossover_sentence, reading_sentence
from app.series.material_quantities import CURRENT_RATIO, MATERIAL_QUANTITIES, words_of
from app.series.texts import frequency_text
from app.series.validity import known_text

NOTHING_CHOSEN = (
    "Choose a material in the panel Materials: it will be drawn here over the sweep of the job; several chosen "
    "together are compared."
)


def readings_text(curves: Sequence[MaterialCurve], frequency: float) -> str:
    """Return where conduction takes over, and all of every material at `frequency` in Hz, a line each."""
    if not curves:
        return ""
    lines = [crossover_sentence(curve) for curve in curves if curve.quantity == CURRENT_RATIO]
    lines.append(f"At {frequency_text(frequency)}:")
    lines += [reading_sentence(curve.specimen, frequency) for curve in curves]
    return "\n".join(line for line in lines if line)


def notes_text(curves: Sequence[MaterialCurve]) -> str:
    """Return what to know of the curves: where they are dotted, and what is not drawn."""
    notes = []
    for curve in curves:
        label = curve.specimen.label
        if not curve.held.all():
            notes.append(f"{label} is known {known_text(curve.specimen.medium)}; elsewhere its curve is dotted.")
        if curve.hidden_points == curve.x.size:
            notes.append(f"{label} has no {_quantity(curve)} that can be drawn here.")
        elif curve.hidden_points:
            points = "1 point" if curve.hidden_points == 1 else f"{curve.hidden_points} points"
            notes.append(f"{points} of {label} cannot be drawn on this scale.")
    return "\n".join(notes)


def point_sentence(curve: MaterialCurve, point: int) -> str:
    """Return one point of a curve, with why it is dotted there."""
    row = MATERIAL_QUANTITIES[curve.quantity]
    value = words_of(curve.quantity, float(curve.raw[point]))
    told = f"{frequency_text(float(curve.x[point]))}   {curve.specimen.label}   {row.figure.symbol} {value}"
    if curve.held[point]:
        return told
    return f"{told}   a guess: known {known_text(curve.specimen.medium)}"


def description(curves: Sequence[MaterialCurve]) -> str:
    """Return the plot for those who hear it: what, over what, and each curve at both ends of the sweep."""
    if not curves:
        return NOTHING_CHOSEN
    first = curves[0]
    band = f"from {frequency_text(float(first.x[0]))} to {frequency_text(float(first.x[-1]))}"
    told = [f"{MATERIAL_QUANTITIES[first.quantity].label} {band}."]
    for curve in curves:
        ends = " to ".join(words_of(curve.quantity, float(curve.raw[place])) for place in (0, -1))
        told.append(f"{curve.specimen.label}: {ends}.")
    return " ".join([*told, notes_text(curves).replace("\n", " ")]).strip()


def _quantity(curve: MaterialCurve) -> str:
    return MATERIAL_QUANTITIES[curve.quantity].figure.label.lower()
