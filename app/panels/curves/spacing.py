"""Texts of a column pushed apart so that none covers another. No toolkit."""

from collections.abc import Sequence


def spread(wanted: Sequence[float], height: float, low: float, high: float) -> tuple[float, ...] | None:
    """Return centres as near as possible to the wanted ones, at least `height` apart, between `low` and `high`.

    Texts that would overlap are gathered into a block that sits at the mean of what its members want (the
    exact least-squares answer, found by pooling neighbours).

    Parameters
    ----------
    wanted
        Centres wanted, in any order.
    height
        Height of one text, with its gap.
    low, high
        Edges of the column.

    Returns
    -------
    tuple of float or None
        One centre for each wanted one, in the same order; None when there is no room for all.

    Examples
    --------
    >>> spread([50.0, 50.0], 10.0, 0.0, 100.0)
    (45.0, 55.0)
    """
    count = len(wanted)
    first, last = low + height / 2, high - height / 2
    if count == 0:
        return ()
    if (count - 1) * height > last - first + 1e-9:
        return None
    order = sorted(range(count), key=lambda index: wanted[index])
    blocks: list[tuple[float, int]] = []
    for rank, index in enumerate(order):
        # Taking the stacked heights away turns "at least a height apart" into "not falling".
        total, size = min(max(wanted[index], first), last) - rank * height, 1
        while blocks and blocks[-1][0] / blocks[-1][1] > total / size:
            more, members = blocks.pop()
            total, size = total + more, size + members
        blocks.append((total, size))
    highest = last - (count - 1) * height
    bases = [min(max(total / size, first), highest) for total, size in blocks for _ in range(size)]
    placed = [0.0] * count
    for rank, (index, base) in enumerate(zip(order, bases, strict=True)):
        placed[index] = base + rank * height
    return tuple(placed)
