"""The stored files: each version of the job file as it was once written, never to be changed."""

from pathlib import Path
from typing import Final

FORMATS: Final = Path(__file__).parent
HAND_WRITTEN: Final = FORMATS / "hand-written-v1.slabjob"
SAVED: Final = FORMATS / "saved-v1.slabjob"
SCHEMA: Final = FORMATS / "version-1.schema.json"
