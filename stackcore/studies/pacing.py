"""How long a generator works before it lets others have a word."""

import time
from typing import Final

CHUNK_SECONDS: Final = 0.008
"""Of work aimed at between two yields; a part that cannot be cut smaller may take a few times as long."""


class Pace:
    """Tells when a chunk of work is long enough."""

    __slots__ = ("_begun",)

    def __init__(self) -> None:
        self._begun = time.perf_counter()

    def due(self) -> bool:
        """Return whether a chunk's time has passed since the last time it had."""
        now = time.perf_counter()
        if now - self._begun < CHUNK_SECONDS:
            return False
        self._begun = now
        return True


class ChunkSize:
    """How many points make a chunk, learnt from those before."""

    __slots__ = ("_points",)

    # A solve of one point takes about as long as half a solve of 2000, absorption more: smaller parts cost more
    # than they save, and are hardly shorter.
    _LEAST: Final = 2048
    _MOST: Final = 65_536

    def __init__(self) -> None:
        self._points = self._LEAST

    @property
    def points(self) -> int:
        """Of the next chunk."""
        return self._points

    def learn(self, points: int, seconds: float) -> None:
        """Take in how long the last chunk took; a size grows at most twofold at a time."""
        wanted = points * CHUNK_SECONDS / max(seconds, 1e-6)
        self._points = int(min(max(wanted, self._LEAST), 2 * self._points, self._MOST))
