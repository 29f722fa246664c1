"""The menu Build-up on a whole window: what it does to the job, when it is offered, and the menu of the table."""

from app.document import edits
from app.document.document import Selection
from stackcore.job.records import Group, LayerRecord
from stackcore.units import Dimension, parse_measure
from tests.app.window.conftest import Bench


def three_layers(bench: Bench) -> None:
    """Give the stack three layers and a sheet, with nothing selected."""
    session = bench.session
    count = len(session.record.stacks[0].elements)
    session.apply(edits.delete(0, range(count)))
    for place, text in enumerate(("1 mm", "2 mm", "3 mm")):
        session.apply(edits.add_layer(0, place, "air", parse_measure(text, Dimension.LENGTH)))
    session.apply(edits.add_sheet(0, 3))
    session.select(Selection(0))


def thicknesses(bench: Bench) -> list[str]:
    """Return the thicknesses of the layers."""
    elements = bench.session.record.stacks[0].elements
    return [element.thickness.text for element in elements if isinstance(element, LayerRecord)]


def enabled(bench: Bench, *keys: str) -> list[bool]:
    """Return whether acts are offered."""
    return [bench.window.actions_table[f"structure.{key}"].isEnabled() for key in keys]


def test_acts_are_offered_when_they_can_do_something(bench: Bench) -> None:
    """With nothing selected, one layer, a sheet, a group."""
    three_layers(bench)
    keys = ("use", "lock", "group", "end_group", "mirror", "fill")
    assert enabled(bench, *keys) == [False, False, False, False, True, False]
    assert not bench.window.actions_table["structure.use"].isChecked()
    bench.session.select(Selection(0, (0,)))
    assert enabled(bench, *keys) == [True, True, True, False, True, False]
    assert bench.window.actions_table["structure.use"].isChecked()
    bench.session.select(Selection(0, (3,)))
    assert enabled(bench, *keys) == [True, False, True, False, True, False]
    bench.session.apply(edits.group_rows(0, (0, 1)))
    bench.session.select(Selection(0, (0, 1)))
    assert enabled(bench, *keys) == [True, True, False, True, True, True]
    bench.session.apply(edits.delete(0, (1, 2, 3)))
    assert enabled(bench, "mirror") == [False]


def test_each_act_does_what_it_says_and_is_undone(bench: Bench) -> None:
    """Through the menu's own actions, each one step."""
    three_layers(bench)
    start = bench.session.record
    bench.session.select(Selection(0, (0, 1, 2)))
    for key, after in (
        ("mirror", ["1 mm", "2 mm", "3 mm", "2 mm", "1 mm"]),
        ("reverse", ["3 mm", "2 mm", "1 mm"]),
        ("fill", ["1 mm", "1 mm", "1 mm"]),
    ):
        bench.trigger(f"structure.{key}")
        assert thicknesses(bench) == after
        bench.session.undo()
        assert bench.session.record == start
        bench.session.select(Selection(0, (0, 1, 2)))
    bench.session.select(Selection(0, (0, 1)))
    bench.trigger("structure.group")
    assert bench.session.record.stacks[0].groups == (Group(0, 1, 2),)
    bench.trigger("structure.write_out")
    assert thicknesses(bench) == ["1 mm", "2 mm", "1 mm", "2 mm", "3 mm"]
    bench.session.undo()
    bench.session.undo()
    bench.session.select(Selection(0, (1, 3)))
    bench.trigger("structure.lock")
    bench.trigger("structure.use")
    elements = bench.session.record.stacks[0].elements
    assert [element.locked for element in elements] == [False, True, False, False]
    assert [element.enabled for element in elements] == [True, False, True, False]
    for _ in range(2):
        bench.session.undo()
    assert bench.session.record == start


def test_the_menu_of_the_table_is_the_menus_of_the_window(bench: Bench) -> None:
    """Cut, copy, paste and the acts of Build-up are there, the very same actions, and nothing twice."""
    table = bench.window.panels.elements.table
    texts = [action.text().replace("&", "") for action in table.actions() if not action.isSeparator()]
    assert {"Copy", "Cut", "Paste", "Duplicate", "Mirror", "Repeat as a group", "Fill down"} <= set(texts)
    assert len(set(texts)) == len(texts)
    assert bench.window.actions_table["structure.mirror"] in table.actions()
