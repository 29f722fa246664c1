"""The wide table says what the tidy one says, in other places."""

import csv
import io

import pytest

from stackcore.errors import InputError
from stackcore.export import wide_header, write_csv, write_wide_csv
from stackcore.export.wide_csv import _BLOCK
from stackcore.job import Job, job_from_json, read_job
from stackcore.quantities import QUANTITIES
from tests.stackcore.formats.files import SAVED


def wide(job: Job, quantity: str) -> list[list[str]]:
    """Return the cells of the wide table."""
    stream = io.StringIO(newline="")
    shares = list(write_wide_csv(job, stream, quantity))
    assert shares[-1] == 1.0
    assert shares == sorted(shares)
    return list(csv.reader(io.StringIO(stream.getvalue(), newline="")))


@pytest.mark.parametrize("quantity", ["transmittance", "insertion_loss_dB", "group_delay_s"])
def test_each_cell_is_that_of_the_tidy_table(quantity: str) -> None:
    """Frequency, stack, angle and polarization of a cell find the same text in the table of rows."""
    job = read_job(SAVED)
    stream = io.StringIO(newline="")
    assert list(write_csv(job, stream))[-1] == 1.0
    tidy = {
        (row["stack"], row["frequency_Hz"], float(row["angle_deg"]), row["polarization"]): row[quantity]
        for row in csv.DictReader(io.StringIO(stream.getvalue(), newline=""))
    }
    header, *rows = wide(job, quantity)
    count = 0
    for row in rows:
        for title, cell in zip(header[1:], row[1:], strict=True):
            stack, side, angle, unit, name = title.rsplit(" ", 4)
            assert (unit, name) == ("deg", quantity)
            assert cell == tidy[stack, row[0], float(angle), side]
            count += 1
    assert count == len(tidy)


def test_every_quantity_of_two_polarizations_can_be_written() -> None:
    """The header has a column a stack, angle and polarization, and every row as many cells."""
    job = read_job(SAVED)
    for quantity in QUANTITIES:
        header, *rows = wide(job, quantity)
        assert tuple(header) == wide_header(job, quantity)
        assert {len(row) for row in rows} == {len(header)}


def test_a_long_sweep_is_written_in_parts() -> None:
    """More points than a part has come in several, in order and none twice."""
    points = 2 * _BLOCK + 7
    job = job_from_json(
        '{"format": "slabwright-job", "version": 1, "title": "",'
        '"stacks": [{"name": "=A, \\"x\\"", "elements": []}],'
        f'"sweep": {{"frequency": {{"start": "1 GHz", "stop": "2 GHz", "points": {points}, "spacing": "linear"}},'
        '"angle": ["0 deg"]}}'
    )
    header, *rows = wide(Job(job), "transmittance")
    assert len(rows) == points
    assert [float(row[0]) for row in rows] == sorted(float(row[0]) for row in rows)
    assert header[1].startswith("'=A")


def test_a_quantity_that_does_not_exist_is_an_error() -> None:
    """The caller asks for names of the table only."""
    with pytest.raises((KeyError, InputError)):
        next(write_wide_csv(read_job(SAVED), io.StringIO(), "transmitance"))
