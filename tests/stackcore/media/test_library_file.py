"""Library files with and without faults."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.media.library_entry import Family
from stackcore.media.library_file import read_family

HEAD = '[family]\nlabel = "Trial"\n'
GOOD = {
    "name": '"pane"',
    "label": '"Pane"',
    "model": '"constant"',
    "permittivity": "6.31",
    "loss_tangent": "0.01",
    "range": '["1 GHz", "2 GHz"]',
    "source": '"a test"',
    "certainty": '"read"',
    "spread": "{ permittivity = 0.02, loss_tangent = 0.3 }",
}


def material(**changes: str | None) -> str:
    """Return an entry of a file: `GOOD` with lines replaced, added, or left out by None."""
    lines = [f"{key} = {value}" for key, value in {**GOOD, **changes}.items() if value is not None]
    return "\n".join(["[[material]]", *lines, ""])


def read(*materials: str, head: str = HEAD) -> Family:
    """Return the family ``trial`` of a file."""
    return read_family("trial", "\n".join([head, *materials]).encode())


def test_a_good_entry() -> None:
    """An entry without a fault comes with all that stands in the file."""
    text = material(note='"23 °C"', also='["window"]')
    family = read(text)
    assert (family.faults, family.key, family.label) == ((), "trial", "Trial")
    (entry,) = family.entries
    assert (entry.key, entry.name, entry.family, entry.label) == ("trial/pane", "pane", "trial", "Pane")
    assert (entry.model, entry.also) == ("constant", ("window",))
    assert dict(entry.constants) == {"permittivity": 6.31 + 0j, "loss_tangent": 0.01}
    assert (entry.valid_range.lowest, entry.valid_range.highest) == (1e9, 2e9)
    assert (entry.provenance.source, entry.provenance.certainty) == ("a test", "read")
    assert entry.provenance.note == "23 °C"
    assert dict(entry.provenance.spread) == {"permittivity": 0.02, "loss_tangent": 0.3}
    assert (entry.medium.valid_range, entry.medium.provenance) == (entry.valid_range, entry.provenance)


FAULTY: list[tuple[dict[str, str | None], str, str]] = [
    ({"source": None}, "pane.source", "is missing"),
    ({"source": '"  "'}, "pane.source", "not a text with something in it"),
    ({"source": "7"}, "pane.source", "not a text"),
    ({"label": None}, "pane.label", "is missing"),
    ({"name": None}, "material[0].name", "is missing"),
    ({"name": '"Window Pane"'}, "material[0].name", "'Window Pane' is not a name"),
    ({"certainty": None}, "pane.certainty", "is missing"),
    ({"certainty": '"recaled"'}, "pane.certainty", "did you mean 'recalled'?"),
    ({"model": None}, "pane.model", "is missing"),
    ({"model": '"constent"'}, "pane.model", "did you mean 'constant'?"),
    ({"permittivity": None}, "pane.permittivity", "is missing"),
    ({"permittivity": '"6.31"'}, "pane.permittivity", "is not a number"),
    ({"permittivity": "nan"}, "pane.permittivity", "is not a number"),
    ({"permittivity": "0"}, "pane.permittivity", "must not be 0"),
    ({"permittivity": "[6.31, -0.1]", "loss_tangent": None}, "pane.permittivity", "gain"),
    ({"permittivity": "[6.31, 0.1]"}, "pane.loss_tangent", "given twice"),
    ({"permittivity": "[6.31, 0]"}, "pane.loss_tangent", "given twice"),
    ({"loss_tangent": "-0.01"}, "pane.loss_tangent", "gain"),
    ({"permitivity": "6.31"}, "pane.permitivity", "unknown key, did you mean 'permittivity'?"),
    ({"conductivity": '"1 S/m"'}, "pane.conductivity", "unknown key"),
    ({"permittivity": "1e13"}, "pane.permittivity", "too large"),
    ({"range": None}, "pane.range", "is missing"),
    ({"range": '["2 GHz", "1 GHz"]'}, "pane.range", "2 GHz to 1 GHz is reversed"),
    ({"range": '["0 Hz", "1 GHz"]'}, "pane.range", "does not lie above 0"),
    ({"range": '["1 GHz"]'}, "pane.range", "is not a range"),
    ({"range": "[1e9, 2e9]"}, "pane.range", "is not a range"),
    ({"range": '["1 mm", "2 mm"]'}, "pane.range", "1 mm"),
    ({"spread": None}, "pane.spread", "is missing"),
    ({"spread": "0.02"}, "pane.spread", "is not a table"),
    ({"spread": "{ permittivity = 0.02 }"}, "pane.spread.loss_tangent", "is missing"),
    ({"spread": "{ permittivity = -0.1, loss_tangent = 0.3 }"}, "pane.spread.permittivity", "-0.1"),
    ({"spread": "{ permittivity = 2, loss_tangent = 0.3 }"}, "pane.spread.permittivity", "2 is not"),
    (
        {"spread": "{ permitivity = 0.1, permittivity = 0.1, loss_tangent = 0.3 }"},
        "pane.spread.permitivity",
        "did you mean 'permittivity'?",
    ),
    ({"spread": "{ note = 0.1, permittivity = 0.1, loss_tangent = 0.3 }"}, "pane.spread.note", "no constant"),
    ({"also": '"window"'}, "pane.also", "not a list"),
    ({"note": "3"}, "pane.note", "not a text"),
]


@pytest.mark.parametrize(("changes", "place", "told"), FAULTY)
def test_a_fault_has_its_place(changes: dict[str, str | None], place: str, told: str) -> None:
    """Each fault names the file, the entry and the key, and says what is wrong; the next entry stays usable."""
    family = read(material(**changes), material(name='"second"', label='"Second"'))
    (fault,) = [fault for fault in family.faults if fault.path == f"trial.toml: {place}"]
    assert told in fault.message
    assert fault.allowed
    assert [entry.name for entry in family.entries] == ["second"]


def test_all_faults_of_an_entry_are_told_together() -> None:
    """Five faults in one entry are five faults, none hides another."""
    text = material(source=None, certainty='"sure"', range='["2 GHz", "1 GHz"]', loss_tangent="-1", colour='"red"')
    places = {fault.path.removeprefix("trial.toml: pane.") for fault in read(text).faults}
    assert places == {"source", "certainty", "range", "loss_tangent", "colour"}


def test_the_second_of_two_equal_names_is_left_out() -> None:
    """Of two entries with one name, or one label, the first stays and the second is a fault."""
    family = read(material(), material(label='"Other"'), material(name='"other"'))
    assert [fault.path for fault in family.faults] == ["trial.toml: material[1].name", "trial.toml: other.label"]
    assert [entry.key for entry in family.entries] == ["trial/pane"]


@pytest.mark.parametrize(
    ("content", "told"),
    [
        (b"[family\nlabel = 1", "is not TOML"),
        (b'[family]\nlabel = "\xff\xfe"', "is not UTF-8"),
        (b"a = 1\na = 2", "is not TOML"),
        (b"a = " + b"[" * 5000, "is not TOML"),
    ],
)
def test_a_file_that_cannot_be_read_is_one_fault(content: bytes, told: str) -> None:
    """What is not TOML in UTF-8 is a family without entries and with one fault at the file."""
    family = read_family("trial", content)
    assert family.entries == ()
    (fault,) = family.faults
    assert fault.path == "trial.toml"
    assert told in fault.message


def test_where_the_toml_breaks_is_told() -> None:
    """The fault of a malformed file names the line."""
    (fault,) = read_family("trial", b'[family]\nlabel = "Trial"\nnote =\n').faults
    assert "line 3" in fault.message


@pytest.mark.parametrize(
    ("head", "place"),
    [
        ("", "family"),
        ("family = 3\n", "family"),
        ("[family]\n", "family.label"),
        ('[family]\nlabel = "Trial"\ncolor = 1\n', "family.color"),
        ('extra = 1\n[family]\nlabel = "Trial"\n', "extra"),
    ],
)
def test_a_fault_of_the_head_keeps_the_entries(head: str, place: str) -> None:
    """A family without a proper head is told and keeps its entries."""
    family = read(material(), head=head)
    assert [fault.path for fault in family.faults] == [f"trial.toml: {place}"]
    assert [entry.key for entry in family.entries] == ["trial/pane"]


def test_entries_must_be_a_list_of_tables() -> None:
    """``[material]`` instead of ``[[material]]`` is told with what to write."""
    family = read("[material]\n")
    assert [str(fault) for fault in family.faults] == [
        "trial.toml: material: is not a list of tables; allowed: [[material]] above each entry"
    ]


def test_a_byte_order_mark_does_no_harm() -> None:
    """A file saved with a byte order mark is read like any other."""
    assert read_family("trial", b"\xef\xbb\xbf" + (HEAD + material()).encode()).faults == ()


@given(st.binary(max_size=200) | st.text(alphabet='[]{}="\n ab.1é', max_size=200).map(str.encode))
def test_no_content_raises(content: bytes) -> None:
    """Whatever the bytes are, the faults come back as values."""
    family = read_family("trial", content)
    assert family.entries == ()
    assert family.faults
