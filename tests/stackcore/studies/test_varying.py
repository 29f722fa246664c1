"""What can be varied, and that the quick way of varying is the thorough one."""

from collections import Counter

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from stackcore.errors import JobError
from stackcore.job import Job
from stackcore.job.records import JobRecord
from stackcore.stack import Layer
from stackcore.studies import check_values, variations_of, varied, varied_stack
from tests.stackcore.job.strategies import records
from tests.stackcore.studies.jobs import dome_job, variation


def test_all_numbers_of_a_stack_are_there_once() -> None:
    """Elements come first, disabled ones are left out, then the materials used and those they are made of."""
    paths = [found.path for found in variations_of(dome_job(), 0)]
    assert Counter(paths).most_common(1)[0][1] == 1
    assert paths[:4] == [
        "stacks[0].elements[0].thickness",
        "stacks[0].elements[1].thickness",
        "stacks[0].elements[3].resistance",
        "stacks[0].elements[3].capacitance",
    ]
    assert "stacks[0].elements[2].thickness" not in paths  # disabled
    assert {
        "stacks[0].elements[5].conductivity",
        "materials.skin.loss_tangent",
        "materials.core.permittivity[1]",
        "materials.water.terms[0].relaxation_time",
        "materials.damp.inclusions[0].fraction",
        "materials.cover.permittivity",
    } <= set(paths)
    assert [found.path for found in variations_of(dome_job(), 1)] == [
        "stacks[1].elements[0].thickness",
        "materials.core.permittivity",
        "materials.core.permittivity[1]",
    ]


def test_words_and_ranges() -> None:
    """Labels name element or material, and a range goes from half, or from 0, to double."""
    job = dome_job()
    thickness = variation(job, "stacks[0].elements[0].thickness")
    assert (thickness.label, thickness.low, thickness.high) == ("Thickness of element 1 (skin)", 0.45e-3, 1.8e-3)
    tangent = variation(job, "materials.skin.loss_tangent")
    assert (tangent.label, tangent.low, tangent.high) == ("Loss tangent of Glass skin", 0.0, 0.03)
    # Half of 1.1 would be less than vacuum.
    assert variation(job, "materials.core.permittivity").low == 1.0
    assert thickness.values(4).tolist() == np.linspace(0.45e-3, 1.8e-3, 4).tolist()


def test_a_row_of_a_group_changes_wherever_it_is_repeated() -> None:
    """A varied thickness inside a group of three stands in the stack three times."""
    job = dome_job()
    stack = varied_stack(job, variation(job, "stacks[0].elements[1].thickness"), 3e-3)
    assert [one.thickness for one in stack.elements if isinstance(one, Layer)].count(3e-3) == 3


def test_a_material_changes_what_is_made_of_it() -> None:
    """The relaxation time of water reaches the mixture that holds water, and nothing else."""
    job = dome_job()
    stack = varied_stack(job, variation(job, "materials.water.terms[0].relaxation_time"), 20e-12)
    changed = [a != b for a, b in zip(stack.elements, job.stacks[0].elements, strict=True)]
    assert changed == [row == 1 for row in job.rows[0]]


def test_values_out_of_range_are_located() -> None:
    """A value that is not allowed is told at its place in the record, quick way, thorough way and beforehand."""
    job = dome_job()
    thickness = variation(job, "stacks[0].elements[0].thickness")
    for call in (varied_stack, varied):
        with pytest.raises(JobError) as caught:
            call(job, thickness, -1e-3)
        assert [fault.path for fault in caught.value.faults] == [thickness.path]
    with pytest.raises(JobError, match="is negative"):
        check_values(thickness, np.array([1e-3, -1e-3, -2e-3]))


def test_a_sheet_with_nothing_left_is_told() -> None:
    """A resistance of 0 in a sheet that has nothing else is told at its place."""
    job = dome_job()
    bare = varied(job, variation(job, "stacks[0].elements[3].resistance"), 0.0)  # its capacitance is left
    assert (
        bare.stacks[0].elements
        == varied_stack(job, variation(job, "stacks[0].elements[3].resistance"), 0.0).elements
    )
    film = variation(job, "stacks[0].elements[5].thickness")
    with pytest.raises(JobError, match=r"stacks\[0\]\.elements\[5\]\.thickness"):
        varied_stack(job, film, 0.0)


@settings(max_examples=60, deadline=None)
@given(record=records(), data=st.data())
def test_the_quick_way_is_the_thorough_one(record: JobRecord, data: st.DataObject) -> None:
    """Of any job, any variation and any value in its range, both ways agree or both refuse."""
    job = Job(record)
    index = data.draw(st.integers(0, len(job.stacks) - 1))
    found = variations_of(job, index)
    if not found:
        return
    chosen = data.draw(st.sampled_from(found))
    assert chosen.limits.contains(chosen.value)
    assert chosen.limits.contains(chosen.low)
    assert chosen.limits.contains(chosen.high)
    value = data.draw(st.just(chosen.value) | st.floats(chosen.low, chosen.high))
    try:
        thorough = varied(job, chosen, value).stacks[index]
    except JobError:
        # The front half-space is judged over the sweep by the job alone; the solver judges it again.
        front = job.record.stacks[index].front
        if front in ("air", "vacuum"):
            with pytest.raises(JobError):
                varied_stack(job, chosen, value)
        return
    assert varied_stack(job, chosen, value) == thorough
