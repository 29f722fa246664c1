"""How long it takes to be there: imports, command line, first paint; each beside the bare interpreter."""

import subprocess
import sys
from collections.abc import Iterator

from tests.bench.timing import in_turns, seconds

_FIRST_PAINT = """
import os, time
begin = time.perf_counter()
os.environ["QT_QPA_PLATFORM"] = "offscreen"
from tests.bench.window import painted_window
window, session, close = painted_window()
print(time.perf_counter() - begin)
close()
"""


def _process(*arguments: str) -> float:
    return seconds(lambda: subprocess.run([sys.executable, *arguments], check=True, capture_output=True))


def _told(code: str) -> float:
    done = subprocess.run([sys.executable, "-c", code], check=True, capture_output=True, text=True)
    return float(done.stdout)


def report() -> Iterator[str]:
    """Yield one line a figure."""
    turns = in_turns(
        7,
        bare=lambda: _process("-c", ""),
        numpy=lambda: _process("-c", "import numpy"),
        core=lambda: _process("-c", "import stackcore"),
        help=lambda: _process("-m", "stackcore", "--help"),
    )
    for name, label in (("numpy", "import numpy"), ("core", "import stackcore"), ("help", "--help")):
        more = turns.middle(name) - turns.middle("bare")
        ratio = turns.ratio(name, "bare")
        yield f"{label}: {more * 1e3:.0f} ms more than a bare interpreter ({ratio:.1f} times it)"
    paint = in_turns(5, paint=lambda: _told(_FIRST_PAINT))
    yield f"from nothing imported to the window painted with curves: {paint.middle('paint') * 1e3:.0f} ms"
