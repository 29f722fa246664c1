"""The table of a sweep: header, order, precision and quoting, read back by the csv module."""

import csv
import io
import locale
import time
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.export import CSV_HEADER, csv_rows, sweep_csv, text_cell, write_csv
from stackcore.job import Job, job_from_json, read_job
from stackcore.job.records import AngleGrid, FrequencyGrid, JobRecord, LayerRecord, StackRecord, SweepRecord
from stackcore.propagation import solve
from stackcore.quantities import QUANTITIES
from stackcore.units import Dimension, Measure, measure
from tests.stackcore.formats.files import HAND_WRITTEN, SAVED

CONTRACT = (
    "stack,frequency_Hz,angle_deg,polarization,reflectance,transmittance,absorptance,return_loss_dB,"
    "insertion_loss_dB,shielding_effectiveness_dB,reflection_phase_deg,transmission_phase_deg,"
    "insertion_phase_delay_deg,group_delay_s"
)


def table(job: Job) -> str:
    """Return the whole table of a job."""
    stream = io.StringIO(newline="")
    for _ in write_csv(job, stream):
        pass
    return stream.getvalue()


def small(name: str = "A", back: str = "air") -> Job:
    """Return a job of one layer of air at one frequency and two angles."""
    layer = LayerRecord("air", measure(1e-3, Dimension.LENGTH))
    angles = (measure(0.0, Dimension.ANGLE), measure(float(np.radians(30)), Dimension.ANGLE))
    sweep = SweepRecord((measure(1e10, Dimension.FREQUENCY),), angles)
    return Job(JobRecord("", (StackRecord(name, (layer,), back=back),), sweep))


def test_header_is_that_of_the_contract() -> None:
    """The first line is the one other programs rely on, and the columns are those of the table of quantities."""
    assert table(small()).split("\r\n")[0] == CONTRACT
    assert ",".join(CSV_HEADER) == CONTRACT


def test_rows_are_in_the_order_of_stack_frequency_angle_polarization() -> None:
    """Every stack, then every frequency, then every angle, then TE before TM; nothing is left out."""
    job = read_job(SAVED)
    rows = list(csv.reader(io.StringIO(table(job), newline="")))[1:]
    frequencies = job.sweep.frequencies().tolist()
    expected = [
        [stack.name, repr(frequency), repr(float(angle)), letters]
        for stack in job.stacks
        for frequency in frequencies
        for angle in (0, 10, 20, 30, 40, 50, 60)
        for letters in ("TE", "TM")
    ]
    assert [row[:4] for row in rows] == expected


def test_numbers_are_those_of_the_response_to_the_last_bit() -> None:
    """Reading a cell back gives exactly the double that the response has."""
    job = read_job(HAND_WRITTEN)
    rows = list(csv.DictReader(io.StringIO(table(job), newline="")))
    response = solve(job.stacks[0], job.sweep.frequencies(), job.sweep.angles())
    for name, quantity in ((name, one) for name, one in QUANTITIES.items() if one.exported):
        written = np.array([float(row[name]) for row in rows])
        assert written.tolist() == quantity.values(response).ravel().tolist()
    assert len(rows) == 401 * 3 * 2


def test_infinite_decibels_are_inf() -> None:
    """Behind a metal back nothing passes: the loss is written inf, and reads as infinite."""
    rows = list(csv.DictReader(io.StringIO(table(small(back="metal")), newline="")))
    assert {row["insertion_loss_dB"] for row in rows} == {"inf"}
    assert {row["shielding_effectiveness_dB"] for row in rows} == {"inf"}
    assert {row["transmittance"] for row in rows} == {"0.0"}


def test_lines_end_as_the_standard_says() -> None:
    """Each line, the last one too, ends with CR LF, and no line is empty."""
    lines = table(small()).split("\r\n")
    assert lines[-1] == ""
    assert all(lines[:-1])
    assert not any("\n" in line or "\r" in line for line in lines)


def test_the_locale_does_not_matter() -> None:
    """Where the decimal sign is a comma, a dot is written all the same."""
    before = locale.setlocale(locale.LC_ALL)
    expected = table(small())
    for name in ("de_DE.UTF-8", "fr_FR.UTF-8", "C.UTF-8", "C"):
        try:
            locale.setlocale(locale.LC_ALL, name)
        except locale.Error:
            continue
        try:
            assert table(small()) == expected
        finally:
            locale.setlocale(locale.LC_ALL, before)


@pytest.mark.parametrize(
    ("name", "cell"),
    [
        ("A", "A"),
        ("a, b", '"a, b"'),
        ('1/4" pane', '"1/4"" pane"'),
        ("two\nlines", '"two\nlines"'),
        ("=1+1", "'=1+1"),
        ("+A", "'+A"),
        ("-A", "'-A"),
        ("@sum", "'@sum"),
        ("\tA", "'\tA"),
        ("\rA", '"\'\rA"'),
        ("\nA", '"\'\nA"'),
        ("  =1", "'  =1"),
        ("＝1", "'＝1"),
        ('=HYPERLINK("x","y")', '"\'=HYPERLINK(""x"",""y"")"'),
        ("a=b", "a=b"),
        ("Ω skin", "Ω skin"),
    ],
)
def test_text_cells_stay_text(name: str, cell: str) -> None:
    """A text is quoted where the standard asks for it, and never begins as a formula does."""
    assert text_cell(name) == cell


@given(st.text(st.characters(codec="utf-8"), min_size=1, max_size=30))
def test_any_name_is_read_back(name: str) -> None:
    """The csv module reads back any name, with at most the apostrophe in front."""
    read = next(csv.reader(io.StringIO(f"{text_cell(name)},x\r\n", newline="")))
    assert read in ([name, "x"], [f"'{name}", "x"])
    assert not read[0].lstrip(" ").startswith(("=", "+", "-", "@", "\t", "\r", "\n"))


def test_parts_join_without_a_seam(monkeypatch: pytest.MonkeyPatch) -> None:
    """Written in parts of a few points, also within one frequency, the table is the same."""
    record = read_job(HAND_WRITTEN).record
    frequency = (measure(9e9, Dimension.FREQUENCY), measure(1e10, Dimension.FREQUENCY))
    job = Job(replace(record, sweep=replace(record.sweep, frequency=frequency * 5)))
    whole = [line.split(",") for line in table(job).split("\r\n")]
    for block in (2, 7):
        monkeypatch.setattr(sweep_csv, "_BLOCK", block)
        parts = [line.split(",") for line in table(job).split("\r\n")]
        assert [row[:4] for row in parts] == [row[:4] for row in whole]
        for one, other in zip(parts[1:-1], whole[1:-1], strict=True):
            assert [float(cell) for cell in one[4:]] == pytest.approx([float(cell) for cell in other[4:]], rel=1e-9)


def test_progress_grows_to_one_and_closing_gives_up() -> None:
    """Each step tells the fraction done; closing the iterator ends the work."""
    job = read_job(HAND_WRITTEN)
    stacks = job.stacks * 5
    stream = io.StringIO(newline="")
    fractions = list(write_csv(job, stream, stacks=stacks))
    assert fractions == sorted(fractions)
    assert fractions[-1] == 1.0
    assert len(fractions) == 5
    half = io.StringIO(newline="")
    steps = write_csv(job, half, stacks=stacks)
    next(steps)
    steps.close()
    assert 0 < len(half.getvalue()) < len(stream.getvalue())


def test_a_response_can_be_named() -> None:
    """Rows of a response that was solved by hand bear the name they are given."""
    response = solve(small().stacks[0], 1e10, 0.0)
    assert csv_rows(response, "by hand").startswith("by hand,10000000000.0,0.0,TE,")
    assert csv_rows(response).startswith("A,10000000000.0,0.0,TE,")


@pytest.mark.slow
def test_a_large_sweep_takes_seconds() -> None:
    """2001 frequencies at 91 angles, 364 182 rows, are solved and written at 20 000 rows a second or more."""

    def typed(value: float, dimension: Dimension) -> Measure:
        return measure(value, dimension)

    frequency = FrequencyGrid(typed(8e9, Dimension.FREQUENCY), typed(12e9, Dimension.FREQUENCY), 2001)
    angle = AngleGrid(typed(0.0, Dimension.ANGLE), typed(1.5, Dimension.ANGLE), 91)
    record = job_from_json(HAND_WRITTEN.read_bytes())
    job = Job(replace(record, sweep=SweepRecord(frequency, angle)))
    start = time.process_time()
    text = table(job)
    assert text.count("\r\n") == 2001 * 91 * 2 + 1
    assert time.process_time() - start < 18
