"""The march from the back half-space to the front face, in tangential fields.

Every layer takes the pair (E, H) at its exit to the pair at its entry (symbols in `stackcore.propagation.waves`):

    E_in = e^(−β)cos φ · E + j X e^(−β)(sin φ / q) · H
    H_in = e^(−β)cos φ · H + j B e^(−β)(sin φ / q) · E

The factor e^(+β) left out is summed apart, so no number ever grows: a wall of any depth stays finite, and no
admittance is ever divided by zero. A third row N = H − Y₀E is marched when asked for,

    N_in = e^(−β)cos φ · N + j e^(−β)(sin φ / q) · [(B − X Y₀²) E − X Y₀ N]

because r = −N/(Y₀E + H) keeps all its digits where the wall hardly reflects and Y₀E − H does not.
A sheet of impedance z takes (E, H) to (zE, zH + Z₀E)/(|z| + Z₀), which holds for a short circuit too.
"""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import FREE_SPACE_IMPEDANCE
from stackcore.media.base import AbstractMedium
from stackcore.propagation.waves import Incidence, LayerWave, Passage, Wave, departure, layer_wave, wave_in
from stackcore.sheets.base import AbstractSheet
from stackcore.stack import Element, Layer, PerfectConductor, Stack

_RESCALE_EVERY = 6
_RESCALE_ABOVE = 2.0**150
_RESCALE_BELOW = 2.0**-150


@dataclass(frozen=True, slots=True)
class Scene:
    """A stack as a block of points sees it.

    `elements` are those that act: no layer of thickness 0, and no sheet lying on a metal back. Each stands with
    its index in the stack, and with its wave when it is a layer.
    """

    incidence: Incidence
    front: Wave
    back: Wave | None
    elements: tuple[tuple[int, Element, LayerWave | None], ...]


def acting_elements(stack: Stack) -> list[tuple[int, Element]]:
    """Return the elements that can change anything, each with its index, from front to back."""
    acting = [
        (index, element)
        for index, element in enumerate(stack.elements)
        if not (isinstance(element, Layer) and element.thickness == 0)
    ]
    while isinstance(stack.back, PerfectConductor) and acting and not isinstance(acting[-1][1], Layer):
        acting.pop()
    return acting


class SceneMaker:
    """Makes the scenes of a sweep, block by block, and keeps what they share.

    Waves in media that do not depend on frequency are worked out once for all angles; equal media share one.
    """

    def __init__(self, stack: Stack, angle: FloatArray) -> None:
        self._stack = stack
        self._angle = angle.reshape(-1, 1)
        self._acting = acting_elements(stack)
        self._kept: dict[AbstractMedium, Wave] = {}
        self._kept_layers: dict[int, LayerWave] = {}

    def scene(self, angles: slice, frequency: FloatArray) -> Scene:
        """Return the stack at some of the angles and at `frequency` (F,) in Hz."""
        front, back = self._stack.front, self._stack.back
        if front.dispersive:  # then every refraction depends on frequency, and nothing can be kept
            self._kept.clear()
            self._kept_layers.clear()
        every = self._incidence(slice(None), frequency)
        incidence = self._incidence(angles, frequency)
        fresh: dict[AbstractMedium, Wave] = {}

        def wave(medium: AbstractMedium) -> Wave:
            if medium.dispersive:
                if medium not in fresh:
                    fresh[medium] = wave_in(medium, incidence)
                return fresh[medium]
            if medium not in self._kept:
                self._kept[medium] = wave_in(medium, every)
            return self._kept[medium]

        def layer(index: int, element: Layer) -> LayerWave:
            medium = element.medium
            if medium.dispersive:
                return layer_wave(wave(medium), element.thickness, incidence)
            if index not in self._kept_layers:
                made = layer_wave(wave(medium), element.thickness, every)
                self._kept_layers[index] = made
            return self._kept_layers[index].rows(angles)

        def half_space(medium: AbstractMedium) -> Wave:
            return wave(medium) if medium.dispersive else wave(medium).rows(angles)

        return Scene(
            incidence,
            half_space(front),
            None if isinstance(back, PerfectConductor) else half_space(back),
            tuple(
                (index, element, layer(index, element) if isinstance(element, Layer) else None)
                for index, element in self._acting
            ),
        )

    def _incidence(self, angles: slice, frequency: FloatArray) -> Incidence:
        front = self._stack.front
        values = front.evaluate(frequency if front.dispersive else frequency[:1])
        return Incidence(frequency, self._angle[angles], values.permittivity.real, values.permeability.real)


@dataclass(frozen=True, slots=True)
class Step:
    """One element as the march met it, for those who watch: exit fields and the scale taken out on the way in.

    `fields` is (2 polarizations, 2, A, F): E and H at the exit. `shed` is ln of the factor that the march took out
    of the entry fields on the way through, broadcastable to (2, A, F), or None for none; `rescaled` is the part of
    it that was only for comfort.
    """

    index: int
    element: Element
    layer: LayerWave | None
    passage: Passage | None
    fields: ComplexArray
    shed: FloatArray | None
    rescaled: FloatArray | None


@dataclass(frozen=True, slots=True)
class Arrival:
    """What the march brings to the front face.

    `fields` is (2, rows, A, F) with rows E, H and, when asked for, N. `shed` is ln |true fields / marched
    fields|, (2, A, F) or broadcastable, with the transmitted E of the back half-space as the unit; `turned` is
    the angle of that factor (sheets only).
    """

    fields: ComplexArray
    shed: FloatArray
    turned: FloatArray


def start_fields(back: Wave | None, shape: tuple[int, int]) -> ComplexArray:
    """Return (2, 2, A, F): E and H of the outgoing wave behind the stack, to a common factor per polarization.

    TE is (1, q/μ); TM is (q, ε), which also holds at the critical angle; a metal back is (0, 1).
    """
    fields = np.zeros((2, 2, *shape), dtype=np.complex128)
    if back is None:
        fields[:, 1] = 1
    else:
        fields[0, 0] = 1
        fields[0, 1] = back.q / back.permeability
        fields[1, 0] = back.q
        fields[1, 1] = back.permittivity
    return fields


def march(
    scene: Scene,
    frequency: FloatArray,
    *,
    reference: Wave | None = None,
    watch: Callable[[Step], None] | None = None,
) -> Arrival:
    """March the fields of `scene` to the front face.

    Parameters
    ----------
    scene
        The stack under an incidence whose frequencies are `frequency`, or, when nothing in it depends on
        frequency, any.
    frequency
        (F,) in Hz.
    reference
        When given, the third row N = H − Y_ref E is marched for this wave.
    watch
        Called for each element, from back to front.
    """
    shape = (scene.incidence.angle.shape[0], frequency.size)
    rows = 2 if reference is None else 3
    fields = np.empty((2, rows, *shape), dtype=np.complex128)
    fields[:, :2] = start_fields(scene.back, shape)
    reference_y = None
    if reference is not None:
        reference_y = reference.q / reference.x
        fields[:, 2] = fields[:, 1] - reference_y * fields[:, 0]
        if scene.back is not None:
            fields[:, 2] = _step_of_admittance(scene.back, reference, fields)
    shed: FloatArray = np.zeros((2, *shape))
    turned: FloatArray = np.zeros(frequency.size)
    work = _Workspace(fields)
    for count, (index, element, layer) in enumerate(reversed(scene.elements), start=1):
        before = fields[:, :2].copy() if watch is not None else fields
        passage = None
        shedding: FloatArray | None = None
        if layer is not None:
            passage = layer.passage(frequency)
            fields, work.kept = _through_layer(fields, layer.wave, passage, work, reference, reference_y), fields
            shedding = passage.decay
        elif not isinstance(element, Layer):
            fields, shedding, turn = _through_sheet(fields, element.sheet, frequency, reference_y)
            turned = turned + turn
        rescaled = _rescale(fields) if count % _RESCALE_EVERY == 0 else None
        if rescaled is not None:
            shedding = rescaled if shedding is None else shedding + rescaled
        if shedding is not None:
            shed += shedding
        if watch is not None:
            watch(Step(index, element, layer, passage, before, shedding, rescaled))
    return Arrival(fields, shed, turned)


def _step_of_admittance(back: Wave, reference: Wave, fields: ComplexArray) -> ComplexArray:
    """Return H − Y_ref E of the start fields without cancellation: (Y² − Y_ref²) E/(Y + Y_ref), Y² = B/X."""
    # (B − X Y_ref²) = X (Y² − Y_ref²); with H = Y E this gives (H − Y_ref E) = dep·E² / (X (H + Y_ref E)).
    reference_y = reference.q / reference.x
    total = fields[:, 1] + reference_y * fields[:, 0]
    step: ComplexArray = departure(back, reference) * fields[:, 0] ** 2 / (back.x * total)
    return step


class _Workspace:
    """Arrays that a march writes over and over, so that it stays in cache and asks for no memory."""

    __slots__ = ("kept", "moved", "term")

    def __init__(self, fields: ComplexArray) -> None:
        self.kept = np.empty_like(fields)
        self.moved = np.empty_like(fields)
        self.term = np.empty_like(fields[:, 0])


def _through_layer(
    fields: ComplexArray,
    wave: Wave,
    passage: Passage,
    work: _Workspace,
    reference: Wave | None,
    reference_y: ComplexArray | None,
) -> ComplexArray:
    """Return the entry fields, in `work.kept`."""
    kept, moved, term = work.kept, work.moved, work.term
    np.multiply(fields, passage.cosine, out=kept)
    np.multiply(fields, passage.sine, out=moved)
    kept[:, 0] += np.multiply(wave.x, moved[:, 1], out=term)
    kept[:, 1] += np.multiply(wave.b, moved[:, 0], out=term)
    if reference is not None and reference_y is not None:
        kept[:, 2] += np.multiply(departure(wave, reference), moved[:, 0], out=term)
        kept[:, 2] -= np.multiply(wave.x * reference_y, moved[:, 2], out=term)
    return kept


def _through_sheet(
    fields: ComplexArray, sheet: AbstractSheet, frequency: FloatArray, reference_y: ComplexArray | None
) -> tuple[ComplexArray, FloatArray, FloatArray]:
    """Return the entry fields, ln of the factor taken out, and the angle of that factor."""
    impedance = sheet.impedance(frequency)
    size = np.abs(impedance) + FREE_SPACE_IMPEDANCE
    through = fields * (impedance / size)
    jump = fields[:, 0] * (FREE_SPACE_IMPEDANCE / size)
    through[:, 1] += jump
    if reference_y is not None:
        through[:, 2] += jump
    with np.errstate(divide="ignore"):  # a short circuit: ln 0, nothing is transmitted
        shed = -np.log(np.abs(impedance) / size)
    return through, shed, -np.angle(impedance)


def _rescale(fields: ComplexArray) -> FloatArray | None:
    """Bring fields that left the comfortable range back to about 1, in place; return ln of what was taken out."""
    parts = np.abs(fields[:, :2].view(np.float64))
    size = parts.max(axis=1)
    size = np.maximum(size[..., 0::2], size[..., 1::2])
    if size.max() < _RESCALE_ABOVE and size.min() > _RESCALE_BELOW:
        return None
    exponents = np.frexp(size)[1]
    fields *= np.ldexp(1.0, -exponents)[:, np.newaxis]
    taken: FloatArray = exponents * np.log(2.0)
    return taken
