"""The solver against its floor and against the plain product of 2×2 matrices."""

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from stackcore import ConstantMedium, Layer, Response, Stack, solve
from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import SPEED_OF_LIGHT
from tests.bench.timing import floor_seconds, in_turns, seconds

LAYERS = 20


def layers(count: int = LAYERS, *, lossy: bool = True) -> list[tuple[complex, float]]:
    """Return permittivity and thickness in m of different layers, the same at every run."""
    rng = np.random.default_rng(20)
    return [
        (complex(rng.uniform(2, 10), -rng.uniform(0.01, 0.1) if lossy else 0.0), rng.uniform(0.5e-3, 3e-3))
        for _ in range(count)
    ]


def wall(count: int = LAYERS, *, lossy: bool = True) -> Stack:
    """Return a stack of `layers` in air."""
    return Stack(tuple(Layer(ConstantMedium(epsilon), d) for epsilon, d in layers(count, lossy=lossy)))


def plain_product(
    stack: Stack, frequency: FloatArray, angle: FloatArray
) -> tuple[NDArray[np.complex128], NDArray[np.complex128]]:
    """Return r and t, (F, A, 2), by the vectorised product of characteristic matrices in air.

    The baseline of this bench: right for thin walls, overflowing for thick ones, with everything in memory at
    once. Source: M. Born, E. Wolf, Principles of Optics, 7th ed., section 1.6.
    """
    k = (2 * np.pi * frequency / SPEED_OF_LIGHT)[:, np.newaxis]
    sin2, cosine = np.sin(angle) ** 2, np.cos(angle)
    r, t = [], []
    for polarization in ("TE", "TM"):
        product = np.broadcast_to(np.eye(2, dtype=np.complex128), (frequency.size, angle.size, 2, 2))
        for element in stack.elements:
            assert isinstance(element, Layer)
            epsilon = element.medium.evaluate(frequency).permittivity[:, np.newaxis]
            q: ComplexArray = np.sqrt(epsilon - sin2)
            admittance = q if polarization == "TE" else epsilon / q
            phase = k * q * element.thickness
            c, s = np.cos(phase), 1j * np.sin(phase)
            matrix = np.stack(
                [np.stack([c, s / admittance], axis=-1), np.stack([s * admittance, c], axis=-1)], axis=-2
            )
            product = product @ matrix
        y0 = cosine if polarization == "TE" else 1 / cosine
        e = product[..., 0, 0] + product[..., 0, 1] * y0
        h = product[..., 1, 0] + product[..., 1, 1] * y0
        r.append((y0 * e - h) / (y0 * e + h))
        t.append(2 * y0 / (y0 * e + h))
    return np.stack(r, axis=-1), np.stack(t, axis=-1)


def r_and_t(response: Response) -> tuple[ComplexArray, ComplexArray]:
    """Return both coefficients of a response."""
    return response.reflection, response.transmission


def report() -> Iterator[str]:
    """Yield one line a figure."""
    frequency = np.linspace(8e9, 12e9, 2001)
    for label, angle, rounds in (
        ("map, 2001 frequencies × 91 angles", np.radians(np.linspace(0, 89, 91)), 7),
        ("sweep, 2001 frequencies × 3 angles", np.radians([0.0, 30.0, 60.0]), 25),
        ("angles, 1 frequency × 901 angles", np.radians(np.linspace(0, 89, 901)), 25),
    ):
        at = frequency if angle.size < 900 else frequency[:1]
        points = LAYERS * at.size * angle.size
        for kind, stack in (("lossy", wall()), ("lossless", wall(lossy=False))):
            turns = in_turns(
                rounds,
                floor=lambda points=points: floor_seconds(points),  # type: ignore[misc]
                solve=lambda s=stack, f=at, a=angle: seconds(lambda: r_and_t(solve(s, f, a))),  # type: ignore[misc]
            )
            yield (
                f"{label}, {LAYERS} {kind} layers, r and t with phase: "
                f"{turns.ratio('solve', 'floor'):.2f} floors ({turns.middle('solve') * 1e3:.1f} ms)"
            )
    angle = np.radians(np.linspace(0, 89, 91))
    stack = wall()
    turns = in_turns(
        3,
        plain=lambda: seconds(lambda: plain_product(stack, frequency, angle)),
        solve=lambda: seconds(lambda: r_and_t(solve(stack, frequency, angle))),
    )
    yield (
        f"map by the plain 2×2 product: {turns.ratio('plain', 'solve'):.1f} times the solver's time "
        f"({turns.middle('plain') * 1e3:.0f} ms)"
    )
    for name in ("absorptance", "insertion_loss_dB", "insertion_phase_delay_deg", "group_delay_s"):
        turns = in_turns(
            15,
            floor=lambda: floor_seconds(LAYERS * frequency.size * 3),
            one=lambda name=name: seconds(  # type: ignore[misc]
                lambda: getattr(solve(stack, frequency, np.radians([0.0, 30.0, 60.0])), name)
            ),
        )
        yield f"sweep with {name}: {turns.ratio('one', 'floor'):.2f} floors ({turns.middle('one') * 1e3:.1f} ms)"
