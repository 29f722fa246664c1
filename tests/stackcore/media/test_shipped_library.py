"""The library as a whole: nothing gains, nothing is named by a brand, everything is found and told honestly."""

import csv
import re
import tomllib
from collections import Counter
from hashlib import sha256
from pathlib import Path
from typing import Final

import numpy as np
import pytest

from stackcore.cli import main
from stackcore.media.library import Library, LibraryEntry, materials_dir
from stackcore.media.library_entry import EntryState
from stackcore.media.library_file import CERTAINTIES
from stackcore.media.models import MODELS
from stackcore.media.models.completing import completed

LIBRARY: Final = Library(materials_dir())
ENTRIES: Final = LIBRARY.entries
KEYS: Final = [entry.key for entry in ENTRIES]

RECALLED: Final = [entry for entry in ENTRIES if entry.provenance.certainty == "recalled"]

MARK: Final = re.compile(r"[®™℠©]|\((?:R|TM|C)\)(?!\w)")
"""Signs that stand behind a brand."""

BRANDS: Final = frozenset(
    (
        *("0a7a712dfa38", "14076a945f79", "161fcf00d7b6", "1c9ae44a9c7c", "26f67840c83f"),
        *("29b82fa2dfb1", "3a9d5d829175", "43a61c40538f", "442316f4926b", "444923f3d9d5"),
        *("483a6243dba2", "4a781ad26b97", "4d292543f34b", "4dec10277d33", "4e4600190616"),
        *("513189935ee6", "5c5b2ee1d6ab", "5e239d25deae", "608821bcab3c", "6baf9b76709f"),
        *("6cfe6087ffae", "6daa19666476", "6e77dda8cdec", "71ffac2d9e6d", "7c3cc56409a9"),
        *("7cae14b0c0f1", "7cc31fa7f36e", "82033cdb398e", "8ccb8fa65506", "8dc2be09d94b"),
        *("8f9602aa161e", "909b70f5f704", "9b7a3f6f8864", "9bdefba4d3f9", "b043864b7ffb"),
        *("b1f302313db1", "b531a19db59e", "cebdc0ac5ea7", "d461d041b212", "d72f51b2ee5d"),
        *("de20ef45d427", "dfcfe3c89d85", "e360ee4319a7", "f03168930adf", "ffcf2d2dd7b5"),
    )
)
"""Brands of laminates, foams, plastics, ceramics and absorbers: the first digits of the SHA-256 of each in lower
case, so that none of them stands in this tree."""


def words(text: str) -> set[str]:
    """Return the words of a text in lower case, those joined by hyphens also one by one."""
    joined = re.findall(r"[a-z0-9]+(?:-[a-z0-9]+)*", text.casefold())
    return {*joined, *(part for word in joined for part in word.split("-"))}


def brands(text: str) -> set[str]:
    """Return the words of a text that are brands."""
    return {word for word in words(text) if sha256(word.encode()).hexdigest()[:12] in BRANDS}


def test_there_is_enough_of_it() -> None:
    """At least 150 entries, each under a key of its own, and no file with a fault."""
    assert LIBRARY.faults == ()
    assert len(set(KEYS)) == len(KEYS) >= 150


def test_every_table_of_every_file_is_an_entry() -> None:
    """What stands in the files comes out of them: none is lost on the way."""
    written = [
        f"{Path(file.name).stem}/{table['name']}"
        for file in materials_dir().iterdir()
        if file.name.endswith(".toml")
        for table in tomllib.loads(file.read_text(encoding="utf-8"))["material"]
    ]
    assert sorted(written) == sorted(KEYS)


def test_labels_are_unique() -> None:
    """No two entries have one label, in whatever case: a list of them leaves no doubt which is meant."""
    count = Counter(entry.label.casefold() for entry in ENTRIES)
    assert [label for label, times in count.items() if times > 1] == []


@pytest.mark.parametrize("entry", ENTRIES, ids=KEYS)
def test_source_certainty_range_and_spread_are_given(entry: LibraryEntry) -> None:
    """Each entry says where it comes from, how well that is known, where it holds and how much it varies."""
    told = entry.provenance
    assert len(told.source) > 20
    assert told.certainty in CERTAINTIES
    assert 0 < entry.valid_range.lowest < entry.valid_range.highest < np.inf
    varying = {constant.name for constant in MODELS[entry.model].constants if constant.varies}
    assert varying & set(entry.constants) <= {name.partition("[")[0] for name, _ in told.spread}


@pytest.mark.parametrize("entry", ENTRIES, ids=KEYS)
def test_nothing_gains_anywhere_in_its_range(entry: LibraryEntry) -> None:
    """Both ends, the middle and a hundred places between: finite, and never a positive imaginary part."""
    ends = entry.valid_range
    frequency = np.geomspace(ends.lowest, ends.highest, 103)
    frequency[0], frequency[-1] = ends.lowest, ends.highest
    values = entry.medium.evaluate(frequency)
    for array in (values.permittivity, values.permeability):
        assert np.isfinite(array).all()
        assert float(np.max(array.imag)) <= 0


STATES: Final = [(entry, state) for entry in ENTRIES for state in entry.states]


@pytest.mark.parametrize(("entry", "state"), STATES, ids=[f"{entry.key}, {state.name}" for entry, state in STATES])
def test_states_differ_and_do_not_gain(entry: LibraryEntry, state: EntryState) -> None:
    """A named state makes another medium than the entry itself, and none with gain."""
    constants = completed(state.constants, entry.constants)
    medium = MODELS[entry.model].build(constants, entry.valid_range, entry.provenance, None)
    frequency = np.geomspace(entry.valid_range.lowest, entry.valid_range.highest, 103)
    values, usual = medium.evaluate(frequency), entry.medium.evaluate(frequency)
    for array in (values.permittivity, values.permeability):
        assert np.isfinite(array).all()
        assert float(np.max(array.imag)) <= 0
    assert not np.allclose(values.permittivity, usual.permittivity, rtol=1e-6)


def test_densities_are_those_of_matter() -> None:
    """From air-filled foam, 5 kg/m³, to osmium, 22 590 kg/m³; the unit was not mistaken."""
    densities = {entry.key: entry.density.value for entry in ENTRIES if entry.density is not None}
    assert len(densities) > 100
    assert [key for key, density in densities.items() if not 5 < density < 22.6e3] == []


@pytest.mark.parametrize("entry", ENTRIES, ids=KEYS)
def test_it_is_found_by_its_label_first(entry: LibraryEntry) -> None:
    """Who types the label of an entry finds that entry before all others."""
    assert LIBRARY.search(entry.label)[0].key == entry.key


def test_no_brand_stands_in_the_library() -> None:
    """No sign of a trade mark and no known brand in any text of any file, comments and notes included."""
    for file in materials_dir().iterdir():
        text = file.read_text(encoding="utf-8")
        assert MARK.findall(text) == [], file.name
        assert brands(text) == set(), file.name


def test_the_search_for_brands_finds_one() -> None:
    """A brand is recognized within a sentence and within a key; plain words are not."""
    name = bytes.fromhex("7465666c6f6e").decode()
    assert brands(f"Sheet of {name.title()}, 2 mm") == {name}
    assert name in brands(f"plastics/{name}-sheet")
    assert brands("Polytetrafluoroethylene, sheet, 2 mm") == set()
    assert MARK.search("Foam® 51")
    assert MARK.search("Foam (TM)")
    assert not MARK.search("(C10100) at 20 °C")


def test_recalled_values_are_told_as_such(capfdbinary: pytest.CaptureFixture[bytes]) -> None:
    """The command line shows which values are from memory: one entry of each family, and all in the table."""
    assert RECALLED
    for entry in {entry.family: entry for entry in RECALLED}.values():
        assert main(["materials", entry.key]) == 0
        shown = capfdbinary.readouterr().out.decode()
        assert re.search(r"^ +certainty +recalled\r?$", shown, re.MULTILINE), entry.key
    assert main(["materials", "--csv", "-"]) == 0
    rows = csv.DictReader(capfdbinary.readouterr().out.decode().splitlines())
    assert {row["key"]: row["certainty"] for row in rows} == {
        entry.key: entry.provenance.certainty for entry in ENTRIES
    }


def test_a_source_that_says_recalled_is_not_marked_as_read() -> None:
    """Where the source itself says that its values are remembered, the certainty does not claim more."""
    more = [
        entry.key
        for entry in ENTRIES
        if entry.provenance.certainty == "read" and re.search(r"\brecalled\b", entry.provenance.source)
    ]
    assert more == []
