"""A job file to run commands on, and a way to run them in this process."""

import shutil
from collections.abc import Callable
from pathlib import Path
from typing import NamedTuple

import pytest

from stackcore.cli import main
from tests.stackcore.formats.files import HAND_WRITTEN


class Outcome(NamedTuple):
    """What a command line left: exit status, standard output, lines of standard error."""

    status: int
    out: str
    lines: list[str]


Run = Callable[..., Outcome]


@pytest.fixture
def job_file(tmp_path: Path) -> Path:
    """A copy of the stored example."""
    return Path(shutil.copy(HAND_WRITTEN, tmp_path / "cover.slabjob"))


@pytest.fixture
def run(capfdbinary: pytest.CaptureFixture[bytes]) -> Run:
    """Run ``slabwright`` with arguments, in this process."""

    def run(*arguments: object) -> Outcome:
        capfdbinary.readouterr()
        status = main([str(argument) for argument in arguments])
        out, err = capfdbinary.readouterr()
        return Outcome(status, out.decode(), err.decode().splitlines())

    return run
