"""Every ink and every data colour of both themes can be seen."""

import subprocess
import sys
from itertools import pairwise

import pytest

from app.look.colour import contrast, lightness
from app.look.theme import (
    DARK,
    KINDS,
    LIGHT,
    Theme,
    curve_colour,
    dashes,
    hue,
    kind_style,
    label_colour,
)

QUANTITIES = (
    "reflectance",
    "transmittance",
    "absorptance",
    "return_loss_dB",
    "insertion_loss_dB",
    "shielding_effectiveness_dB",
    "reflection_phase_deg",
    "transmission_phase_deg",
    "insertion_phase_delay_deg",
    "group_delay_s",
)
both = pytest.mark.parametrize("theme", [LIGHT, DARK], ids=["light", "dark"])


@both
@pytest.mark.parametrize("ink", ["text", "muted", "accent", "fault", "warning", "good"])
@pytest.mark.parametrize("ground", ["window", "base", "raised", "selection"])
def test_every_ink_is_readable_on_every_surface(theme: Theme, ink: str, ground: str) -> None:
    """Text has a contrast of 4.5 to 1 or more on each surface it may stand on."""
    assert contrast(getattr(theme, ink), getattr(theme, ground)) >= 4.5


@both
def test_text_on_the_accent_is_readable(theme: Theme) -> None:
    """Text upon the accent has a contrast of 4.5 to 1 or more."""
    assert contrast(theme.on_accent, theme.accent) >= 4.5


@both
@pytest.mark.parametrize("ink", ["edge", "stale"])
def test_outlines_and_stale_curves_can_be_seen(theme: Theme, ink: str) -> None:
    """Lines that carry meaning have a contrast of 3 to 1 or more on each surface."""
    for ground in (theme.window, theme.base, theme.raised):
        assert contrast(getattr(theme, ink), ground) >= 3


@both
@pytest.mark.parametrize("quantity", QUANTITIES)
@pytest.mark.parametrize("count", [1, 2, 3, 7, 19])
def test_every_curve_can_be_seen_and_steps_with_angle(theme: Theme, quantity: str, count: int) -> None:
    """Each curve and its name stand out 4.5 to 1, and steeper is darker on light and lighter on dark."""
    colours = [curve_colour(theme, quantity, rank, count) for rank in range(count)]
    assert min(contrast(colour, theme.base) for colour in colours) >= 4.5
    steps = [after - before for before, after in pairwise(map(lightness, colours))]
    assert all(step > 0 if theme.dark else step < 0 for step in steps)


@both
@pytest.mark.parametrize("quantity", QUANTITIES)
def test_labels_at_the_end_of_curves_are_readable(theme: Theme, quantity: str) -> None:
    """A label in the colour of its curve has the contrast of text on every surface."""
    for rank in range(3):
        label = label_colour(theme, curve_colour(theme, quantity, rank, 3))
        assert min(contrast(label, ground) for ground in (theme.base, theme.window, theme.raised)) >= 4.5


@both
def test_the_powers_of_the_drawing_differ_in_hue_and_from_the_accent(theme: Theme) -> None:
    """Reflected, transmitted and absorbed power and the accent are four different colours."""
    colours = {hue(theme, name) for name in ("reflectance", "transmittance", "absorptance")}
    assert len(colours | {theme.accent}) == 4


@both
@pytest.mark.parametrize("kind", KINDS)
def test_kinds_of_material_can_be_told_apart_and_written_on(theme: Theme, kind: str) -> None:
    """Text is readable on each tint and the ink of each kind stands out from tint and surface."""
    style = kind_style(theme, kind)
    assert contrast(theme.text, style.tint) >= 4.5
    assert contrast(style.ink, style.tint) >= 3
    assert contrast(style.ink, theme.base) >= 3


@both
def test_each_kind_has_a_style_of_its_own(theme: Theme) -> None:
    """No two kinds share tint or hatch, so that greyscale and colour both tell them apart."""
    styles = [kind_style(theme, kind) for kind in KINDS]
    assert len({style.tint for style in styles}) == len(KINDS)
    assert len({style.hatch for style in styles}) == len(KINDS)
    assert kind_style(theme, "unheard of") == kind_style(theme, "dielectric")


def test_polarizations_differ_in_line_style() -> None:
    """TE is solid and TM is dashed."""
    assert dashes("TE") == ()
    assert len(dashes("TM")) == 2


def test_the_theme_needs_no_toolkit() -> None:
    """Importing the theme does not import Qt."""
    code = "import sys, app.look.theme; sys.exit('PySide6' in sys.modules)"
    assert subprocess.run([sys.executable, "-c", code], check=False).returncode == 0
