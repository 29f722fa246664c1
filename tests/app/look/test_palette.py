"""The palette follows the theme, and settings stay where tests put them."""

from pathlib import Path

import pytest
from PySide6.QtGui import QFontInfo, QPalette
from PySide6.QtWidgets import QApplication

from app.look.palette import apply_theme, heading_font, palette_of, preferred_theme, tabular_font
from app.look.settings import open_settings, settings_file, state_folder
from app.look.theme import DARK, LIGHT, Theme


@pytest.mark.parametrize("theme", [DARK, LIGHT], ids=["dark", "light"])
def test_the_application_takes_the_theme(qapp: QApplication, theme: Theme) -> None:
    """After applying a theme the application's own palette has its surfaces and inks."""
    apply_theme(qapp, theme)
    palette = qapp.palette()
    assert palette.color(QPalette.ColorRole.Window).name() == theme.window
    assert palette.color(QPalette.ColorRole.Text).name() == theme.text
    assert palette.color(QPalette.ColorRole.Highlight).name() == theme.accent
    assert qapp.style().name().lower() == "fusion"


def test_disabled_text_differs_from_enabled_text(qapp: QApplication) -> None:
    """What cannot be used now is drawn in another ink."""
    palette = palette_of(LIGHT)
    role = QPalette.ColorRole.ButtonText
    assert palette.color(QPalette.ColorGroup.Disabled, role) != palette.color(QPalette.ColorGroup.Active, role)


def test_choices_of_theme(qapp: QApplication) -> None:
    """Light and dark are what they say, and auto is one of the two."""
    assert preferred_theme("light") is LIGHT
    assert preferred_theme("dark") is DARK
    assert preferred_theme("auto") in (LIGHT, DARK)


def test_fonts_keep_the_family(qapp: QApplication) -> None:
    """Headings are larger, figures keep the size; both keep the system's family."""
    font = qapp.font()
    assert heading_font(font).pointSizeF() > font.pointSizeF()
    assert tabular_font(font).pointSizeF() == font.pointSizeF()
    assert QFontInfo(heading_font(font)).family() == QFontInfo(font).family()


def test_settings_live_in_the_folder_of_the_test(program_home: Path) -> None:
    """Settings are written to the one file, which the tests have moved, and come back with their type."""
    settings = open_settings()
    settings.setValue("probe/size", 12.5)
    settings.sync()
    assert settings_file() == program_home / "settings.ini"
    assert settings_file().exists()
    assert open_settings().value("probe/size", 0.0, type=float) == 12.5
    assert state_folder() == program_home / "state"
    assert state_folder().is_dir()
