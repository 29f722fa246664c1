"""The guard against releases of Qt for Python that give away references which are not theirs.

PySide6 6.12.0 on Python 3.11 drops one reference to True at each emit and one to None at each of many calls;
after a few thousand of them the interpreter aborts. The pins in pyproject.toml rest on this test.
"""

import sys

import pyqtgraph
import PySide6
from PySide6.QtCore import QObject, Signal
from PySide6.QtWidgets import QWidget
from pytestqt.qtbot import QtBot

ROUNDS = 200


class Probe(QObject):
    told = Signal(bool)


def test_calls_into_qt_give_no_references_away(qtbot: QtBot) -> None:
    """Emitting and calling widgets leaves the counts of None, True and False where they were."""
    widget = QWidget()
    qtbot.addWidget(widget)
    probe = Probe()
    singles = (None, True, False)
    before = [sys.getrefcount(single) for single in singles]
    for _ in range(ROUNDS):
        probe.told.emit(True)
        widget.update()
        widget.parent()
    after = [sys.getrefcount(single) for single in singles]
    lost = [b - a for b, a in zip(before, after, strict=True)]
    assert all(count < ROUNDS // 4 for count in lost), f"references given away (None, True, False): {lost}"


def test_the_installed_pair_is_inside_the_pins() -> None:
    """The installed Qt and plot library are releases that pyproject.toml allows."""
    qt = tuple(int(part) for part in PySide6.__version__.split(".")[:3])
    assert qt >= (6, 8, 3)
    assert qt not in {(6, 9, 1), (6, 9, 2)}
    assert sys.version_info >= (3, 12) or qt < (6, 12, 0)
    assert pyqtgraph.__version__.startswith("0.14")
