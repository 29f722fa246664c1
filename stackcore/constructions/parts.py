"""Small makers of elements and words that the recipes share."""

from stackcore.constructions.construction import Chosen, Option
from stackcore.job.records import ElementRecord, LayerRecord, SheetRecord
from stackcore.units import Dimension, format_value, parse_measure

SKIN_FAMILIES = ("laminates", "plastics", "ceramics")
CORE_FAMILIES = ("cores", "plastics", "ceramics", "laminates")
FINISH_FAMILIES = ("finishes", "films", "plastics")
BOND_FAMILIES = ("adhesives", "cores", "finishes", "plastics")
GLASS_FAMILIES = ("glasses", "building", "ceramics")
METAL_FAMILIES = ("metals", "films", "carbon")


def material(name: str, label: str, default: str, families: tuple[str, ...]) -> Option:
    """Return the option of a material."""
    return Option(name, label, default, families=families)


def length(name: str, label: str, default: str, least: float = 0.0, most: float = 10.0) -> Option:
    """Return the option of a thickness; 0 leaves the layer out."""
    return Option(name, label, default, Dimension.LENGTH, least=least, most=most)


def whole(name: str, label: str, default: int, most: int) -> Option:
    """Return the option of a whole number from 1."""
    return Option(name, label, str(default), Dimension.NUMBER, whole=True, least=1, most=most)


def layer(chosen: Chosen, material_name: str, thickness_name: str) -> tuple[ElementRecord, ...]:
    """Return the layer of a chosen thickness, with its text as typed; nothing when it is 0."""
    thickness = chosen.measure(thickness_name)
    return (LayerRecord(chosen.material(material_name), thickness),) if thickness.value > 0 else ()


def sized(chosen: Chosen, material_name: str, thickness: float) -> LayerRecord:
    """Return the layer of a thickness that a rule gave, to the digits a drawing has."""
    return LayerRecord(chosen.material(material_name), parse_measure(length_words(thickness), Dimension.LENGTH))


def sheet(resistance: float) -> SheetRecord:
    """Return a resistive sheet, to four digits."""
    return SheetRecord(resistance=parse_measure(ohms(resistance), Dimension.RESISTANCE))


def length_words(metres: float) -> str:
    """Return a length to four digits: ``9.861 mm``."""
    return format_value(float(f"{metres:.4g}"), Dimension.LENGTH)


def ohms(resistance: float) -> str:
    """Return a sheet resistance to four digits."""
    return format_value(float(f"{resistance:.4g}"), Dimension.RESISTANCE)
