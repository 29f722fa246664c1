"""A quantity as it stands in a file: the text that was typed, or the number that was given instead of one."""

import json

from stackcore.errors import UnitError
from stackcore.units.dimensions import Dimension
from stackcore.units.measure import Measure, format_value, parse_measure


def written_measure(measure: Measure, dimension: Dimension) -> str | int | float:
    """Return the text as typed, or the number that was given instead of a text.

    A text that does not give the value again, which only a record built by hand can hold, is replaced.

    Examples
    --------
    >>> written_measure(Measure(0.002, "2 mm"), Dimension.LENGTH)
    '2 mm'
    >>> written_measure(Measure(0.002, "0.002"), Dimension.LENGTH)
    0.002
    """
    try:
        number = json.loads(measure.text)
    except ValueError:
        number = None
    if type(number) in (int, float) and repr(number) == measure.text and float(number) == measure.value:
        return float(number) if type(number) is float else int(number)
    try:
        if parse_measure(measure.text, dimension).value == measure.value:
            return measure.text
    except UnitError:
        pass
    return format_value(measure.value, dimension)
