"""Random edits at the window, hundreds or twenty thousand: every panel keeps up, and undo leads to the start."""

import gc
import os
import random
from collections.abc import Callable
from pathlib import Path

import pytest
from PySide6.QtCore import QCoreApplication, QEvent
from PySide6.QtGui import QGuiApplication
from PySide6.QtWidgets import QApplication

from app.document import edits
from app.document.condition_edits import PRESETS
from app.document.condition_rows import KINDS, rows_of
from app.document.document import Cell, Document, Selection
from app.document.edit import Edit
from app.document.view import POWERS
from app.window.beside import BESIDE
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
STRUCTURE = (
    "structure.use",
    "structure.lock",
    "structure.group",
    "structure.end_group",
    "structure.write_out",
    "structure.mirror",
    "structure.reverse",
    "structure.fill",
)
PANELS = [one.name for one in BESIDE if one.in_menu]
PASTED = (
    "Material\tThickness (mm)\ncore\t2,5\nskin\t0.4\n",
    "0.4\n0.5\n",
    "What\tMaterial\tThickness\nLayer, left out\tcore\t3 mm\n",
    "nothing that fits\tat all\n",
    "Sheet\t\t\t377\n",
)
MOST_ELEMENTS = 24
MOST_MEGABYTES = 40.0
"""Measured: 25 MB, of which some 15 are the nine thousand documents that undo keeps. The aim is 20 in all."""
STATM = Path("/proc/self/statm")
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


def change_of_a_condition(dice: random.Random, bench: Bench) -> Edit:
    """Return an edit of a condition, or one that adds another; a few are refused."""
    record = bench.session.record
    if len(record.conditions) < 3 and dice.random() < 0.5:
        return dice.choice((edits.new_condition(), edits.add_condition(dice.choice(PRESETS))))
    if not record.conditions:
        return edits.new_condition()
    condition = dice.choice(record.conditions)
    rows = rows_of(condition)
    choices = [
        edits.add_change(record, condition.name, dice.choice(tuple(KINDS))),
        edits.remove_condition(condition.name),
        edits.rename_condition(condition.name, dice.choice(("Rain", "Snow", "", condition.name))),
    ]
    if rows:
        row = dice.choice(rows)
        choices += [edits.remove_change(condition.name, row)]
        choices += [edits.type_change(condition.name, row, "value", dice.choice(TEXTS))] if row.value else []
    return dice.choice(choices)


def look_elsewhere(dice: random.Random, bench: Bench) -> None:
    """Change what is looked at: quantity, polarizations, comparison, panels beside, theme."""
    record = bench.session.record
    names = [stack.name for stack in record.stacks]
    match dice.randrange(7):
        case 0:
            bench.view.set(quantity=dice.choice(QUANTITIES), power=dice.choice(POWERS))
        case 1:
            bench.view.set(polarizations=dice.choice((("TE",), ("TE", "TM"), ("circular",), ("TM", "tilt 45 deg"))))
        case 2:
            bench.view.set(beside=tuple(dice.sample(names, min(len(names), 1))), less=dice.choice(("", *names)))
        case 3:
            shown = [one.name for one in record.conditions if dice.random() < 0.5]
            bench.view.set(conditions=tuple(shown))
        case 4:
            bench.view.set(log_frequency=dice.random() < 0.5, worst_shown=dice.random() < 0.5)
        case 5:
            bench.trigger(f"view.{dice.choice(PANELS)}")
        case 6:
            bench.window.set_theme_choice(dice.choice(("light", "dark")))


def any_step(dice: random.Random, bench: Bench) -> None:
    """Do one random thing of all that a window can do; few things stay small, so that steps stay quick."""
    kind = dice.random()
    if kind < 0.6:
        one_step(dice, bench)
    elif kind < 0.75:
        bench.trigger(dice.choice(STRUCTURE))
    elif kind < 0.85:
        bench.session.apply(change_of_a_condition(dice, bench))
    elif kind < 0.97:
        look_elsewhere(dice, bench)
    else:
        QGuiApplication.clipboard().setText(dice.choice(PASTED))
        bench.trigger("edit.paste")
    selection = bench.session.selection
    count = len(bench.session.record.stacks[selection.stack].elements)
    if count > MOST_ELEMENTS:
        bench.session.apply(edits.delete(selection.stack, range(MOST_ELEMENTS // 2, count)))


def walk(bench: Bench, seed: int, steps: int, step: Callable[[random.Random, Bench], None]) -> float:
    """Do so many steps, looking after each that table and session agree; return how many MB they took.

    Memory is read from a tenth of the way on: what is made once, such as fonts and the library, is there by then.
    """
    dice = random.Random(seed)
    begun = 0.0
    for number in range(steps):
        step(dice, bench)
        stack = bench.session.record.stacks[bench.session.selection.stack]
        assert rows_of_the_table(bench) == len(stack.elements), f"seed {seed}, step {number}"
        if number % 10 == 0:
            QApplication.processEvents()
            # What an event loop does by itself, and a test that never returns to one does not.
            QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete.value)
        if number == steps // 10:
            begun = megabytes()
    return megabytes() - begun


def megabytes() -> float:
    """Return the memory of this process that is in use, in MB; 0 where the system does not tell."""
    if not STATM.exists():
        return 0.0
    gc.collect()
    return int(STATM.read_text(encoding="ascii").split()[1]) * os.sysconf("SC_PAGE_SIZE") / 1e6


def back_and_forth(bench: Bench, start: Document) -> None:
    """Undo all and redo all: the documents of the start and of now, and a window that shows the latter."""
    end = bench.session.document
    while bench.session.undo_sentence:
        bench.session.undo()
    assert bench.session.document == start
    while bench.session.redo_sentence:
        bench.session.redo()
    assert bench.session.document == end
    bench.settle()
    answer = bench.window.recompute.answer
    assert answer is not None
    assert answer.question.stack == bench.session.job.stacks[bench.session.selection.stack]
    told = bench.window.messages.shown
    # A refusal is an answer; what offers the diagnostics is a failure of the program.
    assert told is None or not any("diagnostics" in choice.words for choice in told.choices)


@pytest.mark.parametrize("seed", [1, 2])
def test_random_edits_and_all_the_way_back(bench: Bench, seed: int) -> None:
    """After each step table and session agree; undo to the start and redo to the end give equal documents."""
    start = bench.session.document
    walk(bench, seed, 150, one_step)
    back_and_forth(bench, start)


@pytest.mark.parametrize("seed", [11, 12])
def test_everything_a_window_can_do_in_any_order(bench: Bench, seed: int) -> None:
    """Structure, conditions, comparisons, panels, pastes and themes as well, on a window that is shown."""
    start = bench.session.document
    walk(bench, seed, 200, any_step)
    back_and_forth(bench, start)


@pytest.mark.slow
def test_twenty_thousand_steps(bench: Bench, record_property: Callable[[str, object], None]) -> None:
    """No exception, no warning of Qt, undo to the start gives the identical job, and memory stays within bounds."""
    start = bench.session.document
    grown = walk(bench, 99, 20_000, any_step)
    back_and_forth(bench, start)
    record_property("grown, MB", grown)
    assert grown < MOST_MEGABYTES
