"""The package as others import it: names, weight, and no toolkit."""

import subprocess
import sys

import pytest

import stackcore


def test_public_names_are_sorted_and_exist() -> None:
    """`__all__` holds every public name of the package once, sorted as the linter sorts."""
    assert len(set(stackcore.__all__)) == len(stackcore.__all__)
    for name in stackcore.__all__:
        assert hasattr(stackcore, name)


def _modules_after(statement: str) -> set[str]:
    script = f"import sys\n{statement}\nprint(' '.join(sys.modules))"
    done = subprocess.run([sys.executable, "-c", script], capture_output=True, text=True, check=True)
    return set(done.stdout.split())


@pytest.mark.parametrize("statement", ["import stackcore", "import stackcore.cli"])
def test_the_core_loads_no_toolkit_and_no_heavy_science(statement: str) -> None:
    """Importing the core pulls in neither Qt nor the slow parts of scipy."""
    loaded = _modules_after(statement)

    assert not {"PySide6", "pyqtgraph", "scipy.optimize", "scipy.interpolate"} & loaded


@pytest.mark.parametrize(
    ("statement", "limit"), [("import stackcore", 0.5), ("from stackcore import read_job, solve", 3.0)]
)
def test_the_package_loads_quickly(statement: str, limit: float) -> None:
    """The package alone, and the solver with jobs, add little to the import of numpy: the best of five.

    In times of that import: others may be at work on the machine, so that seconds say nothing.
    """
    script = f"""import time
begin = time.process_time()
import numpy
floor = time.process_time() - begin
begin = time.process_time()
{statement}
print((time.process_time() - begin) / floor)"""
    ratios = [
        float(subprocess.run([sys.executable, "-c", script], capture_output=True, text=True, check=True).stdout)
        for _ in range(5)
    ]

    assert min(ratios) < limit


def test_every_public_name_is_where_it_is_said_to_be() -> None:
    """Each name can be had, is listed, and one that does not exist says so."""
    for name in stackcore.__all__:
        assert getattr(stackcore, name) is not None
    assert set(stackcore.__all__) <= set(dir(stackcore))
    with pytest.raises(AttributeError, match="no attribute 'solv'"):
        getattr(stackcore, "sol" + "v")
