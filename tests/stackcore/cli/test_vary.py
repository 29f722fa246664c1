"""``slabwright vary``: the columns of sweep for each value, exit status, and one line a fault."""

import csv
import io
import json
from pathlib import Path

import pytest

from tests.stackcore.cli.conftest import Run
from tests.stackcore.studies.jobs import TEXT

THICKNESS = "stacks[0].elements[0].thickness"


@pytest.fixture
def dome(tmp_path: Path) -> Path:
    """The job of the studies with a stack whose name has a comma and the end of a line in it, as a file."""
    tree = json.loads(TEXT)
    tree["stacks"][0]["name"] = "A,\r\nfirst"
    path = tmp_path / "dome.slabjob"
    path.write_text(json.dumps(tree), encoding="utf-8")
    return path


def rows_of(out: str) -> list[dict[str, str]]:
    """Return the rows of a table by column."""
    return list(csv.DictReader(io.StringIO(out, newline="")))


def test_each_value_is_the_sweep_of_the_job_with_it(run: Run, dome: Path, tmp_path: Path) -> None:
    """The rows of a value are those of sweep of the job that has it, with the value behind."""
    outcome = run(
        "vary", dome, "--csv", "-", "--vary", THICKNESS, "--from", "1 mm", "--to", "3 mm", "--points", "3"
    )
    assert (outcome.status, outcome.lines) == (0, [])
    rows = rows_of(outcome.out)
    assert [float(row["varied_value"]) for row in rows] == [1e-3] * 8 + [2e-3] * 8 + [3e-3] * 8
    tree = json.loads(dome.read_text(encoding="utf-8"))
    tree["stacks"][0]["elements"][0]["thickness"] = "3 mm"
    dome.write_text(json.dumps(tree), encoding="utf-8")
    swept = rows_of(run("sweep", dome, "--csv", "-", "--stack", "A,\r\nfirst").out)
    assert [{**row, "varied_value": "0.003"} for row in swept] == rows[16:]


def test_a_place_inside_a_group_may_be_said_either_way(run: Run, dome: Path) -> None:
    """The place in the file and the row of the window mean the same number."""
    rest = ("--from", "1 mm", "--to", "1 mm", "--points", "1")
    inside = run("vary", dome, "--csv", "-", "--vary", "stacks[0].elements[1].elements[0].thickness", *rest)
    flat = run("vary", dome, "--csv", "-", "--vary", "stacks[0].elements[1].thickness", *rest)
    assert inside.status == 0
    assert inside == flat


def test_a_material_is_varied_in_every_stack_that_has_it(run: Run, dome: Path, tmp_path: Path) -> None:
    """Without --stack all stacks that hold the material are written, with it only that one."""
    words = ["--vary", "materials.core.permittivity", "--from", "1", "--to", "2", "--points", "2"]
    out = tmp_path / "out.csv"
    assert run("vary", dome, "--csv", out, *words) == (0, "", [])
    names = [row["stack"] for row in rows_of(out.read_bytes().decode())]
    assert names == ["A,\r\nfirst"] * 16 + ["B"] * 16
    chosen = rows_of(run("vary", dome, "--csv", "-", "--stack", "B", *words).out)
    assert {row["stack"] for row in chosen} == {"B"}


def test_every_fault_is_a_line(run: Run, dome: Path, tmp_path: Path) -> None:
    """Faults of the values come together, and an unknown place is told with the nearest."""
    out = tmp_path / "out.csv"
    outcome = run(
        "vary", dome, "--csv", out, "--vary", THICKNESS, "--from", "-1 mm", "--to", "3 GHz", "--points", "0"
    )
    assert outcome.status == 2
    assert [line.split(";")[0] for line in outcome.lines] == [
        "slabwright: --from: '-1 mm' is negative",
        "slabwright: --to: '3 GHz' is a frequency, not a length",
        "slabwright: --points: '0' is out of range",
    ]
    rest = ("--from", "1 mm", "--to", "2 mm", "--points", "2")
    unknown = run("vary", dome, "--csv", out, "--vary", "stacks[0].elements[0].thicknes", *rest)
    assert unknown.status == 2
    assert f"did you mean '{THICKNESS}'?" in unknown.lines[0]
    elsewhere = run("vary", dome, "--csv", out, "--vary", THICKNESS, "--stack", "B", *rest)
    assert elsewhere.lines[0].startswith(f"slabwright: --stack: nothing called '{THICKNESS}' is in the stack 'B'")
    nobody = run("vary", dome, "--csv", out, "--vary", THICKNESS, "--stack", "C", *rest)
    assert nobody.lines[0].startswith("slabwright: --stack: the job has no stack 'C'")
    assert not out.exists()


def test_the_job_is_never_overwritten(run: Run, dome: Path) -> None:
    """A table that would take the place of the job is refused."""
    before = dome.read_bytes()
    rest = ("--from", "1 mm", "--to", "2 mm", "--points", "2")
    assert run("vary", dome, "--csv", dome, "--vary", THICKNESS, *rest).status == 2
    assert dome.read_bytes() == before
