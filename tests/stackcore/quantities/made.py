"""Responses with given coefficients, as no stack need have them."""

import numpy as np

from stackcore import Response, Stack


def response_of(
    reflection: tuple[complex, complex] = (0.1, 0.1),
    log_transmission: tuple[complex, complex] = (0j, 0j),
    angle: float = 0.5,
) -> Response:
    """Return a response between equal half-spaces with r and ln t for TE and TM at one frequency and angle."""
    r = np.array(reflection, dtype=np.complex128).reshape(2, 1, 1)
    log_t = np.array(log_transmission, dtype=np.complex128).reshape(2, 1, 1)
    return Response(Stack(), np.array([1e10]), np.array([angle]), r, log_t, -log_t.real, np.ones((2, 1, 1)))
