"""Draw the window with every sample job and every panel, light and dark, at 1 and 2 pixels a point; then look."""

import argparse
import subprocess
import sys
from collections.abc import Iterator, Sequence
from pathlib import Path

from app.window.picture import LISTED

HERE = Path(__file__).parent
SAMPLES = HERE.parents[1] / "app" / "samples"
SIZES = (("1200x750", "1"), ("1920x1080", "1"), ("1440x900", "2"))
PANELS = [one.name for one in LISTED]
README = {
    "window-light.png": ("weather-radar-cover", "1280x840", "--scale", "2"),
    "window-dark.png": ("coated-window", "1280x840", "--scale", "2", "--dark"),
    "cuts.png": ("weather-radar-cover", "1280x840", "--scale", "2", "--open", "cuts"),
    "map.png": ("sandwich-panel", "1280x840", "--scale", "2", "--open", "map", "--dark"),
    "plane.png": ("flat-absorber", "1280x840", "--scale", "2", "--open", "plane"),
}


def draw(job: Path, out: Path, size: str, *options: str) -> None:
    """Draw one picture with the program's own command; raises CalledProcessError when it fails."""
    command = [sys.executable, "-m", "app", "picture", str(job), "--png", str(out), "--size", size, *options]
    subprocess.run(command, check=True)


def every_sample(folder: Path) -> Iterator[Path]:
    """Draw all samples into `folder`, and yield each picture's path."""
    for job in sorted(SAMPLES.glob("*.slabjob")):
        for look, options in (("light", ()), ("dark", ("--dark",))):
            for size, scale in SIZES:
                out = folder / f"{job.stem}-{size}-{scale}x-{look}.png"
                draw(job, out, size, "--scale", scale, *options)
                yield out
            for panel in PANELS:
                out = folder / f"{job.stem}-{panel}-{look}.png"
                draw(job, out, "1440x900", "--open", panel, *options)
                yield out


def readme() -> Iterator[Path]:
    """Draw the pictures of the README, and yield each one's path."""
    for name, (sample, size, *options) in README.items():
        draw(SAMPLES / f"{sample}.slabjob", HERE / name, size, *options)
        yield HERE / name


def main(arguments: Sequence[str]) -> int:
    """Draw what is asked for."""
    parser = argparse.ArgumentParser(prog="python -m tests.pictures")
    parser.add_argument("folder", nargs="?", type=Path, help="where the pictures of all samples go")
    parser.add_argument("--readme", action="store_true", help="the README's pictures instead")
    given = parser.parse_args(arguments)
    if given.readme == (given.folder is not None):
        parser.error("either FOLDER or --readme")
    if given.folder is not None:
        given.folder.mkdir(parents=True, exist_ok=True)
    for path in readme() if given.readme else every_sample(given.folder):
        print(path, flush=True)
    return 0


if __name__ == "__main__":
    raise SystemExit(main(sys.argv[1:]))
