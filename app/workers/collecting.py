"""Keeps Python's search for unreachable cycles out of worker threads.

The search runs in whichever thread happens to allocate, and takes what it finds apart there. A widget that hangs in
a cycle (one whose slot is a lambda holding it is enough) would be destroyed in the worker thread, which the toolkit
answers with "Timers cannot be stopped from another thread", a crash or a standstill. While a thread works, the
search is therefore made by a timer in the thread of the window and nowhere else.
"""

import gc
from typing import ClassVar, Final, final

from PySide6.QtCore import QObject, QTimer

INTERVAL_MS: Final = 500
"""Between two looks whether there is enough to search for."""


@final
class WindowCollector(QObject):
    """Takes the search over from the interpreter between `hold` and `release`.

    Python's own thresholds decide when a generation is searched; only the thread differs.
    """

    # The interpreter has one switch for all threads, so that the holders are counted for all of them.
    _holders: ClassVar[int] = 0

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._holding = False
        self._timer = QTimer(self)
        self._timer.setInterval(INTERVAL_MS)
        self._timer.timeout.connect(collect_due)

    def hold(self) -> None:
        """Search in this thread only, from now on; once is enough."""
        if not self._holding:
            self._holding = True
            WindowCollector._holders += 1
            gc.disable()
            self._timer.start()

    def release(self) -> None:
        """Give the search back when nobody holds it any more; harmless when not held."""
        if self._holding:
            self._holding = False
            self._timer.stop()
            WindowCollector._holders -= 1
            if WindowCollector._holders == 0:
                gc.enable()


def collect_due() -> None:
    """Search the oldest generation that is due by Python's own thresholds, if any is."""
    counts, thresholds = gc.get_count(), gc.get_threshold()
    for generation in (2, 1, 0):
        if counts[generation] > thresholds[generation] > 0:
            gc.collect(generation)
            return
