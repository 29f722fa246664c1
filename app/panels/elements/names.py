"""How materials are called where a person chooses one: by label, and library entries as ``library: label``."""

from collections import Counter
from collections.abc import Mapping
from functools import cache
from typing import Final

from app.document.library import ALWAYS_DEFINED, PERFECT_METAL
from stackcore.job.records import JobRecord
from stackcore.media.library import read_library

LIBRARY_MARK: Final = "library: "
METAL_SHOWN: Final = "perfect conductor"


class MaterialNames:
    """The names of one job's materials, both ways.

    A material is shown by its label; when two would look the same, the name in the job file stands behind it.

    Examples
    --------
    >>> from app.document.session import Session
    >>> MaterialNames(Session().record).shown("air")
    'air'
    """

    def __init__(self, record: JobRecord) -> None:
        labels = {material.name: material.label or material.name for material in record.materials}
        reserved = (*ALWAYS_DEFINED, PERFECT_METAL, METAL_SHOWN)
        counts = Counter(label.casefold() for label in (*labels.values(), *reserved))
        self._shown = {
            name: label if counts[label.casefold()] == 1 else f"{label} ({name})" for name, label in labels.items()
        }
        self._shown[PERFECT_METAL] = METAL_SHOWN
        by_name = {name.casefold(): name for name in (*ALWAYS_DEFINED, PERFECT_METAL, *labels)}
        self._by_text = by_name | {shown.casefold(): name for name, shown in self._shown.items()}

    def shown(self, name: str) -> str:
        """Return the text that stands for the material called `name`; a name the job lacks stands for itself."""
        return self._shown.get(name, name)

    def given(self, text: str) -> str:
        """Return the name or the library key that `text` stands for; other text comes back as it is.

        What is shown and names, also in the wrong case, ``library: label`` and, when nothing of the job is called
        so, the label alone are known here; labels and library keys are known to the edit that takes the result.
        """
        text = text.strip()
        if text in self._shown:
            return text
        folded = text.casefold()
        return self._by_text.get(folded) or _library_texts().get(folded, text)

    def offers(self, *, with_metal: bool) -> tuple[str, ...]:
        """Return what to offer: the job's materials, then air, then the library.

        Parameters
        ----------
        with_metal
            Whether a perfect conductor may be chosen, as at the back.
        """
        own = tuple(shown for name, shown in self._shown.items() if name != PERFECT_METAL)
        metal = (METAL_SHOWN,) if with_metal else ()
        return (*own, ALWAYS_DEFINED[0], *metal, *library_offers().values())


@cache
def library_offers() -> Mapping[str, str]:
    """Return library key -> text to choose it by, in the order of the library."""
    library = read_library()
    counts = Counter(entry.label.casefold() for entry in library.entries)
    return {
        entry.key: f"{LIBRARY_MARK}{entry.label}"
        + (f" ({library.family(entry.family).label})" if counts[entry.label.casefold()] > 1 else "")
        for entry in library.entries
    }


@cache
def _library_texts() -> Mapping[str, str]:
    """Return text in lower case -> library key: the offers, and what of them stands behind the mark."""
    offers = {text.casefold(): key for key, text in library_offers().items()}
    return {text.removeprefix(LIBRARY_MARK): key for text, key in offers.items()} | offers
