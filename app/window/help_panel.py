"""The help panel: local pages beside the work, never over it."""

from collections.abc import Callable, Mapping
from typing import Final

from PySide6.QtCore import Qt, QUrl
from PySide6.QtGui import QFont
from PySide6.QtWidgets import QButtonGroup, QFrame, QHBoxLayout, QTextBrowser, QToolButton, QVBoxLayout, QWidget

from app.look.theme import Theme

Page = Callable[[Theme], str]

SHORT: Final = {
    "start": "First steps",
    "conventions": "Definitions",
    "keyboard": "Keyboard",
    "cautions": "Cautions",
    "about": "About",
}


class HelpPanel(QWidget):
    """Pages of help with a row of buttons to change between them.

    Parameters
    ----------
    pages
        Page name -> function that makes its HTML for a theme; called anew each time the page is shown.
    """

    def __init__(self, pages: Mapping[str, Page], theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._pages = pages
        self._theme = theme
        self._shown = next(iter(pages))
        self._text = QTextBrowser(self)
        self._text.setAccessibleName("Help")
        self._text.setFrameShape(QFrame.Shape.NoFrame)
        self._text.setOpenLinks(False)
        self._text.document().setDocumentMargin(12)
        self._buttons = QButtonGroup(self)
        self._build()
        self.setFocusProxy(self._text)
        self.setMinimumWidth(280)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of `theme`."""
        self._theme = theme
        self.refresh()

    def show_page(self, name: str, anchor: str = "") -> None:
        """Show a page, scrolled to `anchor` when it has one; another page than before begins at its top."""
        turned = name != self._shown
        self._shown = name
        self.refresh()
        if anchor:
            self._text.scrollToAnchor(anchor)
        elif turned:
            self._text.verticalScrollBar().setValue(0)

    def refresh(self) -> None:
        """Make the shown page anew, where the reader is."""
        bar = self._text.verticalScrollBar()
        place = bar.value()
        self._text.document().setDefaultStyleSheet(_style(self._theme, self.font()))
        self._text.setHtml(self._pages[self._shown](self._theme))
        bar.setValue(place)
        for button in self._buttons.buttons():
            button.setChecked(button.objectName() == self._shown)

    def shown_text(self) -> str:
        """Return the text of the page shown, without markup."""
        return self._text.toPlainText()

    def _build(self) -> None:
        row = QHBoxLayout()
        row.setContentsMargins(4, 0, 4, 4)
        row.setSpacing(4)
        for name in self._pages:
            button = QToolButton(self)
            button.setObjectName(name)
            button.setText(SHORT[name])
            button.setCheckable(True)
            button.setAutoRaise(True)
            button.setFocusPolicy(Qt.FocusPolicy.TabFocus)
            button.clicked.connect(lambda _=False, page=name: self.show_page(page))
            self._buttons.addButton(button)
            row.addWidget(button)
        row.addStretch(1)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(0)
        column.addLayout(row)
        column.addWidget(self._text, 1)
        self._text.setSource(QUrl())


def _style(theme: Theme, font: QFont) -> str:
    size = font.pointSizeF() if font.pointSizeF() > 0 else 9.0
    return f"""
    p {{ margin: 4px 0 4px 0; }}
    p.title {{ font-size: {size * 1.3:.1f}pt; font-weight: 500; margin: 0 0 8px 0; }}
    p.heading {{ font-size: {size * 1.12:.1f}pt; font-weight: 500; margin: 16px 0 4px 0; }}
    p.term {{ font-weight: 600; margin: 12px 0 0 0; }}
    code {{ color: {theme.muted}; }}
    a {{ color: {theme.accent}; }}
    """
