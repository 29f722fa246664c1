"""The sample jobs: each is sound, solves, and shows what its notes say."""

from pathlib import Path

import numpy as np
import pytest

import stackcore as sc
from stackcore.job import read_job, with_resolved_library, write_job
from stackcore.media.base import FloatArray
from stackcore.media.library import library_entry

FOLDER = Path(__file__).resolve().parents[2] / "app" / "samples"
SAMPLES = sorted(FOLDER.glob("*.slabjob"))
TE, TM = 0, 1


def stack_of(sample: str, name: str) -> sc.Stack:
    """Return the stack `name` of the sample file `sample`."""
    job = read_job(FOLDER / f"{sample}.slabjob")
    (stack,) = [stack for stack in job.stacks if stack.name == name]
    return stack


def response_of(sample: str, name: str, gigahertz: float | FloatArray, degrees: float = 0.0) -> sc.Response:
    """Return the response of a sample's stack at one angle."""
    return sc.solve(stack_of(sample, name), np.atleast_1d(gigahertz) * 1e9, np.radians(degrees))


def worst_transmittance(name: str) -> float:
    """Return the lowest transmittance of a weather radar cover from 9.30 to 9.45 GHz over its angles."""
    gigahertz = np.linspace(9.30, 9.45, 7)
    return min(
        float(response_of("weather-radar-cover", name, gigahertz, degrees).transmittance.min())
        for degrees in (0, 20, 40, 55)
    )


def null_of(name: str) -> float:
    """Return the frequency in GHz at which an absorber reflects least at normal incidence."""
    gigahertz = np.linspace(8, 12, 801)
    loss = response_of("flat-absorber", name, gigahertz).return_loss_dB[:, 0, TE]
    return float(gigahertz[loss.argmax()])


def test_there_are_samples_for_every_trade() -> None:
    """Radomes, windows, housings, absorbers and shielded rooms each have a sample, and titles differ."""
    assert {path.stem for path in SAMPLES} == {
        "coated-window",
        "flat-absorber",
        "instrument-housing",
        "sandwich-panel",
        "shielded-room",
        "weather-radar-cover",
    }
    assert len({read_job(path).title for path in SAMPLES}) == len(SAMPLES)


@pytest.mark.parametrize("path", SAMPLES, ids=lambda path: path.stem)
def test_a_sample_reads_without_fault_and_says_what_it_is_for(path: Path) -> None:
    """A sample has a title, notes with what to look at and the cautions, and sources for its own materials."""
    record = read_job(path).record
    assert record.title
    assert len({stack.name for stack in record.stacks}) == len(record.stacks) >= 2
    for words in ("invented", "Look at:", "Caution:", "infinite flat sheets", "verify by test"):
        assert words in record.notes
    for material in record.materials:
        assert material.library or material.source
        if material.library:
            assert library_entry(material.library).provenance.source


@pytest.mark.parametrize("path", SAMPLES, ids=lambda path: path.stem)
def test_a_sample_solves_finitely(path: Path) -> None:
    """Every stack of a sample, over its whole sweep, gives finite powers that add up to what came in."""
    job = read_job(path)
    for stack in job.stacks:
        response = sc.solve(stack, job.sweep.frequencies(), job.sweep.angles())
        total = response.reflectance + response.transmittance + response.absorptance
        assert total == pytest.approx(1.0, abs=1e-9)
        assert (response.absorptance >= 0).all()
        assert np.isfinite(response.return_loss_dB).all()
        assert np.isfinite(response.group_delay_s).all() or stack.back is sc.METAL
        assert np.isfinite(response.shielding_effectiveness_dB).all() == (stack.back is not sc.METAL)


@pytest.mark.parametrize("path", SAMPLES, ids=lambda path: path.stem)
def test_a_sample_survives_saving(path: Path, tmp_path: Path) -> None:
    """A sample written and read again has its texts as typed, its library's values beside them, equal stacks."""
    job = read_job(path)
    write_job(job, tmp_path / "copy.slabjob")
    again = read_job(tmp_path / "copy.slabjob")
    assert again.record == with_resolved_library(job.record)
    assert again.stacks == job.stacks
    write_job(again, tmp_path / "third.slabjob")
    assert (tmp_path / "third.slabjob").read_bytes() == (tmp_path / "copy.slabjob").read_bytes()


def test_the_thinner_cover_has_the_better_worst_point() -> None:
    """9.56 mm beats the half-wave wall of 9.86 mm, and paint costs more: the worst points were worked out apart."""
    assert worst_transmittance("Half-wave at 55 degrees") == pytest.approx(0.9104, abs=1e-4)
    assert worst_transmittance("Best worst point") == pytest.approx(0.9349, abs=1e-4)
    assert worst_transmittance("Half-wave with paint") == pytest.approx(0.8866, abs=1e-4)


def test_the_cover_has_the_figures_of_the_single_slab() -> None:
    """At 9.375 GHz the half-wave wall has the loss and the phase of the closed form of one slab."""
    normal = response_of("weather-radar-cover", "Half-wave at 55 degrees", 9.375)
    assert normal.insertion_loss_dB[0, 0, TE] == pytest.approx(0.375, abs=1e-3)
    assert normal.return_loss_dB[0, 0, TE] == pytest.approx(13.00, abs=0.01)
    assert normal.insertion_phase_delay_deg[0, 0, TE] == pytest.approx(94.03, abs=0.01)
    oblique = response_of("weather-radar-cover", "Half-wave at 55 degrees", 9.375, 55)
    assert oblique.insertion_loss_dB[0, 0] == pytest.approx([0.216, 0.139], abs=1e-3)


def worst_loss(stack: sc.Stack) -> float:
    """Return the highest insertion loss in dB from 8.5 to 10 GHz up to 60 degrees, both polarizations."""
    response = sc.solve(stack, np.linspace(8.5e9, 10e9, 31), np.radians([0, 30, 45, 60]))
    return float(response.insertion_loss_dB.max())


def with_core(stack: sc.Stack, thickness: float) -> sc.Stack:
    """Return a sandwich with its thickest layer, the core, of another thickness in m."""
    layers = [element for element in stack.elements if isinstance(element, sc.Layer)]
    core = max(layers, key=lambda layer: layer.thickness)
    return sc.Stack(tuple(sc.Layer(core.medium, thickness) if layer is core else layer for layer in layers))


def test_bonds_and_paint_move_the_sandwich_down() -> None:
    """The core that is best on paper is too thick once bonds and paint are there; the losses of the notes hold."""
    names = ("Skins and core only", "Bonded", "Bonded and painted")
    job = read_job(FOLDER / "sandwich-panel.slabjob")
    assert [stack.name for stack in job.stacks] == list(reversed(names)), "the panel as it is built comes first"
    assert (job.sweep.frequencies().min(), job.sweep.frequencies().max()) == (8.5e9, 10e9)
    plain, bonded, painted = (stack_of("sandwich-panel", name) for name in names)
    # Worked out apart with another code.
    assert [worst_loss(stack) for stack in (plain, bonded, painted)] == pytest.approx(
        [0.466, 0.666, 0.835], abs=1e-3
    )
    assert worst_loss(plain) < min(worst_loss(with_core(plain, 9.6e-3)), worst_loss(with_core(plain, 9.8e-3)))
    assert worst_loss(with_core(painted, 8.7e-3)) == pytest.approx(0.614, abs=1e-3)


def test_the_window_ripples_about_its_coating() -> None:
    """The coated window lies some decibels about 33.6 dB and differs by polarization, as worked out apart."""
    for gigahertz, coated, uncoated in [(0.7, 32.88, 0.36), (1.8, 30.09, 0.59), (3.5, 35.16, 2.69)]:
        # Worked out with the frequency-dependent loss of ITU-R P.2040-3, which the library's constant is close to.
        found = response_of("coated-window", "Coated", gigahertz).insertion_loss_dB[0, 0, TE]
        assert found == pytest.approx(coated, abs=0.05)
        found = response_of("coated-window", "Uncoated", gigahertz).insertion_loss_dB[0, 0, TE]
        assert found == pytest.approx(uncoated, abs=0.05)
    te, tm = response_of("coated-window", "Coated", 3.5, 60).insertion_loss_dB[0, 0]
    assert (te, tm) == pytest.approx((38.86, 25.66), abs=0.05)


def test_the_window_keeps_the_ranges_of_its_notes() -> None:
    """From 0.6 to 6 GHz: 30 to 37 dB at normal incidence, and TE 5 to 17 dB above TM at 60 degrees."""
    gigahertz = np.linspace(0.6, 6, 541)
    normal = response_of("coated-window", "Coated", gigahertz).insertion_loss_dB[:, 0, TE]
    assert (normal.min(), normal.max()) == pytest.approx((30, 37), abs=0.5)
    oblique = response_of("coated-window", "Coated", gigahertz, 60).insertion_loss_dB[:, 0]
    difference = oblique[:, TE] - oblique[:, TM]
    assert (difference.min(), difference.max()) == pytest.approx((5, 17), abs=0.5)


def test_the_paint_of_the_housing_is_flat_and_the_foil_rises() -> None:
    """The paint shields 20 log(1 + Z₀/2R) where the plastic is thin; the foil exceeds its plateau at 1 GHz."""
    paint = response_of("instrument-housing", "Conductive paint", np.array([1e-5, 1e-3, 0.1, 1.0]))
    plateau = 20 * np.log10(1 + 376.730 / (2 * 0.05))
    assert plateau == pytest.approx(71.52, abs=0.005)
    assert paint.shielding_effectiveness_dB[:, 0, TE] == pytest.approx(plateau, abs=0.03)
    top = response_of("instrument-housing", "Conductive paint", np.linspace(4, 18, 141))
    assert plateau - top.shielding_effectiveness_dB.min() == pytest.approx(4.4, abs=0.1)
    foil = response_of("instrument-housing", "Copper foil", np.array([1e-5, 1e-3, 1.0]))
    low, middle, high = foil.shielding_effectiveness_dB[:, 0, TE]
    assert (low, middle) == pytest.approx((111.65, 111.65), abs=0.05)
    assert high > 200


def test_film_and_glue_move_the_absorber_down() -> None:
    """The null moves from 10 GHz to 9.3 GHz with film and glue, and thinner foam brings it back."""
    assert null_of("On paper") == pytest.approx(10.0, abs=0.05)
    assert null_of("As built") == pytest.approx(9.29, abs=0.02)
    assert null_of("As built, thinner foam") == pytest.approx(10.05, abs=0.02)


@pytest.mark.parametrize("name", ["On paper", "As built", "As built, thinner foam"])
def test_no_absorber_keeps_20_db_at_45_degrees(name: str) -> None:
    """At 45 degrees a single sheet of 377 ohm reflects more than 1 % at every frequency of the sweep."""
    loss = response_of("flat-absorber", name, np.linspace(6, 14, 401), 45).return_loss_dB
    assert loss.max() < 20


def test_permeability_only_adds_to_the_shielding_of_the_room() -> None:
    """At every frequency magnetic steel shields a plane wave at least as well as steel without permeability."""
    gigahertz = np.geomspace(1e-5, 18, 101)
    magnetic = response_of("shielded-room", "Steel, permeability 200", gigahertz).shielding_effectiveness_dB
    plain = response_of("shielded-room", "Steel, permeability 1", gigahertz).shielding_effectiveness_dB
    assert (magnetic >= plain).all()
    foil = response_of("shielded-room", "Copper foil", gigahertz).shielding_effectiveness_dB
    assert foil.min() == pytest.approx(111.65, abs=0.1)
