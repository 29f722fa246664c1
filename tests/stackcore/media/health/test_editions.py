"""Editions of one source that differ where they are used."""

from pathlib import Path

import numpy as np
import pytest

from stackcore.cli import main
from stackcore.job import Job, job_from_json
from stackcore.job.health import material_findings
from stackcore.media.health import edition_findings
from stackcore.media.library import materials_dir
from stackcore.media.library_file import read_family


def test_glass_of_two_editions_is_told_with_both_figures() -> None:
    """At 28 GHz the loss of ITU-R P.2040-1 is 25 % below that of -3: 0.147 against 0.2005 (recomputed)."""
    (found,) = edition_findings("building/glass-p2040-3", np.array([28e9]))
    assert (found.severity, found.topic) == ("note", "edition")
    assert "0.201 in glass-p2040-3" in found.reason
    assert "0.147 in glass-p2040-1" in found.reason
    assert "28 GHz" in found.reason
    assert "edition" in found.hint


def test_it_is_told_from_either_side() -> None:
    """Whoever uses the earlier edition hears of the later one."""
    (found,) = edition_findings("building/glass-p2040-1", np.array([28e9]))
    assert "glass-p2040-3" in found.reason


@pytest.mark.parametrize(
    "key",
    [
        "building/wood-p2040-1",  # the same row in both
        "building/marble-p2040-3",  # in one edition only
        "plastics/ptfe",  # no edition at all
        "nowhere/nothing-p2040-1",
    ],
)
def test_where_there_is_no_difference_nothing_is_told(key: str) -> None:
    """No other edition, or one that says the same."""
    assert list(edition_findings(key)) == []


def test_editions_outside_the_sweep_are_no_news() -> None:
    """A sweep that no edition covers has no difference to tell."""
    assert list(edition_findings("building/glass-p2040-3", np.array([1e15]))) == []


TWO = """[family]
label = "Mine"
[[material]]
name = "foam-p9-1"
label = "Foam, first edition"
model = "constant"
permittivity = 1.1
loss_tangent = 0
range = ["1 GHz", "10 GHz"]
source = "a sheet of paper, first edition"
certainty = "read"
spread = { permittivity = 0, loss_tangent = 0 }
[[material]]
name = "foam-p9-2"
label = "Foam, second edition"
model = "constant"
permittivity = PERMITTIVITY
loss_tangent = 0
range = ["10 GHz", "40 GHz"]
source = "a sheet of paper, second edition"
certainty = "read"
spread = { permittivity = 0, loss_tangent = 0 }
"""


def test_two_editions_without_loss_are_compared() -> None:
    """0 against 0 is no difference, and no division; ranges that only touch share one frequency."""
    same = read_family("mine", TWO.replace("PERMITTIVITY", "1.1").encode()).entries
    assert list(edition_findings(same[0], None, same)) == []
    other = read_family("mine", TWO.replace("PERMITTIVITY", "1.25").encode()).entries
    (found,) = edition_findings(other[0], None, other)
    assert "ε′ by 12 % at 10 GHz (1.1 − j0 in foam-p9-1, 1.25 − j0 in foam-p9-2)" in found.reason


def test_loss_in_one_edition_only_is_a_difference() -> None:
    """Without any loss in the other edition, the difference is the whole of it."""
    text = TWO.replace("PERMITTIVITY", "1.1").replace(
        'loss_tangent = 0\nrange = ["10', 'loss_tangent = 0.02\nrange = ["10'
    )
    first, second = read_family("mine", text.encode()).entries
    for own, other in ((first, second), (second, first)):
        (found,) = edition_findings(own, None, (own, other))
        assert "ε″ by 100 %" in found.reason


def test_an_edition_within_the_least_is_none() -> None:
    """A difference of 0.9 % is within what a figure is known to."""
    near = read_family("mine", TWO.replace("PERMITTIVITY", "1.11").encode()).entries
    assert list(edition_findings(near[0], None, near)) == []


def test_the_command_line_tells_of_editions(tmp_path: Path, capfdbinary: pytest.CaptureFixture[bytes]) -> None:
    """Of a library file with its own figures, those of the file are told, and a note is no error."""
    path = tmp_path / "mine.toml"
    path.write_text(TWO.replace("PERMITTIVITY", "1.25"), encoding="utf-8")
    assert main(["materials", "--check", str(path)]) == 0
    lines = capfdbinary.readouterr().out.decode().splitlines()
    assert [line.partition(": note: library: ")[0] for line in lines if "editions differ" in line] == [
        "mine/foam-p9-1",
        "mine/foam-p9-2",
    ]


def test_a_file_beside_the_library_has_the_word(tmp_path: Path, capfdbinary: pytest.CaptureFixture[bytes]) -> None:
    """A file called as a family of the library changes one edition: its figure, against the library's other."""
    text = (materials_dir() / "building.toml").read_text(encoding="utf-8")
    start = text.index('[[material]]\nname = "glass-p2040-3"')
    glass = text[start : text.index("[[material]]", start + 1)].replace("6.31", "7.31")
    path = tmp_path / "building.toml"
    path.write_text(f'[family]\nlabel = "Mine"\n\n{glass}', encoding="utf-8")
    assert main(["materials", "--check", str(path), "--at", "1GHz"]) == 0
    (line,) = [line for line in capfdbinary.readouterr().out.decode().splitlines() if "editions" in line]
    assert "7.31 − j0.0647 in glass-p2040-3" in line
    assert "6.27 − j0.0773 in glass-p2040-1" in line


def test_a_job_tells_of_the_edition_it_uses() -> None:
    """The findings on a material of a job hold it, beside those on its medium."""
    job = Job(
        job_from_json(
            '{"format": "slabwright-job", "version": 1, "title": "", "materials": {"pane": {"library": '
            '"building/glass-p2040-3"}}, "stacks": [{"name": "A", "elements": []}], '
            '"sweep": {"frequency": ["28 GHz"], "angle": ["0 deg"]}}'
        )
    )
    assert [finding.topic for finding in material_findings(job, "pane")] == ["edition"]
