"""Arithmetic on colours: contrast as WCAG 2 defines it, and lightness steps that the eye sees as even.

Lightness and hue are those of Oklab (B. Ottosson, "A perceptual color space for image processing", 2020), in
which equal steps of lightness look equal whatever the hue. No toolkit is needed here.
"""

import math
from functools import lru_cache

Linear = tuple[float, float, float]


def channels(colour: str) -> Linear:
    """Return red, green and blue of ``#rrggbb``, each from 0 to 1."""
    value = int(colour.removeprefix("#"), 16)
    return (value >> 16) / 255, (value >> 8 & 255) / 255, (value & 255) / 255


def luminance(colour: str) -> float:
    """Return the relative luminance of ``#rrggbb``: 0 for black, 1 for white (WCAG 2.2)."""
    red, green, blue = (_linear(channel) for channel in channels(colour))
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue


def contrast(one: str, other: str) -> float:
    """Return the contrast ratio of two colours, from 1 to 21 (WCAG 2.2).

    Examples
    --------
    >>> round(contrast("#ffffff", "#000000"))
    21
    """
    low, high = sorted((luminance(one), luminance(other)))
    return (high + 0.05) / (low + 0.05)


def mix(one: str, other: str, share: float) -> str:
    """Return the colour that lies `share` (0 to 1) of the way from `one` to `other`."""
    pairs = zip(channels(one), channels(other), strict=True)
    red, green, blue = (a + (b - a) * share for a, b in pairs)
    return _hexadecimal((red, green, blue))


def lightness(colour: str) -> float:
    """Return the lightness of ``#rrggbb`` in Oklab: 0 for black, 1 for white."""
    return _lightness_chroma_hue(colour)[0]


@lru_cache(maxsize=1024)
def with_lightness(colour: str, wanted: float) -> str:
    """Return `colour` at another Oklab lightness, of the same hue.

    The colourfulness is kept as far as the screen can show it at that lightness.
    """
    _, chroma, hue = _lightness_chroma_hue(colour)
    low, high = 0.0, chroma
    if _shows(wanted, high, hue):
        low = high
    for _ in range(24):
        middle = (low + high) / 2
        low, high = (middle, high) if _shows(wanted, middle, hue) else (low, middle)
    red, green, blue = _linear_rgb(wanted, low, hue)
    return _hexadecimal((_gamma(red), _gamma(green), _gamma(blue)))


@lru_cache(maxsize=4096)
def clear_of(colour: str, grounds: tuple[str, ...], ratio: float) -> str:
    """Return `colour`, made darker or lighter of the same hue until it stands out from every ground.

    Parameters
    ----------
    grounds
        The colours it is drawn on, all dark or all light.
    ratio
        Least contrast wanted, for example 4.5 for text.
    """
    step = -0.004 if luminance(grounds[0]) > 0.18 else 0.004
    wanted = lightness(colour)
    while min(contrast(colour, ground) for ground in grounds) < ratio and 0 <= wanted <= 1:
        wanted += step
        colour = with_lightness(colour, wanted)
    return colour


def _linear(channel: float) -> float:
    return channel / 12.92 if channel <= 0.04045 else ((channel + 0.055) / 1.055) ** 2.4


def _gamma(value: float) -> float:
    value = min(max(value, 0.0), 1.0)
    return 12.92 * value if value <= 0.0031308 else 1.055 * value ** (1 / 2.4) - 0.055


def _hexadecimal(rgb: Linear) -> str:
    return "#" + "".join(f"{round(min(max(channel, 0.0), 1.0) * 255):02x}" for channel in rgb)


def _shows(wanted: float, chroma: float, hue: float) -> bool:
    """Whether a screen can show this colour."""
    return all(-1e-6 <= value <= 1 + 1e-6 for value in _linear_rgb(wanted, chroma, hue))


def _lightness_chroma_hue(colour: str) -> Linear:
    red, green, blue = (_linear(channel) for channel in channels(colour))
    long = math.cbrt(0.4122214708 * red + 0.5363325363 * green + 0.0514459929 * blue)
    medium = math.cbrt(0.2119034982 * red + 0.6806995451 * green + 0.1073969566 * blue)
    short = math.cbrt(0.0883024619 * red + 0.2817188376 * green + 0.6299787005 * blue)
    light = 0.2104542553 * long + 0.7936177850 * medium - 0.0040720468 * short
    a = 1.9779984951 * long - 2.4285922050 * medium + 0.4505937099 * short
    b = 0.0259040371 * long + 0.7827717662 * medium - 0.8086757660 * short
    return light, math.hypot(a, b), math.atan2(b, a)


def _linear_rgb(light: float, chroma: float, hue: float) -> Linear:
    a, b = chroma * math.cos(hue), chroma * math.sin(hue)
    long = (light + 0.3963377774 * a + 0.2158037573 * b) ** 3
    medium = (light - 0.1055613458 * a - 0.0638541728 * b) ** 3
    short = (light - 0.0894841775 * a - 1.2914855480 * b) ** 3
    return (
        4.0767416621 * long - 3.3077115913 * medium + 0.2309699292 * short,
        -1.2684380046 * long + 2.6097574011 * medium - 0.3413193965 * short,
        -0.0041960863 * long - 0.7034186147 * medium + 1.7076147010 * short,
    )
