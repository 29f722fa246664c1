"""One file of the material library: TOML text -> entries, and every fault with its place.

A file is a family. It starts with a table ``family`` (``label``, and ``note`` if wanted); each entry is a
table ``[[material]]``:

    [[material]]
    name = "copper"                    # lower case, digits and hyphens; the entry is metals/copper
    label = "Copper"
    also = ["Cu"]                      # further words to find it by; may be left out
    model = "conductor"                # a name of stackcore.media.models.MODELS, which has the constants
    conductivity = "59.6 MS/m"
    range = ["1 Hz", "300 GHz"]        # where the constants hold; left out where it follows from other entries
    source = "..."                     # publication with edition; common practice says that it is
    certainty = "read"                 # read, recalled or common practice
    spread = { conductivity = 0.01 }   # relative, one standard deviation, for ε, μ, tan δ and σ where given
    note = "20 °C; ..."                # temperature, form, cautions; may be left out
    density = "8960 kg/m3"             # may be left out, as what follows
    ply_thickness = "0.25 mm"          # of one cured ply, of what is built up of plies
    states = { hot = { conductivity = "45 MS/m", note = "100 °C" } }   # constants that differ in a named state

An entry may be made of others: ``host = "plastics/ptfe"``. An entry with a fault is left out; the others of the
file stay.
"""

import math
import re
import tomllib
from dataclasses import dataclass, field
from typing import Final

from stackcore.errors import Fault, LibraryError, UnitError, nearest
from stackcore.media.base import FrequencyRange, Provenance
from stackcore.media.library_entry import Draft, EntryState, Facts, Family, FamilyFile, media_of
from stackcore.media.models import CONSTANT_NAMES, MODELS, Constants, Model
from stackcore.media.models.completing import completed
from stackcore.units import Dimension, Measure, parse_measure

CERTAINTIES: Final = ("read", "recalled", "common practice")
"""How a value is known: read in the source, remembered from it, or what the trade takes as typical."""

_NAME: Final = re.compile(r"[a-z0-9]+(-[a-z0-9]+)*")
_ENTRY_KEYS: Final = (
    *("name", "label", "also", "model", "range", "source", "certainty", "spread", "note"),
    *("density", "ply_thickness", "states"),
)
_STATE_KEYS: Final = ("source", "note")
_FAMILY_KEYS: Final = ("label", "note")

_Table = dict[str, object]


def parse_family(key: str, content: bytes, place: str = "") -> FamilyFile:
    """Return what stands in the file of the family `key`; faults are collected, none is raised.

    `place` is what faults call the file; ``key.toml`` when empty.
    """
    place = place or f"{key}.toml"
    try:
        # A byte order mark is what some editors put in front of UTF-8; TOML itself does not take it.
        tables = tomllib.loads(content.decode("utf-8-sig"))
    except UnicodeDecodeError as error:
        return FamilyFile(key, key, "", (), (Fault(place, f"is not UTF-8: {error}", "a TOML file in UTF-8"),))
    except (tomllib.TOMLDecodeError, RecursionError, ValueError) as error:  # brackets too deep, numbers too long
        return FamilyFile(key, key, "", (), (Fault(place, f"is not TOML: {error}", "a TOML file"),))
    reading = _Reading(key, place)
    label, note = reading.head(tables)
    for position, table in enumerate(reading.materials(tables)):
        reading.entry(position, table)
    return FamilyFile(key, label, note, tuple(reading.drafts), tuple(reading.faults))


def read_family(key: str, content: bytes) -> Family:
    """Return the family `key` from the bytes of its file; faults are collected, none is raised.

    An entry may be made of others of the same file.

    Examples
    --------
    >>> read_family("metals", b"[family").faults[0].path
    'metals.toml'
    """
    parsed = parse_family(key, content)
    drafts = {draft.key: draft for draft in parsed.drafts}
    entries, faults = [], list(parsed.faults)
    for draft in parsed.drafts:
        try:
            entries.append(draft.entry(media_of(draft, drafts.get)))
        except LibraryError as error:
            faults += error.faults
    return Family(key, parsed.label, parsed.note, tuple(entries), tuple(faults))


@dataclass(slots=True)
class _Reading:
    """The reading of one file: drafts and faults as they come."""

    family: str
    file: str
    drafts: list[Draft] = field(default_factory=list)
    faults: list[Fault] = field(default_factory=list)
    taken: set[tuple[str, str]] = field(default_factory=set)

    def fault(self, place: str, message: str, allowed: str = "") -> None:
        self.faults.append(Fault(f"{self.file}: {place}", message, allowed))

    def head(self, tables: _Table) -> tuple[str, str]:
        """Return label and note of the family."""
        self.check_keys("", tables, ("family", "material"))
        table = tables.get("family")
        if not isinstance(table, dict):
            self.fault("family", "the table is missing", '[family] with label = "..." in it')
            return self.family, ""
        self.check_keys("family.", table, _FAMILY_KEYS)
        return self.text("family.", table, "label") or self.family, self.text("family.", table, "note", "")

    def materials(self, tables: _Table) -> list[_Table]:
        value = tables.get("material", [])
        if isinstance(value, list) and all(isinstance(table, dict) for table in value):
            return value
        self.fault("material", "is not a list of tables", "[[material]] above each entry")
        return []

    def entry(self, position: int, table: _Table) -> None:
        """Read one entry into `drafts`; with a fault anywhere in it, only its faults are kept."""
        before = len(self.faults)
        name = self.name(position, table)
        place = f"{name or f'material[{position}]'}."
        label = self.own(place, "label", self.text(place, table, "label"))
        also = self.words(place, table)
        model = self.model(place, table)
        valid_range = self.valid_range(place, table, model)
        source, certainty = self.text(place, table, "source"), self.certainty(place, table)
        note = self.text(place, table, "note", "")
        constants = self.constants(place, table, model) if model else Constants()
        spread = self.spread(place, table, model)
        facts = self.facts(place, table, model, constants)
        if model is None or len(self.faults) > before:
            return
        provenance, key = Provenance(source, certainty, spread, note), f"{self.family}/{name}"
        where = f"{self.file}: {name}"
        self.drafts.append(Draft(where, key, label, model, constants, valid_range, provenance, also, facts))

    def facts(self, place: str, table: _Table, model: Model | None, constants: Constants) -> Facts:
        """Return density, ply thickness and states."""
        states = table.get("states", {})
        if not isinstance(states, dict):
            self.fault(f"{place}states", f"{states!r} is not a table", "{ wet = { loss_tangent = 0.03 } }")
            states = {}
        return Facts(
            self.quantity(place, table, "density", Dimension.MASS_DENSITY),
            self.quantity(place, table, "ply_thickness", Dimension.LENGTH),
            tuple(
                self.state(f"{place}states.{name}.", name, state, model, constants)
                for name, state in states.items()
                if model is not None
            ),
        )

    def quantity(self, place: str, table: _Table, key: str, dimension: Dimension) -> Measure | None:
        """Return a quantity that may be left out; it must be more than 0."""
        value = table.get(key)
        if value is None:
            return None
        try:
            found = parse_measure(value if isinstance(value, str) else "", dimension)
        except UnitError as error:
            self.fault(f"{place}{key}", error.message, error.allowed)
            return None
        if found.value <= 0:
            self.fault(f"{place}{key}", f"{found.text} is not above 0", f"for example {dimension.example}")
            return None
        return found

    def state(self, place: str, name: str, value: object, model: Model, constants: Constants) -> EntryState:
        """Return a state; together with the constants of the entry it must make a material."""
        if not isinstance(value, dict):
            self.fault(place[:-1], f"{value!r} is not a table", "{ loss_tangent = 0.03 }")
            return EntryState(name, Constants())
        self.check_keys(place, value, (*_STATE_KEYS, *model.names))
        texts = {key: self.text(place, value, key, "") for key in _STATE_KEYS}
        told: set[str] = set()

        def tell(path: str, message: str, allowed: str) -> None:
            told.add(path)
            self.fault(f"{place}{path.removeprefix('.')}", message, allowed)

        given = model.read(value, "", tell)
        if not given and not told:
            self.fault(place[:-1], "nothing differs in this state", "{ loss_tangent = 0.03 }")
        elif not told:
            for fault in model.faults(completed(given, constants), ""):
                tell(fault.path, fault.message, fault.allowed)
        return EntryState(name, given, **texts)

    def check_keys(self, place: str, table: _Table, known: tuple[str, ...]) -> None:
        for key in table:
            if key not in known:
                self.fault(f"{place}{key}", f"unknown key{nearest(key, known)}", f"one of {', '.join(known)}")

    def text(self, place: str, table: _Table, key: str, default: str | None = None) -> str:
        """Return a text of the table; one that is missing without a default, or not a text, is a fault."""
        value = table.get(key, default)
        if isinstance(value, str) and (value.strip() or key not in table):
            return value.strip()
        given = f"{value!r} is not a text with something in it" if key in table else "is missing"
        self.fault(f"{place}{key}", given, "a text in quotation marks")
        return ""

    def own(self, place: str, key: str, text: str) -> str:
        """Return `text`; a fault when another entry of the file has it already as its `key`."""
        if text and (key, text) in self.taken:
            self.fault(f"{place}{key}", f"{text!r} is used twice in this file", f"a {key} of its own")
        self.taken.add((key, text))
        return text

    def name(self, position: int, table: _Table) -> str:
        place = f"material[{position}]."
        name = self.text(place, table, "name")
        if name and not _NAME.fullmatch(name):
            self.fault(f"{place}name", f"{name!r} is not a name", "lower case, digits and hyphens: fused-quartz")
            return ""
        return self.own(place, "name", name)

    def words(self, place: str, table: _Table) -> tuple[str, ...]:
        value = table.get("also", [])
        if isinstance(value, list) and all(isinstance(word, str) for word in value):
            return tuple(value)
        self.fault(f"{place}also", f"{value!r} is not a list of texts", 'for example ["Cu"]')
        return ()

    def certainty(self, place: str, table: _Table) -> str:
        value = self.text(place, table, "certainty")
        if value and value not in CERTAINTIES:
            known = f"one of {', '.join(CERTAINTIES)}"
            self.fault(f"{place}certainty", f"{value!r} is not known{nearest(value, CERTAINTIES)}", known)
        return value

    def valid_range(self, place: str, table: _Table, model: Model | None) -> FrequencyRange | None:
        if "range" not in table and model is not None and model.nested:
            return None
        if "range" in table and model is not None and not model.ranged:
            self.fault(f"{place}range", f"the model {model.name!r} takes its range from its parts", "no range here")
            return None
        allowed = 'the lower and the upper end; for example ["8 GHz", "12.4 GHz"]'
        value = table.get("range")
        if not (isinstance(value, list) and len(value) == 2 and all(isinstance(end, str) for end in value)):
            given = f"{value!r} is not a range of frequencies" if "range" in table else "is missing"
            self.fault(f"{place}range", given, allowed)
            return None
        try:
            lowest, highest = (parse_measure(end, Dimension.FREQUENCY).value for end in value)
        except UnitError as error:
            self.fault(f"{place}range", error.message, error.allowed)
            return None
        if not 0 < lowest <= highest < math.inf:
            reason = "is reversed" if lowest > highest else "does not lie above 0"
            self.fault(f"{place}range", f"{value[0]} to {value[1]} {reason}", allowed)
            return None
        return FrequencyRange(lowest, highest)

    def model(self, place: str, table: _Table) -> Model | None:
        name = self.text(place, table, "model")
        model = MODELS.get(name)
        if model is None:
            if name:
                known = f"one of {', '.join(MODELS)}"
                self.fault(f"{place}model", f"{name!r} is not known{nearest(name, MODELS)}", known)
            return None
        self.check_keys(place, table, (*_ENTRY_KEYS, *model.names))
        return model

    def constants(self, place: str, table: _Table, model: Model) -> Constants:
        """Return the constants; each one's first fault is told, and none that follows from it."""
        told: set[str] = set()

        def tell(path: str, message: str, allowed: str) -> None:
            told.add(path)
            self.fault(f"{place}{path.removeprefix('.')}", message, allowed)

        constants = model.read(table, "", tell)
        for fault in model.faults(constants, ""):
            if not any(
                fault.path == path or fault.path.startswith(f"{path}.") or path.startswith(f"{fault.path}[")
                for path in told
            ):
                tell(fault.path, fault.message, fault.allowed)
        return constants

    def spread(self, place: str, table: _Table, model: Model | None) -> tuple[tuple[str, float], ...]:
        """Return the relative spreads given; of what varies in production none may be missing."""
        given = [name for name in (model.names if model else CONSTANT_NAMES) if name in table]
        wanted = [constant.name for constant in model.constants if constant.varies] if model else []
        wanted = [name for name in wanted if name in given]
        value = table.get("spread", None if wanted else {})
        if not isinstance(value, dict):
            told = f"{value!r} is not a table" if "spread" in table else "is missing"
            self.fault(f"{place}spread", told, "for example { permittivity = 0.02 }")
            return ()
        spread = []
        for name, share in value.items():
            if re.split(r"[.\[]", name)[0] not in given:
                known = f"one of {', '.join(given)}"
                self.fault(f"{place}spread.{name}", f"is no constant of this entry{nearest(name, given)}", known)
            elif isinstance(share, bool) or not isinstance(share, int | float) or not 0 <= share < 1:
                allowed = "one standard deviation as a fraction, 0 or more and below 1"
                self.fault(f"{place}spread.{name}", f"{share!r} is not a relative spread", allowed)
            else:
                spread.append((name, float(share)))
        for name in [name for name in wanted if name not in value]:
            self.fault(f"{place}spread.{name}", "is missing", "a fraction; 0 when the value does not vary")
        return tuple(spread)
