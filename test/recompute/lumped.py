"""Vias, stubs and capacitors."""

import math

import numpy as np

from chains import both, line_abcd, reversed_chain, series, shunt, times
from channel_file import get
from cross_section import C0, EPS0, MU0
from materials import material_permittivity, permittivity
from traces import slice_of


def via(element, setting):
    values, layers = element["values"], element["stackup"]
    coppers = {layer["copper"]: i for i, layer in enumerate(layers) if "copper" in layer}
    span = [coppers[name] for name in values.get("span", [])] or [min(coppers.values()), max(coppers.values())]
    ends = sorted((coppers[element["from"]], coppers[element["to"]]))
    hole, antipad = float(get(values, "drill")), float(get(values, "antipad"))
    pad = float(get(values, "pad", hole + 0.2e-3))
    outer = max(antipad, 1.05 * hole)
    inductance = MU0 / 2 / np.pi * math.log(outer / hole)
    if setting.pair:
        inductance = max(inductance, MU0 / 2 / np.pi * math.acosh(max(float(get(values, "pitch")), 1.05 * hole) / hole))
    air_capacitance = 2 * np.pi * EPS0 / math.log(outer / hole)

    def barrel(first, last, keep=math.inf):
        """Pieces (length, permittivity) from one row to another, in that order, cut after `keep` metres."""
        pieces = []
        for i in range(first, last + 1) if first <= last else range(first, last - 1, -1):
            piece = slice_of(layers, i)
            if piece and keep > 0:
                pieces.append((min(keep, piece[0]), material_permittivity(piece[1], "in-plane", setting.f)))
                keep -= piece[0]
        return pieces

    def wave(length, eps):
        return 1j * setting.w * np.sqrt(inductance * air_capacitance * eps) * length, np.sqrt(inductance / air_capacitance / eps)

    def pad_farads(i):
        clearance = max(0.0, antipad - pad)
        reach = layers[i]["thickness"] + sum(
            min(layers[k]["thickness"], clearance / 2)
            for k in (i - 1, i + 1) if 0 <= k < len(layers) and "material" in layers[k]
        )
        piece = slice_of(layers, i)
        dk = piece[1]["in-plane"][0] if piece else 1.0
        edge = max(antipad, 1.05 * max(pad, hole))
        return 0.0 if pad <= hole else 2 * np.pi * EPS0 * dk * reach * (1 / math.log(edge / pad) - 1 / math.log(edge / hole))

    def joint(i, end, side):
        """Pad and, beyond it, what the barrel leaves of a stub."""
        y = 1j * setting.w * pad_farads(i)
        if i == end:
            return both(shunt(y), setting)
        inner = i - 1 if end < i else i + 1
        pieces = barrel(inner, end)
        whole = sum(length for length, _ in pieces)
        left = get(values.get("backdrill") or {}, side)
        drilled = left is not None and float(left) < whole
        if drilled:
            pieces = barrel(inner, end, float(left))
        branch = 0j * setting.w if drilled else 1j * setting.w * pad_farads(end)
        for length, eps in reversed(pieces):
            gamma, z = wave(length, eps)
            branch = (branch + np.tanh(gamma) / z) / (1 + z * branch * np.tanh(gamma))
        return both(shunt(y + branch), setting)

    middle = [both(line_abcd(*wave(length, eps)), setting) for length, eps in barrel(ends[0], ends[1])]
    m = times(joint(ends[0], min(span), "top"), *middle, joint(ends[1], max(span), "bottom"))
    return reversed_chain(m) if coppers[element["from"]] > coppers[element["to"]] else m


def capacitor(element, setting):
    values = element["values"]
    pads = both(shunt(1j * setting.w * float(get(values, "pad-capacitance", 0.0)) / 2), setting)
    inner = float(get(values, "esr", 0.0)) + 1j * setting.w * float(get(values, "esl", 0.0))
    return times(pads, both(series(inner), setting), pads)


def stub(element, setting):
    values = element["values"]
    dk, df, z = get(values, "dk"), get(values, "df", 0.0), float(get(values, "impedance"))
    at = dk.at or 10e9
    eps = permittivity(float(dk), at, float(df), getattr(df, "at", None) or at, setting.f)
    gamma = 1j * setting.w / C0 * np.sqrt(eps) * float(get(values, "length"))
    z = z * math.sqrt(dk) / np.sqrt(eps)
    end = 1j * setting.w * float(get(values, "end-capacitance", 0.0))
    return both(shunt((end + np.tanh(gamma) / z) / (1 + z * end * np.tanh(gamma))), setting)
