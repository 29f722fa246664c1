"""A small drawing of the wall that a construction gives."""

from PySide6.QtCore import QRectF, QSize
from PySide6.QtGui import QPainter, QPaintEvent
from PySide6.QtWidgets import QSizePolicy, QWidget

from app.document.document import Document
from app.look.theme import Theme
from app.panels.wall.painting import paint_wall
from app.panels.wall.parts import Wall, wall_of
from stackcore.job import Job

HEIGHT = 132


class Preview(QWidget):
    """Draws the wall, or nothing while there is none; it has no say of its own."""

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self._wall: Wall | None = None
        self.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Fixed)
        self.setAccessibleName("Drawing of the construction")

    @property
    def wall(self) -> Wall | None:
        """What is drawn."""
        return self._wall

    def show_job(self, job: Job | None) -> None:
        """Draw the first stack of a job."""
        self._wall = wall_of(Document(job), 0) if job is not None else None
        self.update()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.update()

    def sizeHint(self) -> QSize:
        """Return a height that shows names above and thicknesses below."""
        return QSize(300, HEIGHT)

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw the wall."""
        if self._wall is None:
            return
        painter = QPainter(self)
        paint_wall(painter, QRectF(self.rect()), self._wall, self._theme)
        painter.end()
