"""Mass and cost by area."""

import pytest

from stackcore.job import Job, job_from_json
from stackcore.job.mass import cost_per_area, mass_per_area
from tests.stackcore.formats.files import FORMATS


@pytest.fixture
def job() -> Job:
    """The stored job: paint of the library, six plies of a priced laminate, a group of air and film."""
    return Job(job_from_json((FORMATS / "built-up-v1.slabjob").read_text(encoding="utf-8")))


def test_mass_is_thickness_times_density(job: Job) -> None:
    """0.1 mm of paint at 1300 kg/m³ and 1.5 mm of laminate at 1900 kg/m³; what is left out weighs nothing."""
    found = mass_per_area(job, 0)
    assert found.value == pytest.approx(0.1e-3 * 1300 + 1.5e-3 * 1900)
    assert found.whole


def test_cost_needs_prices(job: Job) -> None:
    """The laminate costs 12.5 a kilogram; the paint does not say."""
    found = cost_per_area(job, 0)
    assert found.value == pytest.approx(1.5e-3 * 1900 * 12.5)
    assert found.unknown == ("paint",)


def test_repeats_count_and_what_is_not_known_is_named() -> None:
    """Three times the layer; a material without a density is named once."""
    job = Job(
        job_from_json(
            '{"format": "slabwright-job", "version": 1, "title": "", "materials": {'
            '"a": {"model": "constant", "permittivity": 4, "density": "1 g/cm3"}, '
            '"b": {"model": "constant", "permittivity": 2}}, "stacks": [{"name": "A", "elements": ['
            '{"repeat": 3, "elements": [{"layer": "a", "thickness": "1 mm"}, '
            '{"layer": "b", "thickness": "1 mm"}]}]}],'
            '"sweep": {"frequency": ["1 GHz"], "angle": ["0 deg"]}}'
        )
    )
    found = mass_per_area(job, 0)
    assert found.value == pytest.approx(3.0)
    assert found.unknown == ("b",)
