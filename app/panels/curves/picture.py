"""The plot as a picture: in the light look, at rest, with a heading that says whose curves they are."""

from collections.abc import Callable, Iterator
from contextlib import contextmanager
from typing import Final

from PySide6.QtCore import QPoint, QRect, QRectF, QSize, Qt
from PySide6.QtGui import QColor, QPainter
from PySide6.QtWidgets import QGraphicsItem

from app.look.palette import heading_font
from app.look.pictures import Picture
from app.look.theme import LIGHT, Theme
from app.panels.curves.plot import CurvePlot

MARGIN: Final = 8


def plot_picture(
    plot: CurvePlot, heading: str, note: str, set_theme: Callable[[Theme], None], theme: Theme
) -> Picture:
    """Return the picture of a plot.

    Parameters
    ----------
    plot
        As it is on the screen, in size and ranges.
    heading, note
        Two lines above it; an empty one takes no room.
    set_theme, theme
        Gives the plot a look, and the one it has now: pictures are always light.
    """
    font = heading_font(plot.font())
    line = plot.fontMetrics().height() + 4
    lines = [text for text in (heading, note) if text]
    above = len(lines) * line + MARGIN
    size = QSize(plot.width(), plot.height() + above)

    def paint(painter: QPainter) -> None:
        with _at_rest(plot, set_theme, theme):
            for number, text in enumerate(lines):
                painter.setFont(font if text is heading else plot.font())
                painter.setPen(QColor(LIGHT.text if text is heading else LIGHT.muted))
                spot = QRect(MARGIN, MARGIN + number * line, size.width() - 2 * MARGIN, line)
                painter.drawText(spot, Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter, text)
            target = QRectF(0, above, plot.width(), plot.height())
            plot.render(painter, target, QRect(QPoint(0, 0), plot.size()))

    return Picture(heading, size, plot.logicalDpiX(), LIGHT.base, paint)


@contextmanager
def _at_rest(plot: CurvePlot, set_theme: Callable[[Theme], None], theme: Theme) -> Iterator[None]:
    """Draw finely, without caches (which are pixels) and without what the mouse and the focus show."""
    items: tuple[QGraphicsItem, ...] = (plot.left_axis, plot.bottom_axis, plot.curve_layer)
    modes = [item.cacheMode() for item in items]
    fine, focus = plot.curve_layer.fine, plot.focus_shown
    set_theme(LIGHT)
    plot.curve_layer.set_fine(True)
    plot.pointer_layer.hide()
    plot.show_focus(False)
    for item in items:
        item.setCacheMode(QGraphicsItem.CacheMode.NoCache)
    try:
        yield
    finally:
        for item, mode in zip(items, modes, strict=True):
            item.setCacheMode(mode)
        plot.show_focus(focus)
        plot.pointer_layer.show()
        plot.curve_layer.set_fine(fine)
        set_theme(theme)
