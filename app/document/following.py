"""What is looked at follows the names of stacks and conditions: renamed with them, and gone with them."""

from collections.abc import Sequence
from dataclasses import replace

from app.document.view import ViewState
from stackcore.job.records import JobRecord


def following(state: ViewState, before: JobRecord, after: JobRecord) -> ViewState:
    """Return the view after the stacks and conditions of a job have changed from `before` to `after`."""
    stacks = _now([one.name for one in before.stacks], [one.name for one in after.stacks])
    conditions = _now([one.name for one in before.conditions], [one.name for one in after.conditions])
    return replace(
        state,
        conditions=_kept(state.conditions, conditions),
        beside=_kept(state.beside, stacks),
        less=stacks.get(state.less, ""),
    )


def _kept(names: Sequence[str], now: dict[str, str]) -> tuple[str, ...]:
    return tuple(dict.fromkeys(now[name] for name in names if name in now))


def _now(before: Sequence[str], after: Sequence[str]) -> dict[str, str]:
    """Return what each name of before is called now; one that is gone is left out.

    Examples
    --------
    >>> _now(["Wall", "Painted"], ["Wall", "Two coats"])
    {'Wall': 'Wall', 'Painted': 'Two coats'}
    """
    now = {name: name for name in before if name in after}
    if len(before) == len(after):
        now |= {old: new for old, new in zip(before, after, strict=True) if old not in after and new not in before}
    return now
