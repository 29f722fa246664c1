"""What is not JSON, or not meant for this machine, is one fault that says where."""

import json

import pytest

from stackcore.errors import JobError
from stackcore.job import job_from_json
from stackcore.job.tree import DEEPEST, LARGEST_FILE, JsonObject, read_tree
from tests.stackcore.formats.files import HAND_WRITTEN
from tests.stackcore.job.examples import TREE, faults_in

REFUSED = [
    ("", "", "the file is empty"),
    ("  \n", "", "the file is empty"),
    (b"", "", "the file is empty"),
    ("{", "line 1, column 2", "this is not JSON"),
    ('{"a": 1,\n "b": }', "line 2, column 7", "this is not JSON"),
    ("not json", "line 1, column 1", "this is not JSON"),
    ("{'a': 1}", "line 1, column 2", "this is not JSON"),
    ('{"a": "b\n"}', "line 1, column 9", "this is not JSON"),
    ("{} {}", "line 1, column 4", "this is not JSON"),
    (b'{\n"title": "caf\xe9"}', "line 2", "byte 16 of the file (0xe9) is not UTF-8"),
    (b"\x00\x01\x02", "line 1, column 1", "this is not JSON"),
    (b"\x89PNG\r\n\x1a\n\x00", "line 1", "is not UTF-8"),
    ('{"format": "slabwright-job"}'.encode("utf-16"), "", "the file is UTF-16"),
    ("[]", "", "a list of 0"),
    ("5", "", "5"),
    ("null", "", "null"),
    ("[" * 100_000, "", "nested too deeply"),
    ("[" * (DEEPEST + 2) + "]" * (DEEPEST + 2), "", "nested too deeply"),
    ('{"a":' * 5000 + "1" + "}" * 5000, "", "nested too deeply"),
    (b" " * (LARGEST_FILE + 1), "", f"{LARGEST_FILE + 1} bytes"),
]


@pytest.mark.parametrize(("content", "path", "words"), REFUSED, ids=range(len(REFUSED)))
def test_what_is_no_job_text_is_one_fault(content: str | bytes, path: str, words: str) -> None:
    """Text that is empty, not JSON, not UTF-8, too deep or too large gives one fault with its place."""
    faults = faults_in(content)
    assert [fault.path for fault in faults] == [path]
    assert words in faults[0].message
    assert faults[0].allowed
    assert str(faults[0]).isprintable()


def test_a_byte_order_mark_does_not_matter() -> None:
    """The mark that some editors put in front of UTF-8 is skipped, in bytes and in text."""
    expected = job_from_json(HAND_WRITTEN.read_bytes())
    assert job_from_json(b"\xef\xbb\xbf" + HAND_WRITTEN.read_bytes()) == expected
    assert job_from_json("\ufeff" + HAND_WRITTEN.read_text(encoding="utf-8")) == expected


def test_line_ends_do_not_matter() -> None:
    """A file with the line ends of another system is read alike."""
    crlf = HAND_WRITTEN.read_bytes().replace(b"\n", b"\r\n")
    assert job_from_json(crlf) == job_from_json(HAND_WRITTEN.read_bytes())


def test_depth_that_a_job_needs_is_read() -> None:
    """The levels that the example has are well within the limit."""
    assert read_tree(json.dumps(TREE)) == TREE


def test_doubled_keys_are_remembered_at_every_level() -> None:
    """An object knows which of its keys were doubled, once each."""
    tree = read_tree('{"a": {"b": 1, "b": 2, "b": 3, "c": 4}, "d": 1}')
    assert isinstance(tree, JsonObject)
    inner = tree["a"]
    assert isinstance(inner, JsonObject)
    assert (tree.repeated, inner.repeated) == ((), ("b",))


def test_a_number_of_many_digits_stops_nothing() -> None:
    """A whole number of a million digits is taken for infinite, without converting it."""
    assert read_tree("[" + "9" * 1_000_000 + ", -" + "9" * 400 + "]") == [float("inf"), float("-inf")]


def test_the_error_keeps_its_faults() -> None:
    """The exception is a JobError that holds the faults and says them, one line each."""
    with pytest.raises(JobError) as caught:
        job_from_json('{"format": "slabwright-job", "version": 1}')
    assert str(caught.value).splitlines() == [str(fault) for fault in caught.value.faults]
    assert len(caught.value.faults) == 2
