"""``slabwright materials``: list, search, values, and the health check."""

import csv
import json
from pathlib import Path
from typing import Any

import pytest

from stackcore.media.library import Library, library_entry, materials_dir
from tests.stackcore.cli.conftest import Run
from tests.stackcore.formats.files import HAND_WRITTEN

ENTRIES = Library(materials_dir()).entries


def test_all_entries_are_listed(run: Run) -> None:
    """Without words every entry is a line with its key and label."""
    outcome = run("materials")
    assert (outcome.status, outcome.lines) == (0, [])
    assert [line.split()[0] for line in outcome.out.splitlines()] == [entry.key for entry in ENTRIES]


def test_words_search(run: Run) -> None:
    """Words leave the entries that hold them all; none is told with status 2."""
    found = [line.split()[0] for line in run("materials", "copper", "annealed").out.splitlines()]
    assert found[0] == "metals/copper-annealed"
    assert found == [entry.key for entry in Library(materials_dir()).search("copper annealed")]
    assert "metals/silver" not in found
    outcome = run("materials", "unobtainium")
    assert (outcome.status, outcome.out) == (2, "")
    assert "no entry holds all of 'unobtainium'" in outcome.lines[0]


def test_the_list_as_a_table(run: Run, tmp_path: Path) -> None:
    """The list can be written as a table with range and source."""
    assert run("materials", "copper", "--csv", tmp_path / "out.csv").status == 0
    rows = list(csv.DictReader((tmp_path / "out.csv").read_text(encoding="utf-8").splitlines()))
    assert rows[0]["key"] == "metals/copper"
    assert float(rows[0]["highest_Hz"]) == 300e9
    assert rows[0]["source"] == library_entry("metals/copper").provenance.source


def test_one_entry_with_values(run: Run) -> None:
    """Source, range, spread, certainty and the values at the frequencies asked for are shown."""
    outcome = run("materials", "metals/copper", "--at", "10GHz, 28 GHz")
    assert (outcome.status, outcome.lines) == (0, [])
    for words in ("1 Hz to 300 GHz", "conductivity ±2 %", "certainty  read", "59.6 MS/m", "28 GHz", "6.5192e-07"):
        assert words in outcome.out


def test_frequencies_outside_the_range_are_said(run: Run) -> None:
    """A frequency outside is marked in the table and told on standard error; the values are given all the same."""
    outcome = run("materials", "plastics/ptfe", "--at", "10GHz,100GHz")
    assert outcome.status == 0
    assert "100 GHz*" in outcome.out
    assert "10 GHz*" not in outcome.out
    told = "100 GHz lies outside 1 GHz to 40 GHz, where the values hold"
    assert outcome.lines == [f"slabwright: plastics/ptfe: {told}"]


def test_values_as_a_table(run: Run) -> None:
    """Values go to standard output as a table with full precision."""
    outcome = run("materials", "plastics/ptfe", "--at", "10GHz", "--csv", "-")
    (row,) = csv.DictReader(outcome.out.splitlines())
    assert outcome.status == 0
    assert float(row["frequency_Hz"]) == 1e10
    assert float(row["permittivity"]) == 2.08
    assert float(row["loss_tangent"]) == pytest.approx(3.7e-4, rel=1e-12)


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        (("metals/coper",), "did you mean 'metals/copper'"),
        (("metals/copper", "--at", "10 mm"), "is a length, not a frequency"),
        (("metals/copper", "--at", "0 Hz"), "no frequency of a wave"),
        (("copper", "--at", "10GHz"), "needs the key of one entry"),
        (("copper", "--check", "x.toml"), "goes alone"),
        (("metals/copper", "--csv", "no/such/folder/out.csv"), "cannot be written"),
        (("--check", "no-such-file.toml"), "there is no such file"),
        (("--nonsense",), "unrecognized arguments"),
    ],
)
def test_wrong_arguments(run: Run, arguments: tuple[str, ...], words: str) -> None:
    """What is wrong is one line with status 2."""
    outcome = run("materials", *arguments)
    assert outcome.status == 2
    assert words in outcome.lines[0]


def test_help(run: Run) -> None:
    """The command explains itself."""
    outcome = run("materials", "--help")
    assert outcome.status == 0
    assert "--check" in outcome.out


def test_health_of_a_job(run: Run) -> None:
    """Each material of a job is checked over its sweep."""
    outcome = run("materials", "--check", HAND_WRITTEN)
    assert (outcome.status, outcome.lines) == (0, [])
    assert "materials.ferrite: warning: permeability" in outcome.out
    assert "materials.skin: nothing speaks against it" in outcome.out


def test_health_of_a_faulty_job(run: Run, tmp_path: Path) -> None:
    """A job that cannot be read is told as a sweep tells it."""
    tree: dict[str, Any] = json.loads(HAND_WRITTEN.read_text(encoding="utf-8"))
    tree["materials"]["skin"]["loss_tangent"] = -1
    (tmp_path / "bad.slabjob").write_text(json.dumps(tree), encoding="utf-8")
    outcome = run("materials", "--check", tmp_path / "bad.slabjob")
    assert outcome.status == 2
    assert outcome.lines[0].startswith("slabwright: materials.skin.loss_tangent: ")


def test_health_of_a_library_file(run: Run, tmp_path: Path) -> None:
    """Entries of a file are checked, those made of others too, and its faults are told with status 2."""
    text = """[family]
label = "Mine"
[[material]]
name = "wire"
label = "Wire"
model = "conductor"
conductivity = "58e9 S/m"
range = ["1 Hz", "1 GHz"]
source = "a slip of the keyboard"
certainty = "recalled"
spread = { conductivity = 0 }
[[material]]
name = "mix"
label = "Mix"
model = "mixture"
host = "plastics/ptfe"
inclusions = [{ material = "mine/wire", fraction = 0.1 }]
source = "a sum"
certainty = "recalled"
"""
    path = tmp_path / "mine.toml"
    path.write_text(text, encoding="utf-8")
    outcome = run("materials", "--check", path)
    assert (outcome.status, outcome.lines) == (0, [])
    assert "mine/wire: warning: conductivity: 5.8e+10 S/m is more than any metal has" in outcome.out
    assert "mine/mix: " in outcome.out
    path.write_text(text.replace("plastics/ptfe", "plastics/gone"), encoding="utf-8")
    outcome = run("materials", "--check", path)
    assert outcome.status == 2
    assert "mix.host: there is no entry 'plastics/gone'" in outcome.lines[0]
    assert "mine/wire" in outcome.out


def test_health_of_columns(run: Run, tmp_path: Path) -> None:
    """A table of columns says what it was taken for and is checked; one without numbers is told with status 2."""
    path = tmp_path / "panel.csv"
    rows = "".join(f"{frequency};4.3;0.06\n" for frequency in range(8, 13))
    path.write_text(f"f (GHz);eps';eps''\n{rows}", encoding="utf-8")
    outcome = run("materials", "--check", path)
    assert (outcome.status, outcome.lines) == (0, [])
    assert "5 rows of 3 columns" in outcome.out
    assert "causality" in outcome.out or "belong together" in outcome.out
    path.write_text("nothing here", encoding="utf-8")
    assert run("materials", "--check", path).status == 2


def test_an_error_of_the_check_is_a_no(run: Run, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """A finding that is an error gives the status of a no."""
    from stackcore.media import health
    from stackcore.media.health import Finding

    found = (Finding("error", "passivity", "permittivity", "the permittivity has gain", "see the signs"),)
    monkeypatch.setattr(health, "check_medium", lambda medium, frequencies: found)
    outcome = run("materials", "--check", HAND_WRITTEN)
    assert outcome.status == 1
    assert "materials.skin: error: permittivity: the permittivity has gain" in outcome.out


def test_faults_of_the_users_library_do_not_stop_the_rest(run: Run, program_home: Path) -> None:
    """A broken file of the user's is told, and the list is given."""
    folder = program_home / "materials"
    folder.mkdir(parents=True)
    (folder / "mine.toml").write_text("[family", encoding="utf-8")
    outcome = run("materials", "copper")
    assert outcome.status == 0
    assert "metals/copper" in outcome.out
    assert "mine.toml: is not TOML" in outcome.lines[0]
