"""The panels that open beside the work: the one table of their titles, keys and words.

Menus, docks, the order of F6 and the remembered layout derive from it. A new panel is one more row here, and its
widget in `app.window.panels.make_panels`.
"""

from dataclasses import dataclass
from typing import Final


@dataclass(frozen=True, slots=True)
class Beside:
    """One panel.

    Parameters
    ----------
    name
        In the program and in remembered layouts: ``material_data``.
    text
        In the menu, with ``&`` before the access key; without it the title of the panel.
    shortcut
        Shows or hides it.
    tip
        One sentence: what it shows.
    below
        Name of the panel it opens below instead of as a tab beside, or empty.
    in_menu
        Whether the menu View lists it.
    """

    name: str
    text: str
    shortcut: str
    tip: str
    below: str = ""
    in_menu: bool = True

    @property
    def title(self) -> str:
        """Title of the panel."""
        return self.text.replace("&", "")


MATERIALS: Final = Beside(
    "materials",
    "&Materials",
    "Ctrl+Shift+M",
    "Show or hide the materials of the job and the library.",
)
MATERIAL_DATA: Final = Beside(
    "material_data",
    "&Constants and curves",
    "Ctrl+M",
    "Show or hide constants and curves of the materials that are chosen.",
    below="materials",
)
CONSTRUCTIONS: Final = Beside(
    "constructions",
    "Const&ructions",
    "Ctrl+Shift+I",
    "Show or hide walls as they are built, sized for the band and angle of the job.",
)
MAP: Final = Beside(
    "map", "M&ap", "Ctrl+Shift+P", "Show or hide a map over frequency and angle, or over a thickness or a constant."
)
CUTS: Final = Beside(
    "cuts",
    "C&uts",
    "Ctrl+Shift+U",
    "Show or hide curves over the angle, or over a thickness or a constant, with the value that is best.",
)
PLANE: Final = Beside(
    "plane",
    "Comple&x plane",
    "Ctrl+Shift+X",
    "Show or hide reflection, transmission or input impedance in the complex plane.",
)
VARIANTS: Final = Beside(
    "variants",
    "&Variants",
    "Ctrl+Shift+V",
    "Show or hide all stacks of the job beside each other: thickness, mass, cost and worst value.",
)
CONDITIONS: Final = Beside(
    "conditions",
    "C&onditions",
    "Ctrl+Shift+W",
    "Show or hide what rain, ice, heat or another coat of paint makes of the stacks.",
)
NOTES: Final = Beside("notes", "&Title and notes", "Ctrl+I", "Show or hide title and notes of the job.")
HELP: Final = Beside("help", "Help", "", "Definitions, keys and cautions.", in_menu=False)

BESIDE: Final = (MATERIALS, MATERIAL_DATA, CONSTRUCTIONS, MAP, CUTS, PLANE, VARIANTS, CONDITIONS, NOTES, HELP)
"""Every panel beside, in the order of the menu and of F6."""
