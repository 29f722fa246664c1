"""Curves under conditions, beside those of other stacks, and as differences."""

from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from app.document.view import ViewState
from app.series.cases import Case, Responses, conditions_shown
from app.series.curves import Curve, curves_of, worst_point
from app.series.shown import shown
from stackcore.arrays import FloatArray
from stackcore.job.records import JobRecord
from stackcore.propagation import Response


@dataclass(frozen=True, slots=True)
class Scene:
    """What the curves are drawn from.

    Parameters
    ----------
    record
        The job, for the names of its stacks and conditions.
    stack
        Index of the stack in hand.
    response
        Of the stack in hand as it is built.
    others
        Of the cases of `app.series.cases.cases_of`; one that is missing is not drawn.
    """

    record: JobRecord
    stack: int
    response: Response
    others: Responses

    def name(self, stack: int) -> str:
        """Return the name of a stack."""
        return self.record.stacks[stack].name


def curves_in_hand(scene: Scene, view: ViewState, *, unit_from: FloatArray | None = None) -> tuple[Curve, ...]:
    """Return the curves of the stack in hand, with its envelope over the conditions, less another stack's.

    A difference is taken like for like: under a condition from the other stack under the same condition.

    Parameters
    ----------
    unit_from
        Frequencies in Hz the unit of a delay fits, by default those of the response.
    """
    plain = _curves(scene, Case(scene.stack), view, unit_from)
    names = [name for name in conditions_shown(scene.record, view) if Case(scene.stack, name) in scene.others]
    if not names:
        return plain
    found = [_curves(scene, Case(scene.stack, name), view, unit_from) for name in names]
    return tuple(_with_envelope(curve, names, same) for curve, *same in zip(plain, *found, strict=True))


def curves_beside(scene: Scene, view: ViewState) -> tuple[Curve, ...]:
    """Return the curves of the other stacks that are drawn with those of the one in hand, stack by stack."""
    places = {one.name: place for place, one in enumerate(scene.record.stacks)}
    cases = [Case(places[name]) for name in view.beside if name in places and places[name] != scene.stack]
    return tuple(
        replace(curve, stack=scene.name(case.stack))
        for case in cases
        if case in scene.others
        for curve in _curves(scene, case, view, scene.response.frequency)
    )


def _curves(scene: Scene, case: Case, view: ViewState, unit_from: FloatArray | None) -> tuple[Curve, ...]:
    curves = curves_of(_response(scene, case), view, unit_from=unit_from)
    names = [one.name for one in scene.record.stacks]
    if view.less not in names or (case.stack == scene.stack and view.less == names[scene.stack]):
        return curves
    reference = Case(names.index(view.less), case.condition)
    if reference not in scene.others and reference != Case(scene.stack):
        return curves
    taken = curves_of(_response(scene, reference), view, unit_from=unit_from)
    return tuple(_less(one, other, view.less) for one, other in zip(curves, taken, strict=True))


def _response(scene: Scene, case: Case) -> Response:
    return scene.response if case == Case(scene.stack) else scene.others[case]


def _less(curve: Curve, other: Curve, name: str) -> Curve:
    """Return the difference of two curves; where both are infinite there is none."""
    raw = np.full(curve.raw.shape, np.nan)
    known = np.isfinite(curve.raw) | np.isfinite(other.raw)
    np.subtract(curve.raw, other.raw, out=raw, where=known)
    if shown(curve.quantity).wraps:
        raw = 180.0 - (180.0 - raw) % 360.0
    finite = np.isfinite(raw)
    return replace(
        curve,
        raw=raw,
        y=np.where(finite, raw, np.nan),
        worst=None,
        worst_infinite=None,
        hidden_points=int(np.count_nonzero(~finite)),
        held=curve.held & other.held,
        doubts=(*curve.doubts, *(doubt for doubt in other.doubts if doubt not in curve.doubts)),
        less=name,
    )


def _with_envelope(curve: Curve, names: Sequence[str], under: Sequence[Curve]) -> Curve:
    """Return a curve with the ends of its values over the conditions, and the worst point of all of them."""
    values = np.stack([curve.y, *(one.y for one in under)])
    known = np.asarray(np.isfinite(values).all(axis=0))
    low = np.min(values, axis=0, where=known[None], initial=np.inf)
    high = np.max(values, axis=0, where=known[None], initial=-np.inf)
    ends = {"low": np.where(known, low, np.nan), "high": np.where(known, high, np.nan)}
    if curve.less:
        return replace(curve, low=ends["low"], high=ends["high"])
    # What each case is worst at, all on one line: the first of the infinitely bad, else the worst of the finite.
    x = np.tile(curve.x, len(values))
    raw = np.concatenate([curve.raw, *(one.raw for one in under)])
    worst, infinite = worst_point(curve.quantity, x, raw)
    end = shown(curve.quantity).worst
    worst_in = ""
    if end is not None and not np.isnan(raw).all():
        badness = np.where(np.isnan(raw), -np.inf, raw if end == "high" else -raw)
        worst_in = ("", *names)[int(np.argmax(badness)) // len(curve.x)]
    return replace(
        curve,
        low=ends["low"],
        high=ends["high"],
        worst=worst,
        worst_infinite=infinite,
        worst_in=worst_in,
    )
