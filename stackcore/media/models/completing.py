"""Constants that take the place of others: the loss of ε counts once."""

from stackcore.media.models.values import Constants


def completed(given: Constants, constants: Constants) -> Constants:
    """Return `constants` with those `given` in their place, the loss of ε counted once.

    A loss part takes the place of a loss tangent, and the other way round.

    Examples
    --------
    >>> dry = Constants(permittivity=4.2 + 0j, loss_tangent=0.015)
    >>> completed(Constants(permittivity=4.6 - 0.2j), dry)["permittivity"]
    (4.6-0.2j)
    >>> "loss_tangent" in completed(Constants(permittivity=4.6 - 0.2j), dry)
    False
    """
    permittivity = given.get("permittivity")
    if isinstance(permittivity, complex) and permittivity.imag:
        constants = constants.with_value("loss_tangent", None)
    stored = constants.get("permittivity")
    if "loss_tangent" in given and isinstance(stored, complex):
        constants = constants.with_value("permittivity", complex(stored.real))
    return Constants({**constants, **given})
