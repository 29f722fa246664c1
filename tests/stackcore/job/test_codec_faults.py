"""Everything that can be wrong in a job file is told at its place, all at once, with what would be right."""

import json

import pytest

from stackcore.job import limits
from stackcore.job.inspector import MOST_FAULTS
from tests.stackcore.job.examples import MISSING, TREE, changed, faults_in

LAYER = "stacks[0].elements[0]"
SHEET = "stacks[0].elements[1]"

FAULTS: list[tuple[str, object, str, str, str]] = [
    # path that is changed, new value, path that is told, words of the message, words of what is allowed
    ("format", MISSING, "format", "is missing", "'slabwright-job'"),
    ("format", "slabwrite-job", "format", "did you mean 'slabwright-job'", "'slabwright-job'"),
    ("format", 5, "format", "5 is not a job file", "'slabwright-job'"),
    ("version", MISSING, "version", "is missing", "1"),
    ("version", "1", "version", "'1' is not a version", "from 1 to 1"),
    ("version", True, "version", "true is not a version", "from 1 to 1"),
    ("version", 1.5, "version", "1.5 is not a version", "from 1 to 1"),
    ("version", 0, "version", "never was a version 0", "from 1 to 1"),
    ("version", 2, "version", "version 2, newer than version 1", "a newer slabwright"),
    ("title", 5, "title", "5 is not a text", "quotation marks"),
    ("title", "\ud800", "title", "half a character", "whole characters"),
    ("notes", None, "notes", "null is not a text", "quotation marks"),
    ("nots", "", "nots", "unknown key 'nots', did you mean 'notes'", "'notes'"),
    ("materials", [], "materials", "a list of 0 is not an object", "materials"),
    ("materials.skin", 4.2, "materials.skin", "4.2 is not an object", "{...}"),
    ("materials.skin.modle", "constant", "materials.skin.modle", "did you mean 'model'", "'model'"),
    ("materials.skin.model", "constnat", "materials.skin.model", "did you mean 'constant'", "'conductor'"),
    ("materials.skin.model", 5, "materials.skin.model", "5 is not known", "'constant'"),
    ("materials.skin.model", MISSING, "materials.skin.model", "is missing", "library"),
    ("materials.skin.permittivity", MISSING, "materials.skin.permittivity", "is missing", "'constant' needs it"),
    ("materials.skin.permittivity", "4.2", "materials.skin.permittivity", "'4.2'", "a number"),
    ("materials.skin.permittivity", True, "materials.skin.permittivity", "true is not a number", "a number"),
    ("materials.skin.permittivity", None, "materials.skin.permittivity", "null is not a number", "a number"),
    ("materials.skin.permittivity", {}, "materials.skin.permittivity", "is not a number", "a number"),
    ("materials.skin.permittivity", float("nan"), "materials.skin.permittivity", "nan", "a number"),
    ("materials.skin.permittivity", float("inf"), "materials.skin.permittivity", "inf", "a number"),
    ("materials.skin.permittivity", 0, "materials.skin.permittivity", "must not be 0", "4.2"),
    ("materials.skin.permittivity", 1e13, "materials.skin.permittivity", "too large", "1e12"),
    ("materials.skin.permittivity", -4.2, "materials.skin.loss_tangent", "would be gain", "[real, loss]"),
    ("materials.skin.permittivity", [4.2, 0.06], "materials.skin.loss_tangent", "given twice", "alone"),
    ("materials.skin.permittivity", [4.2, 0], "materials.skin.loss_tangent", "given twice", "alone"),
    ("materials.skin.loss_tangent", -0.1, "materials.skin.loss_tangent", "negative", "0 or 1e-30"),
    ("materials.skin.loss_tangent", 1e10, "materials.skin.loss_tangent", "too large", "1e9"),
    ("materials.skin.loss_tangent", "1 %", "materials.skin.loss_tangent", "'1 %'", "0.015"),
    ("materials.skin.conductivity", "5 S/m", "materials.skin.conductivity", "'constant' has no", "'permittivity'"),
    ("materials.ferrite.permittivity", [12.0, -0.5], "materials.ferrite.permittivity", "gain", "loss 0 or more"),
    ("materials.ferrite.permittivity", [12.0], "materials.ferrite.permittivity", "[12.0]", "[real, loss]"),
    ("materials.ferrite.permittivity", [1, 2, 3], "materials.ferrite.permittivity", "[1, 2, 3]", "[real, loss]"),
    ("materials.ferrite.permeability", [2.0, True], "materials.ferrite.permeability", "True", "[real, loss]"),
    ("materials.ferrite.permeability", [0, 0], "materials.ferrite.permeability", "must not be 0", "[4.2"),
    ("materials.steel.conductivity", MISSING, "materials.steel.conductivity", "is missing", "'conductor' needs it"),
    ("materials.steel.conductivity", "6 MHz", "materials.steel.conductivity", "a frequency", "%IACS"),
    ("materials.steel.conductivity", 0, "materials.steel.conductivity", "'0' is 0", "more than 0"),
    ("materials.steel.conductivity", "-1 S/m", "materials.steel.conductivity", "is negative", "more than 0"),
    ("materials.steel.conductivity", "1e20 S/m", "materials.steel.conductivity", "too large", "1e15 S/m"),
    ("materials.steel.permittivity", 1, "materials.steel.permittivity", "has no permittivity", "'permeability'"),
    ("materials.copper.library", "metals/coper", "materials.copper.library", "'metals/copper'", "family"),
    ("materials.copper.library", "coper", "materials.copper.library", "no material 'coper'", "family/name"),
    ("materials.copper.library", 7, "materials.copper.library", "7 is not a text", "quotation marks"),
    ("materials.copper.model", "constant", "materials.copper.library", "not 'constant'", "without a model"),
    ("materials.copper.permittivity", 3, "materials.copper.permittivity", "has no permittivity", "'conductivity'"),
    ("materials.air", {"model": "constant", "permittivity": 1}, "materials.air", "always defined", "another name"),
    (
        "materials.metal",
        {"model": "constant", "permittivity": 1},
        "materials.metal",
        "perfect back",
        "another name",
    ),
    ("stacks", [], "stacks", "no stack", "at least one"),
    ("stacks", {}, "stacks", "is not a list", "[...]"),
    ("stacks", MISSING, "stacks", "is missing", '"stacks": [{'),
    ("stacks[0]", "A", "stacks[0]", "'A' is not an object", "{...}"),
    ("stacks[0].name", MISSING, "stacks[0].name", "is missing", '"name": "A"'),
    ("stacks[0].name", "", "stacks[0].name", "is empty", "a name"),
    ("stacks[0].layers", [], "stacks[0].layers", "unknown key", "'elements'"),
    ("stacks[0].elements", MISSING, "stacks[0].elements", "is missing", '"elements": []'),
    ("stacks[0].elements", "none", "stacks[0].elements", "is not a list", "[...]"),
    ("stacks[0].front", "ari", "stacks[0].front", "did you mean 'air'", "'skin'"),
    ("stacks[0].front", 1, "stacks[0].front", "1 is not a text", "quotation marks"),
    ("stacks[0].front", "metal", "stacks[0].front", "cannot come from a perfect conductor", "lossless"),
    ("stacks[0].front", "skin", "stacks[0].front", "'skin' absorbs", "without loss"),
    ("stacks[0].front", "steel", "stacks[0].front", "'steel' absorbs", "without loss"),
    ("stacks[0].back", "metals", "stacks[0].back", "unknown material 'metals'", "'metal'"),
    (LAYER, 5, LAYER, "5 is not an element", "thickness"),
    (LAYER, {}, LAYER, "neither a layer nor a sheet", "thickness"),
    (LAYER, {"layer": "skin", "sheet": "series"}, LAYER, "both a layer and a sheet", "thickness"),
    (f"{LAYER}.layer", "skni", f"{LAYER}.layer", "did you mean 'skin'", "'steel'"),
    (f"{LAYER}.layer", None, f"{LAYER}.layer", "null is not a text", "quotation marks"),
    (f"{LAYER}.thickness", MISSING, f"{LAYER}.thickness", "is missing", '"thickness": "1 mm"'),
    (f"{LAYER}.thickness", "-2 mm", f"{LAYER}.thickness", "'-2 mm' is negative", "0 m"),
    (f"{LAYER}.thickness", "5 GHz", f"{LAYER}.thickness", "'5 GHz' is a frequency, not a length", "'2 mm'"),
    (f"{LAYER}.thickness", "5 mmm", f"{LAYER}.thickness", "did you mean 'mm'", "'2 mm'"),
    (f"{LAYER}.thickness", "1,500 mm", f"{LAYER}.thickness", "1.500 or 1500", "1.500 or 1500"),
    (f"{LAYER}.thickness", True, f"{LAYER}.thickness", "true is not a length", "'2 mm'"),
    (f"{LAYER}.thickness", [1], f"{LAYER}.thickness", "a list of 1 is not a length", "'2 mm'"),
    (f"{LAYER}.thickness", float("nan"), f"{LAYER}.thickness", "nan is not a finite number", "'2 mm'"),
    (f"{LAYER}.thickness", 10**400, f"{LAYER}.thickness", "not a finite number", "'2 mm'"),
    (f"{LAYER}.thickness", "2e6 m", f"{LAYER}.thickness", "too large", "1e6 m"),
    (f"{LAYER}.thicknes", "1 mm", f"{LAYER}.thicknes", "did you mean 'thickness'", "'layer'"),
    (f"{SHEET}.sheet", "serise", f"{SHEET}.sheet", "did you mean 'series'", "'series'"),
    (f"{SHEET}.resistance", "-1 ohm/sq", f"{SHEET}.resistance", "is negative", "0 ohm/sq"),
    (f"{SHEET}.inductance", "1 pF", f"{SHEET}.inductance", "a capacitance, not an inductance", "pH"),
    (f"{SHEET}.capacitance", "0 F", f"{SHEET}.capacitance", "is 0", "1e-30 F"),
    (f"{SHEET}.capacitance", "1e-31 F", f"{SHEET}.capacitance", "is too small", "1e-30 F"),
    (SHEET, {"sheet": "series"}, SHEET, "nothing in this sheet", "'resistance'"),
    (SHEET, {"sheet": "series", "resistance": 0}, f"{SHEET}.resistance", "perfect conductor", "more than 0"),
    ("sweep", MISSING, "sweep", "is missing", '"sweep": {'),
    ("sweep", [], "sweep", "a list of 0 is not an object", "{...}"),
    ("sweep.frequency", MISSING, "sweep.frequency", "is missing", '"frequency"'),
    ("sweep.angle", MISSING, "sweep.angle", "is missing", '"angle"'),
    ("sweep.polarization", "TE", "sweep.polarization", "unknown key", "'frequency'"),
    ("sweep.frequency", "10 GHz", "sweep.frequency", "neither a grid nor a list", "'10 GHz'"),
    ("sweep.frequency", [], "sweep.frequency", "the list is empty", "at least one"),
    ("sweep.frequency", ["0 Hz"], "sweep.frequency[0]", "'0 Hz' is 0", "0.001 Hz"),
    ("sweep.frequency", ["1 GHz", "-1 GHz"], "sweep.frequency[1]", "is negative", "0.001 Hz"),
    ("sweep.frequency", ["1e30 Hz"], "sweep.frequency[0]", "is too large", "1e18 Hz"),
    ("sweep.frequency.start", "0 GHz", "sweep.frequency.start", "is 0", "0.001 Hz"),
    ("sweep.frequency.start", "13 GHz", "sweep.frequency.stop", "below the start, '13 GHz'", "above the start"),
    ("sweep.frequency.start", "12 GHz", "sweep.frequency.stop", "also the start of 401 points", "or 1 point"),
    ("sweep.frequency.start", MISSING, "sweep.frequency.start", "is missing", '"start"'),
    ("sweep.frequency.points", 0, "sweep.frequency.points", "0 is too few", "from 1 to 1000000"),
    ("sweep.frequency.points", 1_000_001, "sweep.frequency.points", "too many", "from 1 to 1000000"),
    ("sweep.frequency.points", 10**300, "sweep.frequency.points", "too many", "from 1 to 1000000"),
    ("sweep.frequency.points", 4.5, "sweep.frequency.points", "4.5 is not a whole number", "from 1 to 1000000"),
    ("sweep.frequency.points", True, "sweep.frequency.points", "true is not a whole number", "1000000"),
    ("sweep.frequency.points", "401", "sweep.frequency.points", "'401' is not a whole number", "1000000"),
    ("sweep.frequency.spacing", "lin", "sweep.frequency.spacing", "did you mean 'linear'", "'log'"),
    ("sweep.angle", ["90 deg"], "sweep.angle[0]", "'90 deg' is out of range", "below 90 deg"),
    ("sweep.angle", ["-1 deg"], "sweep.angle[0]", "'-1 deg' is out of range", "below 90 deg"),
    ("sweep.angle", [45], "sweep.angle[0]", "'45' is out of range", "without a unit, rad"),
    ("sweep.angle", ["5 mm"], "sweep.angle[0]", "a length, not an angle", "'30 deg'"),
    ("sweep.angle", {"start": 0, "stop": "95 deg", "points": 5}, "sweep.angle.stop", "'95 deg'", "below 90 deg"),
    ("sweep.angle", {"start": 0, "stop": 1}, "sweep.angle.points", "is missing", '"points"'),
    ("sweep.angle", {"start": 0, "stop": 1, "points": 50_000}, "sweep", "20050000 points", "20000000"),
]


@pytest.mark.parametrize(("place", "value", "path", "message", "allowed"), FAULTS)
def test_one_fault_is_told_once_and_at_its_place(
    place: str, value: object, path: str, message: str, allowed: str
) -> None:
    """One change that makes the file wrong gives one fault: its path, what was given, what is allowed."""
    faults = [fault for fault in faults_in(changed((place, value))) if fault.path == path]
    assert len(faults) == 1
    assert message in faults[0].message
    assert allowed in faults[0].allowed
    assert str(faults[0]).isprintable()


ALONE = [case for case in FAULTS if case[0] not in ("materials", "materials.air", "materials.metal")]


@pytest.mark.parametrize(("place", "value", "path", "message", "allowed"), ALONE)
def test_one_fault_does_not_drag_others_along(
    place: str, value: object, path: str, message: str, allowed: str
) -> None:
    """What stands in for a wrong value causes no second fault elsewhere."""
    told = {fault.path: str(fault) for fault in faults_in(changed((place, value)))}
    assert set(told) == {path}
    assert message in told[path]
    assert allowed in told[path]


def test_all_faults_come_at_once_in_the_order_of_the_file() -> None:
    """Faults of types, of units, of references and of ranges are told together, top to bottom."""
    tree = changed(
        ("title", 5),
        ("materials.skin.model", "constnat"),
        ("materials.steel.conductivity", "6 GHz"),
        ("materials.copper.library", "metals/coper"),
        ("stacks[0].front", "ferrite"),
        (f"{LAYER}.thickness", "-1 mm"),
        (f"{SHEET}.resistence", 1),
        ("stacks[0].elements[2].layer", "gold"),
        ("sweep.frequency.points", 0),
        ("sweep.angle", ["90 deg", "5 xx"]),
    )
    assert [fault.path for fault in faults_in(tree)] == [
        "title",
        "materials.skin.model",
        "materials.steel.conductivity",
        "materials.copper.library",
        "stacks[0].front",
        f"{LAYER}.thickness",
        f"{SHEET}.resistence",
        "stacks[0].elements[2].layer",
        "sweep.frequency.points",
        "sweep.angle[0]",
        "sweep.angle[1]",
    ]


def test_names_of_stacks_are_not_used_twice() -> None:
    """The second of two stacks with one name is told, and which one has it already."""
    stack = TREE["stacks"][0]
    faults = faults_in(changed(("stacks", [stack, {**stack, "name": "B"}, stack])))
    assert [(fault.path, "stacks[0]" in fault.message) for fault in faults] == [("stacks[2].name", True)]


@pytest.mark.parametrize(
    ("old", "new", "path"),
    [
        ('"title":', '"title": "A", "title":', "title"),
        ('"skin":', '"skin": {}, "skin":', "materials.skin"),
        ('"permeability": 200', '"permeability": 200, "permeability": 100', "materials.steel.permeability"),
        ('"thickness": "1.0 mm"', '"thickness": "1 mm", "thickness": "2 mm"', f"{LAYER}.thickness"),
        ('"points": 401', '"points": 401, "points": 401', "sweep.frequency.points"),
    ],
)
def test_keys_are_not_given_twice(old: str, new: str, path: str) -> None:
    """A key that is given twice is told at its place, whatever the two values are."""
    text = json.dumps(TREE)
    assert old in text
    faults = faults_in(text.replace(old, new, 1))
    assert [fault.path for fault in faults] == [path]
    assert "more than once" in faults[0].message


def test_a_key_with_odd_letters_is_quoted_in_the_path() -> None:
    """A material whose name is not one word stands in the path as it does in the file."""
    tree = changed(("materials", {"E glass\n": {"model": "x"}}), ("stacks[0].elements", []))
    assert [fault.path for fault in faults_in(tree)] == ['materials["E glass\\n"].model']


def test_a_newer_version_is_the_only_fault() -> None:
    """Of a newer file nothing else is told, since its other keys may be right there."""
    faults = faults_in(changed(("version", 3), ("title", 5), ("future", 1)))
    assert len(faults) == 1
    assert "version 3" in faults[0].message
    assert "version 1" in faults[0].message


def test_another_format_is_the_only_fault() -> None:
    """Of a JSON file that is something else nothing but that is told."""
    assert [fault.path for fault in faults_in({"format": "notebook", "cells": []})] == ["format"]


def test_a_flood_of_faults_is_counted() -> None:
    """Beyond some hundreds, faults are counted and no longer listed."""
    faults = faults_in(changed(("sweep.angle", ["95 deg"] * (MOST_FAULTS + 7))))
    assert len(faults) == MOST_FAULTS + 1
    assert faults[-1].message == "7 more faults are not listed"


def test_an_object_of_many_wrong_keys_is_cut_short() -> None:
    """An object with a hundred thousand unknown keys is refused without comparing each with the known ones."""
    faults = faults_in(changed(("sweep", {f"key{number}": 0 for number in range(100_000)})))
    assert len(faults) == MOST_FAULTS + 1


@pytest.mark.parametrize(
    ("place", "value", "path"),
    [
        ("stacks", [{}] * (limits.MOST_STACKS + 1), "stacks"),
        ("stacks[0].elements", [{}] * (limits.MOST_ELEMENTS + 1), "stacks[0].elements"),
        ("sweep.frequency", ["1 GHz"] * (limits.MOST_LISTED + 1), "sweep.frequency"),
    ],
)
def test_a_list_that_is_too_long_is_refused_as_a_whole(place: str, value: object, path: str) -> None:
    """A list beyond its limit is one fault with the count and the limit, and its items are not looked at."""
    faults = [fault for fault in faults_in(changed((place, value))) if fault.path == path]
    assert len(faults) == 1
    assert "at most" in faults[0].allowed


def test_too_many_materials_are_refused() -> None:
    """A job of more materials than anybody can mean is refused as a whole."""
    many: dict[str, object] = {f"m{number}": {} for number in range(limits.MOST_MATERIALS + 1)}
    faults = faults_in(changed(("materials", many), ("stacks[0].elements", [])))
    assert [fault.path for fault in faults] == ["materials"]


def test_a_list_within_its_limit_is_read() -> None:
    """A long list of frequencies that is within the limit is read."""
    assert faults_in(changed(("sweep.frequency", [1e9 + number for number in range(5000)]))) == ()
