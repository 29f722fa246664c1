"""The acts on elements as parts of a whole: the menu Build-up."""

from collections.abc import Sequence

from app.window.actions import Act
from app.window.commands import Commands


def structure_acts(c: Commands) -> Sequence[Act]:
    """Return what is done to selected elements together."""
    menu = "&Build-up"
    do = c.structure
    return (
        Act(
            "structure.use",
            menu,
            "&Use in the computation",
            do.use,
            ("Ctrl+U",),
            "Compute the selected elements, or leave them out while they stay in the list.",
            enabled=do.any_selected,
            checked=do.used,
        ),
        Act(
            "structure.lock",
            menu,
            "&Lock thickness",
            do.lock,
            ("Ctrl+J",),
            "Hold the thickness of the selected layers: their faces cannot be dragged.",
            enabled=do.any_layer,
            checked=do.locked,
        ),
        Act(
            "structure.group",
            menu,
            "Repeat as a &group",
            do.group,
            ("Ctrl+G",),
            "Repeat the selected elements as a whole; the count is typed in the column Times.",
            enabled=do.can_group,
            group=1,
        ),
        Act(
            "structure.end_group",
            menu,
            "&End group",
            do.end_group,
            ("Ctrl+Shift+G",),
            "Let the elements of the group stand once each.",
            enabled=do.in_a_group,
            group=1,
        ),
        Act(
            "structure.write_out",
            menu,
            "&Write out group",
            do.write_out,
            tip="Write the group out, element by element, as often as it is repeated.",
            enabled=do.in_a_group,
            group=1,
        ),
        Act(
            "structure.mirror",
            menu,
            "&Mirror",
            do.mirror,
            tip="Make the selected elements, or the whole stack, symmetric about the last of them.",
            enabled=do.can_mirror,
            group=2,
        ),
        Act(
            "structure.reverse",
            menu,
            "&Reverse",
            do.reverse,
            tip="Turn the selected elements, or the whole stack with its half-spaces, round.",
            enabled=do.any_elements,
            group=2,
        ),
        Act(
            "structure.fill",
            menu,
            "&Fill down",
            do.fill,
            ("Ctrl+Shift+Down",),
            "Give the selected elements the material and thickness of the first, or all parts of a sheet.",
            enabled=do.several,
            place="elements",
            group=2,
        ),
    )
