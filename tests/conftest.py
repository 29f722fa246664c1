"""What holds for every test: no display, no surprises from NumPy, repeatable Hypothesis, a home of its own.

Nothing here needs Qt: the tests of `stackcore` run where it is not installed.
"""

import os
from collections.abc import Iterator
from pathlib import Path

import hypothesis
import numpy as np
import pytest

# Before anything imports Qt.
os.environ["QT_QPA_PLATFORM"] = os.environ.get("SLABWRIGHT_TEST_PLATFORM", "offscreen")

# Slow or choosy generation is no fault of the code under test, least of all on a shared machine.
hypothesis.settings.register_profile(
    "house",
    deadline=None,
    derandomize=True,
    print_blob=True,
    suppress_health_check=[hypothesis.HealthCheck.filter_too_much, hypothesis.HealthCheck.too_slow],
)
hypothesis.settings.load_profile("house")

QT_OPTIONS = ("qt_api", "qt_log_level_fail", "qt_log_ignore")


def pytest_addoption(parser: pytest.Parser, pluginmanager: pytest.PytestPluginManager) -> None:
    """Know the options of pytest-qt in pyproject.toml also where that plug-in is not installed."""
    if not pluginmanager.hasplugin("pytest-qt") and not pluginmanager.hasplugin("pytestqt.plugin"):
        for option in QT_OPTIONS:
            parser.addini(option, "read only by pytest-qt")


@pytest.fixture(autouse=True)
def _numpy_raises() -> Iterator[None]:
    """Turn every division by zero, overflow and invalid operation of NumPy into an error."""
    with np.errstate(divide="raise", over="raise", invalid="raise"):
        yield


@pytest.fixture(autouse=True)
def program_home(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """Send settings, log and recovery files into the test's own folder."""
    home = tmp_path / "program-home"
    monkeypatch.setenv("SLABWRIGHT_HOME", str(home))
    monkeypatch.setenv("XDG_CONFIG_HOME", str(home / "config"))
    monkeypatch.setenv("XDG_STATE_HOME", str(home / "xdg-state"))
    return home
