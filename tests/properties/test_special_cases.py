"""The stacks that break solvers: opaque metal, exact resonance, critical angles, nothing at all, near matches."""

from itertools import product

import numpy as np
import pytest

from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from stackcore.errors import StackError
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Element, Layer, SheetPlacement, Stack
from tests.exact import exact, relative_error
from tests.properties.judging import misses, report
from tests.strategies import TE, TM, Case

COPPER = ConductorMedium(5.8e7)
STEEL = ConductorMedium(6e6, 200.0)
GLASS = ConstantMedium(4.2 * (1 - 0.015j))
X_BAND = 10e9
WAVELENGTH = SPEED_OF_LIGHT / X_BAND


def hold(case: Case) -> None:
    """Assert that everything about `case` is right to 1e-10 and a number."""
    found = misses(case)
    assert not found, report(case, found)
    response = case.solve()
    for values in (
        response.reflectance,
        response.transmittance,
        response.absorptance,
        response.element_absorptance,
    ):
        assert np.all(np.isfinite(values))


@pytest.mark.parametrize("degrees", [0.0, 45.0, 80.0])
def test_shielding_beyond_the_double_range(degrees: float) -> None:
    """1 mm of copper at 10 GHz and 5 cm of steel at 1 GHz have a finite shielding, right to ten digits."""
    for medium, thickness, frequency in ((COPPER, 1e-3, 10e9), (STEEL, 5e-2, 1e9)):
        case = Case(Stack((Layer(medium, thickness),)), frequency, float(np.radians(degrees)))
        hold(case)
        shielding = case.solve().shielding_effectiveness_dB
        assert np.all(np.isfinite(shielding))
        assert np.all(shielding > 1e4)


@pytest.mark.parametrize("wavelengths", [1e-3, 0.4, 30.0])
def test_layer_at_its_critical_angle(wavelengths: float) -> None:
    """A lossless layer at its critical angle, a step of the double to either side and further off, is right."""
    layer = Layer(VACUUM, wavelengths * WAVELENGTH)
    for eps in np.linspace(1.1, 9.0, 40):
        prism = ConstantMedium(float(eps))
        critical = float(np.arcsin(1 / np.sqrt(eps)))
        near = [np.nextafter(critical, 0), critical, np.nextafter(critical, 2)]
        for angle in (*near, *(critical + off for off in (-1e-9, 1e-9, -1e-5, 1e-5))):
            hold(Case(Stack((layer,), front=prism, back=prism), X_BAND, float(angle)))


def test_layer_without_any_wave_number() -> None:
    """Where q² comes out as exactly 0 in doubles, as in eps = 2 at 45 degrees give or take a step, all is well."""
    zeros = 0
    for eps in np.linspace(1.1, 9.0, 400):
        critical = float(np.arcsin(1 / np.sqrt(eps)))
        for angle in (np.nextafter(critical, 0), critical, np.nextafter(critical, 2)):
            if (1 - eps) + eps * np.cos(angle) ** 2 == 0:
                zeros += 1
                layers = (Layer(VACUUM, 3 * WAVELENGTH), Layer(GLASS, 1e-3), Layer(VACUUM, WAVELENGTH))
                prism = ConstantMedium(float(eps))  # also behind: a back at its critical angle has its own test
                hold(Case(Stack(layers, front=prism, back=prism), X_BAND, float(angle)))
    assert zeros > 5, "the search no longer meets the case it is for"


@pytest.mark.parametrize("eps", [2.25, 4.0, 9.0])
def test_back_at_its_critical_angle(eps: float) -> None:
    """At and around the critical angle of the back R + T stays 1 and nothing is NaN."""
    critical = float(np.arcsin(1 / np.sqrt(eps)))
    layers = (Layer(ConstantMedium(3.0), 0.1 * WAVELENGTH),)
    for angle in (critical - 1e-9, np.nextafter(critical, 0), critical, np.nextafter(critical, 2), critical + 1e-9):
        response = Case(Stack(layers, front=ConstantMedium(eps)), X_BAND, float(angle)).solve()
        np.testing.assert_allclose(response.reflectance + response.transmittance, 1.0, rtol=1e-13)
        assert np.all(response.absorptance == 0)


@pytest.mark.parametrize("order", [1, 2, 101, 10_001])
def test_half_wave_layer(order: int) -> None:
    """A layer of exactly m half waves is not there: R is the square of what round-off leaves of its phase."""
    case = Case(Stack((Layer(ConstantMedium(4.0), order * WAVELENGTH / 4),)), X_BAND, 0.0)
    response = case.solve()
    truth = exact(case.stack, X_BAND, 0.0)[TE]
    assert float(response.reflectance[0, 0, TE]) < 1e-30 * order**2
    assert relative_error(float(response.transmittance[0, 0, TE]), truth.transmittance) < 1e-15 * order
    assert response.absorptance[0, 0, TE] == 0


def test_layers_of_zero_thickness() -> None:
    """Layers of no thickness change no digit, wherever they lie."""
    nothing = Layer(ConstantMedium(50 - 20j, 3 - 1j), 0.0)
    plain = (Layer(GLASS, 2e-3), SheetPlacement(SeriesSheet(100.0)), Layer(COPPER, 1e-7))
    padded = (nothing, plain[0], nothing, plain[1], nothing, nothing, plain[2], nothing)
    for degrees in (0.0, 60.0):
        bare = Case(Stack(plain, back=GLASS), X_BAND, float(np.radians(degrees))).solve()
        full = Case(Stack(padded, back=GLASS), X_BAND, float(np.radians(degrees))).solve()
        np.testing.assert_allclose(full.reflection, bare.reflection, rtol=1e-15)
        np.testing.assert_allclose(full.log_transmission, bare.log_transmission, rtol=1e-15)
        np.testing.assert_array_equal(full.element_absorptance[..., [0, 2, 4, 5, 7]], 0.0)


def test_only_zero_thickness() -> None:
    """A stack of nothing but layers without thickness is the bare meeting of the half-spaces."""
    stack = Stack((Layer(COPPER, 0.0), Layer(GLASS, 0.0)), back=ConstantMedium(9.0))
    bare = Case(Stack(back=ConstantMedium(9.0)), X_BAND, 0.5).solve()
    response = Case(stack, X_BAND, 0.5).solve()
    np.testing.assert_allclose(response.reflection, bare.reflection, rtol=1e-15)
    np.testing.assert_allclose(response.shielding_effectiveness_dB, 0.0, atol=1e-14)
    np.testing.assert_allclose(response.group_delay_s, 0.0, atol=1e-30)


def test_no_elements() -> None:
    """Vacuum between vacuum: R = A = 0, shielding 0 dB, no phase and no delay."""
    response = Case(Stack(), X_BAND, 1.0).solve()
    assert np.all(response.reflectance == 0)
    assert np.all(response.absorptance == 0)
    np.testing.assert_allclose(response.shielding_effectiveness_dB, 0.0, atol=1e-15)
    np.testing.assert_allclose(response.insertion_phase_delay_deg, 0.0, atol=1e-13)
    np.testing.assert_allclose(response.group_delay_s, 0.0, atol=1e-30)
    assert response.element_absorptance.shape == (1, 1, 2, 0)


def test_bare_metal() -> None:
    """A perfect conductor reflects −1, passes nothing and absorbs nothing at every angle."""
    for angle in (0.0, 1.0, np.radians(89.999)):
        response = Case(Stack(back=METAL), X_BAND, float(angle)).solve()
        np.testing.assert_array_equal(response.reflection, -1.0)
        np.testing.assert_array_equal(response.transmittance, 0.0)
        np.testing.assert_array_equal(response.absorptance, 0.0)
        assert np.all(response.shielding_effectiveness_dB == np.inf)
        assert np.all(response.insertion_loss_dB == np.inf)


@pytest.mark.parametrize("degrees", [89.9, 89.999, 89.999999, 89.99999999])
def test_grazing(degrees: float) -> None:
    """Ten digits of everything remain a millionth of a degree from grazing."""
    for elements in ((Layer(GLASS, 3e-3),), (Layer(VACUUM, 5e-2), Layer(ConstantMedium(3.0), 1e-3))):
        for back in (VACUUM, METAL, COPPER, ConstantMedium(2.0)):
            hold(Case(Stack(elements, back=back), X_BAND, float(np.radians(degrees))))


def test_last_double_before_grazing() -> None:
    """The angle just below π/2 gives numbers, and full reflection."""
    response = Case(Stack((Layer(GLASS, 3e-3),)), X_BAND, float(np.nextafter(np.pi / 2, 0))).solve()
    np.testing.assert_allclose(response.reflectance, 1.0, rtol=1e-12)


@pytest.mark.parametrize("frequency", 10.0 ** np.arange(3, 16))
def test_absorptance_of_a_copper_mirror(frequency: float) -> None:
    """What a copper mirror absorbs, down to 1e-7 of the power, has ten right digits; on film and in bulk."""
    for elements, back in (
        ((Layer(COPPER, 1e-3),), VACUUM),
        ((Layer(COPPER, 1e-3),), METAL),
        ((), COPPER),
        ((Layer(COPPER, 1e-8),), ConstantMedium(2.25)),
    ):
        for degrees in (0.0, 60.0):
            hold(Case(Stack(elements, back=back), float(frequency), float(np.radians(degrees))))


@pytest.mark.parametrize("thickness", [1e-9, 1e-6, 1e-3, 1.0])
@pytest.mark.parametrize("eps", [1.0001, 4.0, 4.2 - 0.063j, 80.0])
def test_electrically_very_thin(thickness: float, eps: complex) -> None:
    """At 1 Hz a wall reflects 1e-22 and less, and that figure has its ten digits."""
    case = Case(Stack((Layer(ConstantMedium(eps), thickness), Layer(ConstantMedium(2.0), thickness))), 1.0, 0.3)
    hold(case)
    assert np.all(case.solve().reflectance < 1e-10)


@pytest.mark.parametrize("excess", [1e-12, 1e-9, 1e-6, -1e-9, 1e-9 - 1e-10j])
@pytest.mark.parametrize("wavelengths", [0.01, 0.3, 20.3])
def test_near_match(excess: complex, wavelengths: float) -> None:
    """A layer that hardly differs from the air reflects next to nothing, and that has its ten digits."""
    layer = Layer(ConstantMedium(1 + excess), wavelengths * WAVELENGTH)
    for degrees in (0.0, 50.0, 89.0):
        hold(Case(Stack((layer,)), X_BAND, float(np.radians(degrees))))


@pytest.mark.parametrize("degrees", [0.0, 30.0, 75.0])
def test_near_match_to_dense_half_spaces(degrees: float) -> None:
    """The same between two half-spaces of permittivity 2 that differ by 1e-9 from the layer and each other."""
    layer = Layer(ConstantMedium(2 * (1 + 1e-9), 1 - 3e-10), 0.2 * WAVELENGTH)
    stack = Stack((layer,), front=ConstantMedium(2.0), back=ConstantMedium(2.0 * (1 - 2e-9)))
    hold(Case(stack, X_BAND, float(np.radians(degrees))))


@pytest.mark.parametrize("frequency", [1e3, 1e9, 3.7e9, 1e12])
def test_series_resonance_without_loss(frequency: float) -> None:
    """At its resonance a lossless L and C in series short the field: all reflected, no NaN, nothing absorbed."""
    inductance = 50.0 / (2 * np.pi * frequency)
    capacitance = 1 / (2 * np.pi * frequency * 50.0)
    for f in (frequency, np.nextafter(frequency, 0), np.nextafter(frequency, np.inf)):
        case = Case(Stack((SheetPlacement(SeriesSheet(0.0, inductance, capacitance)),)), float(f), 0.4)
        response = case.solve()
        np.testing.assert_allclose(response.reflection, -1.0, rtol=1e-12)
        assert np.all(response.transmittance < 1e-24)
        assert np.all(response.absorptance == 0)
        assert not np.any(np.isnan(response.shielding_effectiveness_dB))
        assert np.all(response.shielding_effectiveness_dB > 240)


def test_exact_short_between_layers() -> None:
    """A sheet whose reactance is exactly 0 in doubles shorts a stack in the middle: what lies behind is dark."""
    # ω = 2π f with L = 1/ω and C = 1/ω up to the rounding that makes ωL − 1/(ωC) vanish.
    omega = 2 * np.pi * 1e9
    found = [
        sheet
        for scale in np.linspace(1.0, 2.0, 300)
        if (sheet := SeriesSheet(0.0, float(scale / omega), float(1 / (omega * scale)))).impedance(np.array(1e9))
        == 0
    ]
    assert found, "the search no longer meets the case it is for"
    elements = (Layer(GLASS, 2e-3), SheetPlacement(found[0]), Layer(GLASS, 2e-3))
    response = Case(Stack(elements), 1e9, 0.3).solve()
    shorted = Case(Stack(elements[:1], back=METAL), 1e9, 0.3).solve()
    np.testing.assert_allclose(response.reflection, shorted.reflection, rtol=1e-12)
    np.testing.assert_array_equal(response.element_absorptance[..., 1:] < 1e-25, True)
    for values in (response.transmittance, response.absorptance, response.insertion_phase_delay_deg):
        assert not np.any(np.isnan(values))
    assert not np.any(np.isnan(response.group_delay_s))


def test_resonance_with_loss() -> None:
    """With a resistance in series the resonant sheet is that resistance, to ten digits."""
    sheet = SeriesSheet(10.0, 50.0 / (2 * np.pi * 1e9), 1 / (2 * np.pi * 1e9 * 50.0))
    hold(Case(Stack((SheetPlacement(sheet), Layer(GLASS, 1e-3))), 1e9, 0.4))


def test_sheets_on_the_metal() -> None:
    """Sheets laid on the perfect conductor carry no field: no digit changes and they absorb nothing."""
    sheets = (SheetPlacement(SeriesSheet(10.0)), SheetPlacement(SeriesSheet(1e-3, 1e-9)))
    layer = Layer(GLASS, 2e-3)
    for elements, plain in (((layer, *sheets), (layer,)), (sheets, ())):
        with_sheets = Case(Stack(elements, back=METAL), X_BAND, 0.4)
        hold(with_sheets)
        response = with_sheets.solve()
        np.testing.assert_allclose(
            response.reflection, Case(Stack(plain, back=METAL), X_BAND, 0.4).solve().reflection, rtol=1e-15
        )
        np.testing.assert_array_equal(response.element_absorptance[..., len(plain) :], 0.0)


def test_several_sheets_in_one_plane() -> None:
    """Sheets in one plane share the power as their conductances, in any order."""
    ohms = (50.0, 200.0, 1000.0)
    case = Case(Stack(tuple(SheetPlacement(SeriesSheet(r)) for r in ohms)), X_BAND, 0.6)
    hold(case)
    response = case.solve()
    shares = response.element_absorptance / response.absorptance[..., None]
    conductances = 1 / np.array(ohms)
    np.testing.assert_allclose(shares, np.broadcast_to(conductances / conductances.sum(), shares.shape), rtol=1e-13)
    together = Case(Stack((SheetPlacement(SeriesSheet(float(1 / conductances.sum()))),)), X_BAND, 0.6).solve()
    np.testing.assert_allclose(response.reflection, together.reflection, rtol=1e-14)


@pytest.mark.parametrize(("resistance", "size"), [(1e-6, 1), (1e12, 1), (FREE_SPACE_IMPEDANCE, 20)])
def test_extreme_sheets(resistance: float, size: int) -> None:
    """A micro-ohm, a tera-ohm and twenty matched sheets are right to ten digits."""
    elements: tuple[Element, ...] = (Layer(GLASS, 1e-4), SheetPlacement(SeriesSheet(resistance))) * size
    hold(Case(Stack(elements), X_BAND, 0.3))


@pytest.mark.parametrize(("eps", "mu"), list(product((1e4, -1e4, 1e4 - 1e4j, 1e-3), (1.0, 1e3, 1e3 - 1e3j))))
def test_extreme_media(eps: complex, mu: complex) -> None:
    """Large, negative and nearly vanishing constants are right from one layer to a wavelength of air of it."""
    for thickness in (1e-9, 1e-5, 1e-2):
        hold(Case(Stack((Layer(ConstantMedium(eps, mu), thickness),)), X_BAND, 0.7))


@pytest.mark.parametrize("turns", [1e3, 1e6 / (2 * np.pi), 1e7])
@pytest.mark.parametrize("tangent", [0.0, 1e-9])
def test_very_many_wavelengths(turns: float, tangent: float) -> None:
    """A million radians of phase and more do not cost the ten digits."""
    layer = Layer(ConstantMedium(6.31 * (1 - 1j * tangent)), float(turns) * WAVELENGTH / np.sqrt(6.31))
    for degrees in (0.0, 40.0, 70.0):
        hold(Case(Stack((layer, Layer(GLASS, 1e-3))), X_BAND, float(np.radians(degrees))))


def test_media_that_turn_the_wave_back() -> None:
    """A lossless back of negative ε and μ passes power like any other; of negative ε alone it reflects all."""
    passing = Case(Stack((Layer(GLASS, 1e-3),), back=ConstantMedium(-2.0, -1.5)), X_BAND, 0.3)
    hold(passing)
    assert np.all(passing.solve().transmittance > 0.1)
    blocking = Case(Stack((Layer(ConstantMedium(3.0), 1e-3),), back=ConstantMedium(-2.0)), X_BAND, 0.3)
    hold(blocking)
    np.testing.assert_allclose(blocking.solve().reflectance, 1.0, rtol=1e-14)


@pytest.mark.parametrize("front", [GLASS, COPPER, ConstantMedium(1.0, 1.0 - 1e-9j)])
def test_absorbing_front_is_refused(front: AbstractMedium) -> None:
    """Power is not a sum of incident and reflected parts in an absorbing front, so it is refused with a reason."""
    with pytest.raises(StackError, match="front"):
        Case(Stack((Layer(GLASS, 1e-3),), front=front), X_BAND, 0.3).solve()


@pytest.mark.parametrize("angle", [-0.1, np.pi / 2, 2.0, np.nan])
def test_impossible_angles_are_refused(angle: float) -> None:
    """Only 0 ≤ angle < π/2 is an angle of incidence."""
    with pytest.raises(StackError):
        Case(Stack(), X_BAND, angle).solve()


@pytest.mark.parametrize("frequency", [0.0, -1e9, np.nan, np.inf])
def test_impossible_frequencies_are_refused(frequency: float) -> None:
    """Only positive, finite frequencies."""
    with pytest.raises(StackError):
        Case(Stack(), frequency, 0.0).solve()


def test_polarizations_agree_at_normal_incidence() -> None:
    """In the ratios of the tangential field TE and TM are the same number at normal incidence."""
    elements = (Layer(GLASS, 3e-3), SheetPlacement(SeriesSheet(50.0)), Layer(ConstantMedium(3 - 1j, 2 - 1j), 1e-3))
    response = Case(Stack(elements, back=COPPER), X_BAND, 0.0).solve()
    np.testing.assert_allclose(response.reflection[..., TE], response.reflection[..., TM], rtol=1e-14)
    np.testing.assert_allclose(response.log_transmission[..., TE], response.log_transmission[..., TM], rtol=1e-14)
