"""The palette and the fonts of Qt, made from a `Theme`."""

from PySide6.QtCore import Qt
from PySide6.QtGui import QColor, QFont, QGuiApplication, QPalette
from PySide6.QtWidgets import QApplication, QToolTip

from app.look.theme import DARK, LIGHT, Theme

_Role = QPalette.ColorRole
_Group = QPalette.ColorGroup


def palette_of(theme: Theme) -> QPalette:
    """Return the Qt palette of a theme."""
    palette = QPalette()
    colours = {
        _Role.Window: theme.window,
        _Role.WindowText: theme.text,
        _Role.Base: theme.base,
        _Role.AlternateBase: theme.window,
        _Role.Text: theme.text,
        _Role.PlaceholderText: theme.muted,
        _Role.Button: theme.raised,
        _Role.ButtonText: theme.text,
        _Role.BrightText: theme.on_accent,
        _Role.Highlight: theme.accent,
        _Role.HighlightedText: theme.on_accent,
        _Role.Accent: theme.accent,
        _Role.Link: theme.accent,
        _Role.LinkVisited: theme.accent,
        _Role.ToolTipBase: theme.raised,
        _Role.ToolTipText: theme.text,
        _Role.Light: theme.raised,
        _Role.Midlight: theme.line,
        _Role.Mid: theme.edge,
        _Role.Dark: theme.edge,
        _Role.Shadow: theme.edge,
    }
    for role, colour in colours.items():
        palette.setColor(role, QColor(colour))
    for role in (_Role.WindowText, _Role.Text, _Role.ButtonText):
        palette.setColor(_Group.Disabled, role, QColor(theme.edge))
    palette.setColor(_Group.Disabled, _Role.Highlight, QColor(theme.line))
    palette.setColor(_Group.Disabled, _Role.HighlightedText, QColor(theme.muted))
    return palette


def apply_theme(application: QApplication, theme: Theme) -> None:
    """Give the whole application this look: the Fusion style and the palette, also of tool tips."""
    if application.style().name().lower() != "fusion":
        application.setStyle("Fusion")
    palette = palette_of(theme)
    application.setPalette(palette)
    QToolTip.setPalette(palette)


def preferred_theme(choice: str) -> Theme:
    """Return the theme for ``light``, ``dark`` or ``auto``; auto follows the system if it tells."""
    if choice == "auto":
        scheme = QGuiApplication.styleHints().colorScheme()
        return DARK if scheme == Qt.ColorScheme.Dark else LIGHT
    return DARK if choice == "dark" else LIGHT


def heading_font(font: QFont) -> QFont:
    """Return `font` one step larger and of medium weight, for headings."""
    heading = QFont(font)
    if font.pointSizeF() > 0:
        heading.setPointSizeF(font.pointSizeF() * 1.12)
    else:
        heading.setPixelSize(round(font.pixelSize() * 1.12))
    heading.setWeight(QFont.Weight.Medium)
    return heading


def tabular_font(font: QFont) -> QFont:
    """Return `font` with figures of equal width, for columns of numbers."""
    figures = QFont(font)
    figures.setFeature(QFont.Tag("tnum"), 1)
    return figures
