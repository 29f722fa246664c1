"""The values of constants: what a file and a window hold of a material, each as it was given."""

from collections.abc import Iterable, Iterator, Mapping
from typing import Any

from stackcore.units import Measure

Value = complex | float | bool | str | Measure | tuple["Constants", ...]
"""A relative constant, a number, yes or no, a choice or the name of a material, a quantity, a list of terms."""


class Constants(Mapping[str, Value]):
    """Constants by name, in the order given; it cannot be changed, and two with equal values are equal.

    Examples
    --------
    >>> Constants(permittivity=4.2 + 0j).with_value("loss_tangent", 0.015)
    Constants(permittivity=(4.2+0j), loss_tangent=0.015)
    """

    __slots__ = ("_hash", "_values")

    def __init__(self, values: Mapping[str, Value] | Iterable[tuple[str, Value]] = (), /, **named: Value) -> None:
        self._values = dict(values, **named)
        self._hash: int | None = None

    def __getitem__(self, name: str) -> Value:
        return self._values[name]

    def __iter__(self) -> Iterator[str]:
        return iter(self._values)

    def __len__(self) -> int:
        return len(self._values)

    def __eq__(self, other: object) -> bool:
        if isinstance(other, Constants):
            return self is other or self._values == other._values
        return self._values == other if isinstance(other, Mapping) else NotImplemented

    def __hash__(self) -> int:
        # A table of thousands of rows is asked at every edit whether it is still the same.
        if self._hash is None:
            self._hash = hash(frozenset(self._values.items()))
        return self._hash

    def __repr__(self) -> str:
        return f"Constants({', '.join(f'{name}={value!r}' for name, value in self._values.items())})"

    def __reduce__(self) -> tuple[Any, ...]:
        return Constants, (self._values,)

    def with_value(self, name: str, value: Value | None) -> "Constants":
        """Return constants with one of them set, or taken away by None."""
        changed = {**self._values}
        if value is None:
            changed.pop(name, None)
        else:
            changed[name] = value
        return Constants(changed)


def plain_number(number: float) -> int | float:
    """Return whole numbers without the ``.0`` that nobody types."""
    number = float(number)
    return int(number) if number.is_integer() and abs(number) < 1e15 else number


def relative_text(value: complex) -> str:
    """Return ε or μ as it is typed: ``4.2``, ``12 - 0.5j``.

    Examples
    --------
    >>> relative_text(12 - 0.5j), relative_text(4.2 + 0j)
    ('12 - 0.5j', '4.2')
    """
    real = repr(plain_number(value.real))
    if value.imag == 0:
        return real
    return f"{real} {'-' if value.imag < 0 else '+'} {plain_number(abs(value.imag))!r}j"


def value_text(value: Value) -> str:
    """Return a constant as it is typed and read, a list of terms as how many there are."""
    match value:
        case Measure():
            return value.text
        case bool():
            return "yes" if value else "no"
        case str():
            return value
        case tuple():
            return f"{len(value)} row{'' if len(value) == 1 else 's'}"
        case complex():
            return relative_text(value)
    return repr(plain_number(value))
