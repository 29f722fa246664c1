"""The one table of constructions."""

from typing import Final

from stackcore.constructions.construction import Construction
from stackcore.constructions.covers import COVERS
from stackcore.constructions.windows import WINDOWS

CONSTRUCTIONS: Final[dict[str, Construction]] = {one.key: one for one in (*COVERS, *WINDOWS)}
"""Key -> construction, in the order of menus."""
