"""Submenus that are filled each time they open: samples and recent files."""

from app.window.actions import Entry
from app.window.commands import Commands
from app.window.samples import Sample


def sample_entries(c: Commands) -> tuple[Entry, ...]:
    """Return a line for each sample job, by its title."""

    def entry(sample: Sample) -> Entry:
        return Entry(sample.title, lambda: c.files.open_sample(sample), tip=sample.path.name)

    return tuple(entry(sample) for sample in c.samples)


def recent_entries(c: Commands) -> tuple[Entry, ...]:
    """Return a line for each recent file with its number as access key; a missing file cannot be chosen."""
    paths = c.recent.paths()

    def entry(number: int, name: str, index: int) -> Entry:
        path = paths[index]
        there = path.exists()
        tip = str(path) if there else f"{path} is not there"
        text = f"&{number % 10} {name}".replace("&10", "1&0")
        return Entry(text, lambda: c.files.open_path(path), there, tip)

    if not paths:
        return (Entry("No files yet", lambda: None, enabled=False),)
    return tuple(entry(index + 1, path.name, index) for index, path in enumerate(paths))
