"""The two looks, light and dark, as values: surfaces, inks and data colours. No toolkit.

Hue tells the quantity, lightness the angle of incidence, the line style the polarization; kinds of material
have a tint and a hatch. The hues are those of Okabe and Ito ("Color Universal Design", 2008), darkened or
lightened where they would be too faint on the surface. Surfaces are neutral; the one accent marks what is
selected or can be dragged and is never a data colour.
"""

from dataclasses import dataclass
from functools import lru_cache
from typing import Final, Literal

from app.look.colour import clear_of, lightness, mix, with_lightness

Kind = Literal["dielectric", "foam", "metal", "magnetic", "glass", "liquid", "coating"]
Hatch = Literal["none", "diagonal", "dots", "dense", "cross", "glint", "dashes"]

KINDS: Final[tuple[Kind, ...]] = ("dielectric", "foam", "metal", "magnetic", "glass", "liquid", "coating")

TEXT: Final = 4.5
"""Least contrast of text (WCAG 2.2, 1.4.3)."""
GRAPHICS: Final = 3.1
"""Least contrast of lines that carry meaning: 3 (WCAG 2.2, 1.4.11) and a little for rounding to 8 bits."""

SOLID: Final[tuple[float, ...]] = ()
DASHED: Final[tuple[float, ...]] = (6.0, 4.0)
DASH_DOT: Final[tuple[float, ...]] = (8.0, 3.0, 2.0, 3.0)
DASH_DOT_DOT: Final[tuple[float, ...]] = (7.0, 2.5, 2.0, 2.5, 2.0, 2.5)


@dataclass(frozen=True, slots=True)
class Theme:
    """One look. Every colour is ``#rrggbb``.

    Parameters
    ----------
    name
        ``light`` or ``dark``.
    window, base, raised
        Surfaces: around the panels, under text and curves, and of controls.
    text, muted
        Inks: what is read, and units, captions and hints (both at least 4.5:1 on every surface).
    line, edge
        Separators and grid; outlines of controls (at least 3:1).
    accent, on_accent, selection
        What is selected or can be dragged, text upon it, and the quiet ground of a selected row.
    fault, warning, good
        Inks of messages, each at least 4.5:1.
    stale
        Curves and drawings that belong to an earlier job (at least 3:1).
    reflection, transmission, absorption, shielding, reflection_phase, transmission_phase, delay, group_delay
        Data hues, at least 4.5:1 on `base`, where names stand in the colour of their curve.
    """

    name: Literal["light", "dark"]
    window: str
    base: str
    raised: str
    text: str
    muted: str
    line: str
    edge: str
    accent: str
    on_accent: str
    selection: str
    fault: str
    warning: str
    good: str
    stale: str
    reflection: str
    transmission: str
    absorption: str
    shielding: str
    reflection_phase: str
    transmission_phase: str
    delay: str
    group_delay: str

    @property
    def dark(self) -> bool:
        """Whether surfaces are darker than inks."""
        return self.name == "dark"


LIGHT: Final = Theme(
    name="light",
    window="#f2f0ec",
    base="#fcfbf9",
    raised="#ffffff",
    text="#24221e",
    muted="#625e56",
    line="#dcd8d0",
    edge="#8a857b",
    accent="#5348c7",
    on_accent="#ffffff",
    selection="#e5e2f7",
    fault="#b3261e",
    warning="#855300",
    good="#2c6b3f",
    stale="#8d887e",
    reflection="#bf5100",
    transmission="#0072b2",
    absorption="#00835f",
    shielding="#14788c",
    reflection_phase="#af5486",
    transmission_phase="#6b4e9b",
    delay="#817300",
    group_delay="#a06700",
)
"""Warm greys, for daylight, for print and for export."""

DARK: Final = Theme(
    name="dark",
    window="#1a1f26",
    base="#13171c",
    raised="#252c35",
    text="#e6e9ed",
    muted="#a3adb9",
    line="#313a45",
    edge="#6f7b8a",
    accent="#a69dff",
    on_accent="#16132f",
    selection="#322f58",
    fault="#ff8a80",
    warning="#f2b84b",
    good="#7fcf98",
    stale="#78828e",
    reflection="#f0783c",
    transmission="#4fa8e0",
    absorption="#2dbb90",
    shielding="#74cbdb",
    reflection_phase="#d98db8",
    transmission_phase="#b39ae0",
    delay="#d9cc4a",
    group_delay="#e6a83c",
)
"""Blue greys, designed for a dark room rather than inverted."""

THEMES: Final[dict[str, Theme]] = {"light": LIGHT, "dark": DARK}


_REFLECTED: Final = {
    "reflectance",
    "return_loss_dB",
    "standing_wave_ratio",
    "reflection_real",
    "reflection_imaginary",
    "input_resistance_ohm",
    "input_reactance_ohm",
    "input_impedance_ohm",
    "copolar_reflectance_dB",
    "crosspolar_reflectance_dB",
    "reflected_axial_ratio_dB",
}


def hue(theme: Theme, quantity: str) -> str:
    """Return the colour that stands for a quantity, whatever the angle.

    Parameters
    ----------
    quantity
        The name of a quantity of `stackcore.quantities`; quantities that say the same of the wave share a hue.
    """
    if quantity in {"reflection_phase_deg", "reflection_phase_difference_deg"}:
        return theme.reflection_phase
    if quantity in {"transmission_phase_deg", "transmission_phase_difference_deg"}:
        return theme.transmission_phase
    if quantity == "insertion_phase_delay_deg":
        return theme.delay
    if quantity == "group_delay_s":
        return theme.group_delay
    if quantity == "shielding_effectiveness_dB":
        return theme.shielding
    if quantity in _REFLECTED:
        return theme.reflection
    if quantity.startswith(("absorptance", "element_absorptance")):
        return theme.absorption
    return theme.transmission


@lru_cache(maxsize=4096)
def curve_colour(theme: Theme, quantity: str, angle_rank: int, angle_count: int) -> str:
    """Return the colour of a curve: hue by quantity, lightness by angle.

    Parameters
    ----------
    angle_rank
        0 for the angle nearest to the normal, `angle_count` - 1 for the steepest.
    angle_count
        Number of angles drawn together.

    Returns
    -------
    str
        ``#rrggbb``, at least 4.5:1 on ``theme.base``, so that the curve's label can have it. Steeper is darker on
        light and lighter on dark.
    """
    colour = hue(theme, quantity)
    if angle_count < 2:
        return colour
    share = min(max(angle_rank, 0), angle_count - 1) / (angle_count - 1)
    faintest = with_lightness(colour, 0.50 if theme.dark else 0.665)
    faint = lightness(clear_of(faintest, (theme.base,), TEXT + 0.05))
    strong = 0.92 if theme.dark else 0.32
    return with_lightness(colour, faint + (strong - faint) * share)


def label_colour(theme: Theme, colour: str) -> str:
    """Return a data colour made readable as text on every surface of the theme, for labels of curves."""
    return clear_of(colour, (theme.base, theme.window, theme.raised), TEXT)


def dashes(polarization: str) -> tuple[float, ...]:
    """Return the dash pattern of a polarization in pen widths.

    Empty means solid (TE); TM is dashed, circular a dash and a dot, tilted a dash and two dots. Dots alone are left
    to curves beyond the data of a material.

    Parameters
    ----------
    polarization
        A key of `stackcore.polarizations`.
    """
    return _DASHES.get(polarization, DASH_DOT_DOT)


def line_style(polarization: str) -> str:
    """Return the word for the line style of a polarization: ``solid``, ``dashed``, ``dash and dot``."""
    return _STYLE_WORDS[dashes(polarization)]


_DASHES: Final = {"TE": SOLID, "TM": DASHED, "circular": DASH_DOT}
_STYLE_WORDS: Final = {
    SOLID: "solid",
    DASHED: "dashed",
    DASH_DOT: "dash and dot",
    DASH_DOT_DOT: "dash and two dots",
}


@dataclass(frozen=True, slots=True)
class KindStyle:
    """How a kind of material is drawn: ground, ink of outline and hatch, and the hatch's name."""

    tint: str
    ink: str
    hatch: Hatch


# Hue of each kind as a mid tone; tint and ink are this hue near to and far from the surface.
_KIND_HUES: Final[dict[str, tuple[str, Hatch]]] = {
    "dielectric": ("#b08d57", "diagonal"),
    "foam": ("#a8a08e", "dots"),
    "metal": ("#6f7a86", "dense"),
    "magnetic": ("#9a6a5e", "cross"),
    "glass": ("#5f9ea0", "glint"),
    "liquid": ("#5b86b5", "dashes"),
    "coating": ("#8a7aa8", "none"),
}


@lru_cache(maxsize=64)
def kind_style(theme: Theme, kind: str) -> KindStyle:
    """Return how a kind of material is drawn; an unknown kind is drawn as a dielectric.

    Text in ``theme.text`` is readable on the tint (4.5:1), the ink stands out from it (3:1).
    """
    colour, hatch = _KIND_HUES.get(kind, _KIND_HUES["dielectric"])
    tint = mix(theme.base, colour, 0.42 if kind == "metal" else 0.26)
    ink = with_lightness(colour, 0.62 if theme.dark else 0.56)
    ink = clear_of(ink, (tint, theme.base), GRAPHICS)
    return KindStyle(tint=tint, ink=ink, hatch=hatch)
