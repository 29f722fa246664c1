"""Which polarizations are shown: TE and TM at hand, circular and tilted ones behind a small menu."""

import math
from collections.abc import Callable
from typing import Final

from PySide6.QtCore import QPoint
from PySide6.QtWidgets import QMenu, QWidget

from app.document.view import View
from app.look.theme import Theme
from app.panels.sweep.field import QuietField, QuietSwitch
from app.panels.sweep.opener import QuietOpener
from stackcore.conventions import CONVENTIONS
from stackcore.errors import InputError, Severity
from stackcore.polarizations import CIRCULAR, TE, TM, Polarization, polarization, tilted

Tell = Callable[[str, Severity], None]

TILT: Final = "tilt"
MORE: Final = "more"
_TIPS: Final = {
    TE.key: f"Show the curves of TE. {CONVENTIONS['angle']}",
    TM.key: f"Show the curves of TM. {CONVENTIONS['angle']}",
    CIRCULAR.key: f"Show the curves of a circular wave. {CONVENTIONS['polarizations']}",
    TILT: f"Show the curves of a linear wave tilted from TE. {CONVENTIONS['polarizations']}",
}
_WORDS: Final = {TE.key: "TE", TM.key: "TM", CIRCULAR.key: "circular", TILT: "tilted"}
_TILT_TIP: Final = (
    "Angle of the electric field from that of TE toward that of TM, for example 45 deg; −90 to 90 deg."
)
_MORE_TIP: Final = "Show a circular or a tilted linear wave besides TE and TM."


class PolarizationChoice:
    """The parts of the quiet line that choose polarizations: switches, the field of the tilt, a menu.

    Circular and tilted have their switch and field in the line only while they are shown.

    Parameters
    ----------
    view
        Where the polarizations are read and changed.
    tell
        Says what has no place of its own.
    """

    def __init__(self, view: View, theme: Theme, tell: Tell) -> None:
        self._view, self._tell = view, tell
        self._tilt = math.radians(45)
        self.switches = {key: QuietSwitch(theme, _WORDS[key], tip) for key, tip in _TIPS.items()}
        self.tilt = QuietField(theme, "Tilt from TE", _TILT_TIP, "45 deg")
        self.more = QuietOpener(theme, MORE, "More polarizations", _MORE_TIP)
        self.menu: QMenu | None = None
        for switch in self.switches.values():
            switch.clicked.connect(lambda _: self._switched())
        self.tilt.committed.connect(self._typed)
        self.more.clicked.connect(lambda _: self._open_menu())

    @property
    def parts(self) -> tuple[QWidget, ...]:
        """What stands in the line, in order."""
        return (*self.switches.values(), self.tilt, self.more)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        for switch in self.switches.values():
            switch.set_theme(theme)
        self.tilt.set_theme(theme)
        self.more.set_theme(theme)

    def show_view(self) -> None:
        """Show what the view has."""
        shown = [polarization(key) for key in self._view.state.polarizations]
        tilts = [wave for wave in shown if wave.kind == "tilted"]
        keys = {TILT if wave.kind == "tilted" else wave.key for wave in shown}
        for key, switch in self.switches.items():
            switch.setChecked(key in keys)
            switch.setVisible(key in keys or key in (TE.key, TM.key))
        self.tilt.setVisible(bool(tilts))
        if tilts:
            self._tilt = tilts[0].tilt
            self.tilt.show_text(", ".join(wave.key.removeprefix("tilt ") for wave in tilts))

    def _switched(self) -> None:
        chosen = [key for key, switch in self.switches.items() if switch.isChecked()]
        if not chosen:
            # The last one stays: a plot of nothing would say nothing.
            self.show_view()
            self._tell("At least one polarization is shown.", "note")
            return
        tilts = [wave for wave in map(polarization, self._view.state.polarizations) if wave.kind == "tilted"]
        self._show([key for key in chosen if key != TILT], tilts or [tilted(self._tilt)] if TILT in chosen else [])

    def _typed(self, text: str) -> None:
        try:
            tilts = [polarization(f"tilt {part}") for part in text.split(";" if ";" in text else ",")]
        except InputError as error:
            self.tilt.show_text(text, error.faults[0])
            return
        self._show([key for key in self._view.state.polarizations if not key.startswith(TILT)], tilts)
        self.show_view()

    def _show(self, keys: list[str], tilts: list[Polarization]) -> None:
        self._view.set(self, polarizations=(*keys, *(wave.key for wave in tilts)))

    def _open_menu(self) -> None:
        menu = self.menu = QMenu(self.more)
        menu.setToolTipsVisible(True)
        for key, words in ((CIRCULAR.key, "Circular"), (TILT, "Linear, tilted from TE")):
            action = menu.addAction(words)
            action.setCheckable(True)
            action.setChecked(self.switches[key].isChecked())
            action.setToolTip(_TIPS[key])
            action.setStatusTip(_TIPS[key])
            action.triggered.connect(lambda on, key=key: self._take(key, on))
        menu.aboutToHide.connect(menu.deleteLater)
        menu.popup(self.more.mapToGlobal(QPoint(0, self.more.height())))

    def _take(self, key: str, on: bool) -> None:
        self.switches[key].setChecked(on)
        self._switched()
        if on and key == TILT:
            self.tilt.setFocus()
            self.tilt.selectAll()
