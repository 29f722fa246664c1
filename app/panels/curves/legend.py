"""The legend that stands above the plot when there is no room for names at the ends of the curves."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Final

from PySide6.QtCore import QPointF, QRectF, QSize, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QLinearGradient, QPainter, QPaintEvent, QPen, QPolygonF
from PySide6.QtWidgets import QSizePolicy, QWidget

from app.look.theme import Theme, dashes, line_style
from app.panels.curves.curve_layer import SIGNS
from stackcore.polarizations import polarization

_SAMPLE: Final = 28.0
_GAP: Final = 6.0
_APART: Final = 16.0
_LONGEST: Final = 200.0
_SIGN_WORDS: Final = ("triangles", "squares", "diamonds", "triangles on their tips")


@dataclass(frozen=True, slots=True)
class LegendFacts:
    """What the legend says.

    Parameters
    ----------
    polarizations
        Whose line styles are shown.
    angles, colours
        From the smallest angle to the largest.
    stacks
        Names of the other stacks, in the order of their signs.
    conditions, band
        What the envelope is over, and its colour; nothing without one.
    """

    polarizations: tuple[str, ...] = ()
    angles: tuple[str, ...] = ()
    colours: tuple[str, ...] = ()
    stacks: tuple[str, ...] = ()
    conditions: tuple[str, ...] = ()
    band: str = ""

    @property
    def envelope(self) -> str:
        """Words for the band."""
        return f"as built and {', '.join(self.conditions)}" if self.conditions else ""

    def __bool__(self) -> bool:
        return bool(self.polarizations or self.stacks or self.conditions)


class Legend(QWidget):
    """Line samples of the polarizations, and a ramp from the colour of the smallest angle to the largest."""

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self._facts = LegendFacts()
        self.setSizePolicy(QSizePolicy.Policy.Fixed, QSizePolicy.Policy.Fixed)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.update()

    def set_facts(self, facts: LegendFacts) -> None:
        """Say this from now on, also to those who listen."""
        self._facts = facts
        self.setAccessibleName("Legend")
        self.setAccessibleDescription(self.sentence())
        self.setToolTip(self.sentence())
        self.updateGeometry()
        self.update()

    def sentence(self) -> str:
        """Return the legend in words."""
        lines = ", ".join(f"{polarization(key).label} {line_style(key)}" for key in self._facts.polarizations)
        angles = self._facts.angles
        ramp = f"; {len(angles)} angles from {angles[0]} to {angles[-1]} by lightness" if len(angles) > 1 else ""
        facts = self._facts
        signs = ", ".join(f"{name} with {_SIGN_WORDS[at % len(SIGNS)]}" for at, name in enumerate(facts.stacks))
        band = f"filled band: {facts.envelope}" if facts.conditions else ""
        return "; ".join(part for part in (f"{lines}{ramp}", signs, band) if part)

    def sizeHint(self) -> QSize:
        """Return the room the legend needs."""
        metrics = QFontMetricsF(self.font())
        words = [polarization(key).label for key in self._facts.polarizations]
        width = sum(_SAMPLE + _GAP + metrics.horizontalAdvance(word) + _APART for word in words)
        angles = self._facts.angles
        if len(angles) == 1:
            width += metrics.horizontalAdvance(angles[0]) + _APART
        elif angles:
            width += _GAP * 2 + 72 + metrics.horizontalAdvance(angles[0]) + metrics.horizontalAdvance(angles[-1])
        for name in (*self._facts.stacks, *filter(None, [self._facts.envelope])):
            width += _SAMPLE + _GAP + metrics.horizontalAdvance(self._short(metrics, name)) + _APART
        return QSize(round(width) + 2, round(metrics.height()) + 2)

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw samples and ramp."""
        painter = QPainter(self)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        metrics = QFontMetricsF(self.font())
        middle, left = self.height() / 2, 0.0
        text = QColor(self._theme.muted)
        for key in self._facts.polarizations:
            pen = QPen(QColor(self._theme.text), 1.6)
            if dashes(key):
                pen.setDashPattern([length / 1.6 for length in dashes(key)])
            painter.setPen(pen)
            painter.drawLine(QPointF(left, middle), QPointF(left + _SAMPLE, middle))
            word = polarization(key).label
            left = self._write(painter, metrics, text, left + _SAMPLE + _GAP, word) + _APART
        if len(self._facts.angles) == 1:
            left = self._write(painter, metrics, text, left, self._facts.angles[0]) + _APART
        elif self._facts.angles:
            left = self._write(painter, metrics, text, left, self._facts.angles[0]) + _GAP
            painter.fillRect(QRectF(left, middle - 3, 72, 6), self._ramp(left, left + 72))
            left = self._write(painter, metrics, text, left + 72 + _GAP, self._facts.angles[-1]) + _APART
        for sign, name in enumerate(self._facts.stacks):
            painter.setPen(QPen(text, 1.0))
            painter.drawLine(QPointF(left, middle), QPointF(left + _SAMPLE, middle))
            painter.setPen(Qt.PenStyle.NoPen)
            painter.setBrush(text)
            at = [QPointF(left + _SAMPLE / 2 + x, middle + y) for x, y in SIGNS[sign % len(SIGNS)]]
            painter.drawPolygon(QPolygonF(at))
            left = self._write(painter, metrics, text, left + _SAMPLE + _GAP, self._short(metrics, name)) + _APART
        if self._facts.conditions:
            fill = QColor(self._facts.band)
            fill.setAlphaF(0.3)
            painter.fillRect(QRectF(left, middle - 5, _SAMPLE, 10), fill)
            band = self._short(metrics, self._facts.envelope)
            self._write(painter, metrics, text, left + _SAMPLE + _GAP, band)

    @staticmethod
    def _short(metrics: QFontMetricsF, text: str) -> str:
        return metrics.elidedText(text, Qt.TextElideMode.ElideRight, _LONGEST)

    def _ramp(self, left: float, right: float) -> QLinearGradient:
        ramp = QLinearGradient(left, 0, right, 0)
        colours: Sequence[str] = self._facts.colours
        for index, colour in enumerate(colours):
            ramp.setColorAt(index / max(len(colours) - 1, 1), QColor(colour))
        return ramp

    def _write(self, painter: QPainter, metrics: QFontMetricsF, ink: QColor, left: float, text: str) -> float:
        width = metrics.horizontalAdvance(text)
        painter.setPen(ink)
        painter.drawText(QRectF(left, 0, width + 1, self.height()), Qt.AlignmentFlag.AlignVCenter, text)
        return left + width
