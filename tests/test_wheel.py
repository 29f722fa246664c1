"""What is installed is what stands here: the wheel holds the materials and runs without the window's toolkit."""

import subprocess
import sys
import zipfile
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]


@pytest.fixture(scope="module")
def installed(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Return a folder with the unpacked wheel, far from the checkout."""
    folder = tmp_path_factory.mktemp("wheel")
    command = [sys.executable, "-m", "hatchling", "build", "-t", "wheel", "-d", str(folder)]
    subprocess.run(command, cwd=ROOT, check=True, capture_output=True)
    (wheel,) = folder.glob("*.whl")
    with zipfile.ZipFile(wheel) as archive:
        archive.extractall(folder / "site")
    return folder / "site"


def _run(site: Path, code: str) -> str:
    blocked = "import sys; sys.modules['PySide6'] = sys.modules['pyqtgraph'] = None\n"
    script = f"import sys; sys.path.insert(0, {str(site)!r})\n{blocked}{code}"
    done = subprocess.run(
        [sys.executable, "-I", "-c", script], cwd=site, capture_output=True, text=True, check=False
    )
    assert done.returncode == 0, done.stderr
    return done.stdout


def test_the_wheel_finds_its_materials(installed: Path) -> None:
    """A library entry is read from inside the installed package."""
    code = (
        "import stackcore, stackcore.media.library as l\n"
        "print(stackcore.__file__, l.materials_dir(), l.library_entry('metals/copper').label)"
    )
    out = _run(installed, code)

    assert str(installed) in out
    assert "_materials" in out


def test_the_wheel_sweeps_without_the_toolkit(installed: Path) -> None:
    """The command line sweeps a shipped sample where PySide6 and pyqtgraph are absent."""
    code = (
        "from stackcore.cli import main\n"
        f"raise SystemExit(main(['sweep', {str(installed / 'app/samples/weather-radar-cover.slabjob')!r}, "
        "'--csv', '-']))"
    )

    assert _run(installed, code).startswith("stack,frequency_Hz,angle_deg,polarization,reflectance")


def test_the_wheel_leaves_scripts_and_tests_out(installed: Path) -> None:
    """Only the two packages and the metadata are installed."""
    top = {path.name for path in installed.iterdir()}

    assert {name for name in top if not name.endswith(".dist-info")} == {"app", "stackcore"}
    assert not list(installed.rglob("*.sh"))
