"""Every edit there is, by name: import them from here.

One named function an edit; each returns an `Edit`. A later capability adds a file of its own edits and its
names here.
"""

from app.document.condition_edits import (
    add_condition,
    change_condition,
    new_condition,
    remove_condition,
    rename_condition,
)
from app.document.condition_rows import add_change, note_condition, remove_change, type_change
from app.document.constant_edits import add_row, remove_row, set_constant, set_model
from app.document.edit import Edit
from app.document.element_edits import (
    add_layer,
    add_sheet,
    change_material,
    delete,
    duplicate,
    move,
    set_thickness,
)
from app.document.job_edits import (
    set_angle_grid,
    set_angles,
    set_frequency_grid,
    set_frequency_list,
    set_notes,
    set_title,
)
from app.document.material_edits import (
    add_material,
    remove_material,
    rename_material,
    replace_material,
    use_library_entry,
)
from app.document.stack_edits import (
    add_stack,
    delete_stack,
    duplicate_stack,
    rename_stack,
    set_back,
    set_front,
)
from app.document.structure_edits import (
    fill_columns,
    fill_down,
    fill_elements,
    group_rows,
    mirror,
    reverse,
    set_enabled,
    set_locked,
    set_repeat,
    ungroup,
)
from app.document.typed import type_into
from app.document.variation_edits import take_value

__all__ = [
    "Edit",
    "add_change",
    "add_condition",
    "add_layer",
    "add_material",
    "add_row",
    "add_sheet",
    "add_stack",
    "change_condition",
    "change_material",
    "delete",
    "delete_stack",
    "duplicate",
    "duplicate_stack",
    "fill_columns",
    "fill_down",
    "fill_elements",
    "group_rows",
    "mirror",
    "move",
    "new_condition",
    "note_condition",
    "remove_change",
    "remove_condition",
    "remove_material",
    "remove_row",
    "rename_condition",
    "rename_material",
    "rename_stack",
    "replace_material",
    "reverse",
    "set_angle_grid",
    "set_angles",
    "set_back",
    "set_constant",
    "set_enabled",
    "set_frequency_grid",
    "set_frequency_list",
    "set_front",
    "set_locked",
    "set_model",
    "set_notes",
    "set_repeat",
    "set_thickness",
    "set_title",
    "take_value",
    "type_change",
    "type_into",
    "ungroup",
    "use_library_entry",
]
