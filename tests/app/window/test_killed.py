"""A window that is killed at any moment: at most two seconds of edits are lost, and what is left can be read."""

import os
import random
import signal
import subprocess
import sys
import time
from collections.abc import Callable
from pathlib import Path

import pytest

from app.document.session import Session
from app.window.recovery import Recovery

pytestmark = pytest.mark.skipif(not hasattr(signal, "SIGKILL"), reason="this system kills otherwise")

CHILD = """
import sys, time
from pathlib import Path
from PySide6.QtCore import QSettings, QTimer
from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.window.main_window import MainWindow
from app.window.open import make_application

folder = Path(sys.argv[1])
application = make_application()
session = Session()
settings = QSettings(str(folder / "settings.ini"), QSettings.Format.IniFormat)
window = MainWindow(session, View(), settings, folder)
window.show()
number = 0

def edit():
    global number
    number += 1
    session.apply(edits.set_title(f"edit {number}"))
    print(number, time.time(), flush=True)

timer = QTimer()
timer.timeout.connect(edit)
timer.start(40)
application.exec()
"""
PROMISED = 2.0
"""Seconds of edits that may be lost."""


def edits_until_killed(folder: Path, seconds: float) -> list[tuple[int, float]]:
    """Let a window be edited for a while, kill it, and return the numbers and times of the edits it made."""
    environment = {**os.environ, "QT_QPA_PLATFORM": "offscreen", "SLABWRIGHT_HOME": str(folder)}
    root = Path(__file__).parents[3]
    with subprocess.Popen(
        [sys.executable, "-c", CHILD, str(folder)], cwd=root, env=environment, stdout=subprocess.PIPE, text=True
    ) as child:
        assert child.stdout is not None
        first = child.stdout.readline()  # it has begun
        time.sleep(seconds)
        child.send_signal(signal.SIGKILL)
        rest = child.stdout.read()
    # A last line that was cut off by the kill is no edit that anybody saw.
    lines = [line.split() for line in f"{first}{rest}".splitlines(keepends=True) if line.endswith("\n")]
    return [(int(number), float(moment)) for number, moment in lines]


def lost_seconds(folder: Path, made: list[tuple[int, float]]) -> float:
    """Return how old the last edit that was kept is, seen from the last that was made; reads what is left."""
    recovery = Recovery(Session(), folder)
    left = recovery.leftovers()
    recovery.close()
    last, ended = made[-1]
    began = made[0][1]
    # Before the first writing nothing is there yet, and never more than one file is.
    if not left:
        return ended - began
    (only,) = left
    kept = int(only.job.record.title.removeprefix("edit "))
    assert 1 <= kept <= last + 1
    moments = dict(made)
    return ended - moments.get(kept, ended)


@pytest.mark.parametrize("seed", [1, 2])
def test_a_kill_loses_two_seconds_at_most(tmp_path: Path, seed: int) -> None:
    """Killed after some seconds of edits, and found again by the next start."""
    made = edits_until_killed(tmp_path, random.Random(seed).uniform(2.5, 5.0))
    assert len(made) > 10
    assert lost_seconds(tmp_path / "recovery", made) <= PROMISED


@pytest.mark.slow
def test_fifty_kills_at_random_moments(tmp_path: Path, record_property: Callable[[str, object], None]) -> None:
    """Also in the middle of a writing: the file is whole each time."""
    dice = random.Random(50)
    losses = []
    for number in range(50):
        folder = tmp_path / str(number)
        folder.mkdir()
        made = edits_until_killed(folder, dice.uniform(0.0, 5.0))
        losses.append(lost_seconds(folder / "recovery", made))
    record_property("most lost, s", max(losses))
    assert max(losses) <= PROMISED
