"""Gain and impossible constants are refused, with the name of the constant, by the models not tested elsewhere."""

from collections.abc import Callable
from typing import Any

import pytest

from stackcore.media.base import AbstractMedium
from stackcore.media.checks import check_exponents
from stackcore.media.cole_cole import ColeColeMedium
from stackcore.media.cole_davidson import ColeDavidsonMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.havriliak_negami import HavriliakNegamiMedium
from stackcore.media.lossy_dielectric import LossyDielectricMedium
from stackcore.media.magnetic_debye import MagneticDebyeMedium
from stackcore.media.multi_debye import MultiDebyeMedium, RelaxationTerm
from stackcore.media.wideband import WidebandStepMedium

NAN, INFINITE = float("nan"), float("inf")
BOTH: Any = "both"  # what a file may hold, though the types forbid it
RIGHT = RelaxationTerm(1.0, 1e-9)


@pytest.mark.parametrize(
    ("make", "told"),
    [
        (lambda: DebyeMedium(0.0, 1.0, 1e-9), "high_frequency_permittivity 0 must be above 0"),
        (lambda: DebyeMedium(2.0, -1.0, 1e-9), "permittivity_step -1 is negative, which would be gain"),
        (lambda: DebyeMedium(2.0, 1.0, 0.0), "relaxation_time 0 s must be above 0"),
        (lambda: DebyeMedium(2.0, 1.0, INFINITE), "relaxation_time inf is not finite"),
        (lambda: DebyeMedium(2.0, 1.0, 1e-9, -0.1), "conductivity -0.1 S/m is negative, which would be gain"),
        (lambda: DebyeMedium(2.0, 1.0, 1e-9, 1e41), r"conductivity 1e\+41 is beyond 1e\+40"),
        (lambda: MultiDebyeMedium(2.0, ()), "terms must hold at least one term"),
        (
            lambda: MultiDebyeMedium(2.0, (RIGHT, RelaxationTerm(-1.0, 1e-9))),
            r"terms\[1\].permittivity_step -1 is negative, which would be gain",
        ),
        (
            lambda: MultiDebyeMedium(2.0, (RelaxationTerm(1.0, -1e-9), RIGHT)),
            r"terms\[0\].relaxation_time -1e-09 s must be above 0",
        ),
        (lambda: ColeColeMedium(2.0, 8.0, 1e-9, 1.1), "symmetric_exponent 1.1 is above 1, which would be gain"),
        (lambda: ColeColeMedium(2.0, 8.0, 1e-9, 0.0), "symmetric_exponent 0 must be above 0"),
        (lambda: ColeColeMedium(2.0, 8.0, 1e-9, 1e-5), "must lie between 0.001 and 1000"),
        (
            lambda: ColeDavidsonMedium(2.0, 8.0, 1e-9, 1.1),
            "asymmetric_exponent 1.1 is above 1, which would be gain",
        ),
        (
            lambda: HavriliakNegamiMedium(2.0, 8.0, 1e-9, 0.8, 1.3),
            "asymmetric_exponent 1.3 is above 1/symmetric_exponent = 1.25, which would be gain",
        ),
        (lambda: HavriliakNegamiMedium(2.0, 8.0, 1e-9, NAN, 0.5), "symmetric_exponent nan is not finite"),
        (lambda: WidebandStepMedium(3.9, -0.6, 1e3, 1e12), "permittivity_step -0.6 is negative"),
        (lambda: WidebandStepMedium(3.9, 0.6, 1e12, 1e3), "lower_frequency .* must lie below upper_frequency"),
        (lambda: WidebandStepMedium(0.0, 0.6, 1e3, 1e12), "high_frequency_permittivity 0 must be above 0"),
        (lambda: LossyDielectricMedium(0.0), "permittivity 0 must be above 0"),
        (lambda: LossyDielectricMedium(4.0, 0.01, 0.04), "given twice, by loss_tangent and by loss_part"),
        (lambda: LossyDielectricMedium(4.0, -0.01), "loss_tangent -0.01 is negative, which would be gain"),
        (lambda: LossyDielectricMedium(4.0, loss_part=-0.1), "loss_part -0.1 is negative, which would be gain"),
        (lambda: LossyDielectricMedium(4.0, conductivity=-1.0), "conductivity -1 S/m is negative"),
        (lambda: LossyDielectricMedium(4.0, permeability=1 + 1j), "permeability .* has gain"),
        (lambda: MagneticDebyeMedium(1.0, -1.0, 1e-9), "permeability_step -1 is negative, which would be gain"),
        (lambda: MagneticDebyeMedium(0.0, 1.0, 1e-9), "high_frequency_permeability 0 must be above 0"),
        (lambda: MagneticDebyeMedium(1.0, 1.0, 0.0), "relaxation_time 0 s must be above 0"),
        (
            lambda: ConstantMedium.with_loss_tangent(4.2, -0.01),
            "loss_tangent -0.01 is negative, which would be gain",
        ),
        (lambda: ConstantMedium.with_loss_tangent(-4.2, 0.01), "permittivity .* has gain"),
        (lambda: ConstantMedium(-4.2 - 1j, loss_as="tangent"), "permittivity -4.2 must be above 0"),
        (lambda: ConstantMedium(4.2, loss_as=BOTH), "loss_as 'both' is unknown; there are part, tangent"),
    ],
)
def test_refused(make: Callable[[], AbstractMedium], told: str) -> None:
    """ValueError names the constant, what was given and what is wrong with it."""
    with pytest.raises(ValueError, match=told):
        make()


def test_the_reciprocal_of_an_exponent_is_allowed() -> None:
    """1/a is an allowed second exponent though a times it is not always 1 to the last digit."""
    for a in (0.3, 0.49, 0.7, 0.83, 0.9):
        check_exponents(a, 1 / a)


def test_loss_is_counted_once() -> None:
    """Loss tangent, loss part and conductivity each give the loss that they stand for, and no more."""
    by_tangent = LossyDielectricMedium(4.0, 0.02, conductivity=0.0)
    by_part = LossyDielectricMedium(4.0, loss_part=0.08)
    assert by_tangent.dielectric == by_part.dielectric == 4.0 - 0.08j
    assert ConstantMedium.with_loss_tangent(4.0, 0.02).permittivity == 4.0 - 0.08j
    assert ConstantMedium.with_loss_tangent(4.0, 0.0).permittivity == 4.0
