"""Hundreds of random edits at the window: every panel keeps up, and undoing all gives the job of the start."""

import random

import pytest
from PySide6.QtWidgets import QApplication

from app.document import edits
from app.document.document import Cell, Selection
from app.document.edit import Edit
from app.document.view import POWERS
from stackcore.job.records import LayerRecord
from stackcore.units import Dimension, parse_measure
from tests.app.window.conftest import Bench

ACTS = (
    "edit.undo",
    "edit.redo",
    "edit.add_layer",
    "edit.add_sheet",
    "edit.duplicate",
    "edit.delete",
    "edit.up",
    "edit.down",
    "edit.copy",
    "edit.paste",
    "stack.add",
    "stack.duplicate",
    "stack.delete",
    "stack.next",
    "stack.previous",
    "markers.add",
    "markers.next",
    "markers.worst",
    "markers.remove",
)
TEXTS = ("1 mm", "0.2 mm", "1/8 in", "two", "", "-1 mm", "3,5 mm", "40 mil", "1e9 km", "0 mm")
QUANTITIES = ("transmittance", "insertion_loss_dB", "return_loss_dB", "reflection_phase_deg", "group_delay_s")


def random_edit(dice: random.Random, bench: Bench) -> Edit:
    """Return an edit that may be good, a draft, or refused."""
    stack = bench.session.selection.stack
    elements = bench.session.record.stacks[stack].elements
    row = dice.randrange(len(elements)) if elements else 0
    column = "thickness" if elements and isinstance(elements[row], LayerRecord) else "resistance"
    choices = (
        edits.set_thickness(stack, row, dice.uniform(0, 0.01), merge_key=dice.choice((None, "drag"))),
        edits.type_into(Cell(stack, row, column), dice.choice(TEXTS)),
        edits.change_material(stack, row, dice.choice(("skin", "core", "steel", "air", "nothing"))),
        edits.add_layer(stack, row, "core", parse_measure("2 mm", Dimension.LENGTH)),
        edits.move(stack, [row], dice.randrange(len(elements) + 1)),
        edits.set_back(stack, dice.choice(("air", "metal", "skin"))),
        edits.set_angles(dice.choice((("0 deg",), ("0 deg", "30 deg", "60 deg"), ("10 deg", "89 deg")))),
        edits.set_title(dice.choice(("one", "two", ""))),
    )
    return dice.choice(choices)


def one_step(dice: random.Random, bench: Bench) -> None:
    """Do one random thing."""
    kind = dice.random()
    stack = bench.session.selection.stack
    count = len(bench.session.record.stacks[stack].elements)
    if kind < 0.45:
        bench.trigger(dice.choice(ACTS))
    elif kind < 0.85:
        bench.session.apply(random_edit(dice, bench))
    elif kind < 0.95 and count:
        bench.session.select(Selection(stack, tuple(sorted(dice.sample(range(count), min(count, 2))))))
    else:
        bench.view.set(quantity=dice.choice(QUANTITIES), power=dice.choice(POWERS))
    if len(bench.session.record.stacks) > 4:
        bench.trigger("stack.delete")


def rows_of_the_table(bench: Bench) -> int:
    """Return how many elements the table shows."""
    return bench.window.panels.elements.table.elements_model().rowCount() - 2


@pytest.mark.parametrize("seed", [1, 2, 3])
def test_random_edits_and_all_the_way_back(bench: Bench, seed: int) -> None:
    """After each step table and session agree; undo to the start and redo to the end give equal documents."""
    dice = random.Random(seed)
    start = bench.session.document
    for step in range(150):
        one_step(dice, bench)
        stack = bench.session.record.stacks[bench.session.selection.stack]
        assert rows_of_the_table(bench) == len(stack.elements), f"step {step}"
        if step % 10 == 0:
            QApplication.processEvents()
    end = bench.session.document
    while bench.session.undo_sentence:
        bench.trigger("edit.undo")
    assert bench.session.document == start
    while bench.session.redo_sentence:
        bench.trigger("edit.redo")
    assert bench.session.document == end
    bench.settle()
    answer = bench.window.recompute.answer
    assert answer is not None
    assert answer.question.stack == bench.session.job.stacks[bench.session.selection.stack]
    assert bench.window.messages.shown is None or bench.window.messages.shown.severity != "error"
