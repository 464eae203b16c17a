"""Traces from their layer, width and gap, or from the impedance that these must give."""

import math

import numpy as np

from chains import chain, line_abcd
from channel_file import get
from cross_section import C0, Section, width_for
from declared_lines import with_skew, written_delay
from materials import material_permittivity, surface


def slices_from(layers, index, step):
    """Dielectric from a copper layer outwards up to the nearest plane: [(height, material)], and that plane."""
    slices = []
    i = index + step
    while 0 <= i < len(layers):
        if layers[i].get("plane"):
            return slices, layers[i]
        piece = slice_of(layers, i)
        if piece:
            slices.append(piece)
        i += step
    return slices, None


def slice_of(layers, i):
    layer = layers[i]
    if "material" in layer:
        return layer["thickness"], layer["material"]
    beside = [layers[k] for k in (i - 1, i + 1) if 0 <= k < len(layers) and "material" in layers[k]]
    return (layer["thickness"], max(beside, key=lambda l: l["thickness"])["material"]) if beside else None


def height(slices):
    return sum(h for h, _ in slices)


def in_series(slices, f):
    if not slices:
        return np.ones_like(f, complex)
    return height(slices) / sum(h / material_permittivity(m, "through", f) for h, m in slices)


def trace(element, setting):
    values, layers = element["values"], element["stackup"]
    index = next(i for i, layer in enumerate(layers) if layer.get("copper") == values["layer"])
    above, below = slices_from(layers, index, -1), slices_from(layers, index, 1)
    if below[1]:
        (low, low_plane), (high, high_plane) = below, above
    elif above[1]:
        (low, low_plane), (high, high_plane) = above, below
    else:
        (low, low_plane), (high, high_plane) = sorted((below, above), key=lambda side: -height(side[0]))
        low_plane = layers[index]
    at = np.array([setting.nyquist])
    copper = layers[index]

    def make(width, gap):
        return Section(
            width, gap, copper["thickness"], height(low), float(in_series(low, at)[0].real),
            height(high), float(in_series(high, at)[0].real), high_plane is not None,
        )

    if "width" in values:
        width = float(get(values, "width"))
        section = make(width, float(get(values, "gap")) if setting.pair else None)
    else:
        nearest = min(height(low), height(high)) if high_plane else height(low)
        width = width_for(make, setting.pair, float(get(values, "impedance")), nearest)
        section = make(width, 1.5 * width if setting.pair else None)
    gamma, impedance, slowness = {}, {}, {}
    for mode in ("odd", "even") if setting.pair else ("odd",):
        strip, low_wall, high_wall = section.walls(mode)
        air = section.air(mode)
        lower, upper = section.shares(mode)
        # the strip is a slab of the depth that gives its resistance at DC, 1/(sigma w t)
        z = 1j * setting.w * air / C0 + strip * surface(copper["foil"], strip * width * copper["thickness"], setting)
        z = z + low_wall * surface(low_plane["foil"], math.inf, setting)
        if high_plane:
            z = z + high_wall * surface(high_plane["foil"], math.inf, setting)
        eps = 1 + lower * (in_series(low, setting.f) - 1) + upper * (in_series(high, setting.f) - 1)
        y = 1j * setting.w * eps / (air * C0)
        gamma[mode], impedance[mode] = np.sqrt(z) * np.sqrt(y), np.sqrt(z) / np.sqrt(y)
    length = float(get(values, "length"))
    per_meter = float(np.interp(setting.nyquist, setting.f, gamma["odd"].imag)) / (2 * np.pi * setting.nyquist)
    if "loss" in values or written_delay(values) is not None:
        raise NotImplementedError("a trace with geometry and declared loss or delay")
    legs = [line_abcd(gamma[m] * length, impedance[m]) for m in gamma]
    return with_skew(chain(legs[0], legs[-1], setting.legs), values, setting, per_meter)
