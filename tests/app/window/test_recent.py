"""Recent files: newest first, no doubles, at most ten."""

from pathlib import Path

from app.look.settings import open_settings
from app.window.recent import MOST, RecentFiles


def test_newest_first_without_doubles(tmp_path: Path) -> None:
    """A file opened again moves to the front, also when it is named by another path."""
    recent = RecentFiles(open_settings())
    one, two = tmp_path / "one.slabjob", tmp_path / "two.slabjob"
    for path in (one, two, one, tmp_path / "deeper" / ".." / "two.slabjob"):
        recent.add(path)
    assert recent.paths() == (two, one)


def test_at_most_ten_and_kept_in_the_file(tmp_path: Path) -> None:
    """The eleventh file pushes out the oldest, and the next process reads the same list."""
    settings = open_settings()
    recent = RecentFiles(settings)
    for number in range(MOST + 3):
        recent.add(tmp_path / f"{number}.slabjob")
    settings.sync()
    kept = RecentFiles(open_settings()).paths()
    assert [path.stem for path in kept] == [str(number) for number in range(MOST + 2, 2, -1)]


def test_one_and_none_come_back_from_the_file(tmp_path: Path) -> None:
    """Lists of one and of nothing, which INI files spell differently, come back right."""
    settings = open_settings()
    RecentFiles(settings).add(tmp_path / "only, with comma.slabjob")
    settings.sync()
    assert RecentFiles(open_settings()).paths() == (tmp_path / "only, with comma.slabjob",)
    RecentFiles(settings).clear()
    settings.sync()
    assert RecentFiles(open_settings()).paths() == ()
    assert RecentFiles(open_settings()).folder == Path.home()
