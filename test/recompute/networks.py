"""Each element as a chain matrix of its physical legs over frequency, and the transfer of the whole.

A chain matrix relates [voltages, currents] of all legs at the transmitter side to those at the receiver side: 2 x 2 for
one conductor, 4 x 4 for a pair. The program that is checked works in mixed-mode scattering instead.
"""

import math
import os
import re

import numpy as np

from channel_file import get, quantity
from cross_section import C0, EPS0, MU0, Section, width_for

DB = 20 / math.log(10)
SKIN_SHARE = {"trace": 0.5, "package": 0.5, "cable": 0.8, "connector": 0.5}


class Setting:
    """What all elements share."""

    def __init__(self, frequencies, reference, pair, nyquist, celsius):
        self.f = frequencies
        self.w = 2 * np.pi * frequencies
        self.pair = pair
        self.legs = 2 if pair else 1
        self.reference = reference
        self.leg = reference / 2 if pair else reference
        self.nyquist = nyquist
        self.celsius = celsius


def blocks(odd, even, legs):
    """A leg's quantity in both modes as a matrix over the legs."""
    odd = np.asarray(odd, complex)
    if legs == 1:
        return odd[:, None, None]
    even = np.asarray(even, complex)
    same, cross = (even + odd) / 2, (even - odd) / 2
    return np.stack([np.stack([same, cross], -1), np.stack([cross, same], -1)], -2)


def chain(odd, even, legs):
    """From (A, B, C, D) of a leg in both modes."""
    a, b, c, d = (blocks(o, e, legs) for o, e in zip(odd, even))
    return np.concatenate([np.concatenate([a, b], -1), np.concatenate([c, d], -1)], -2)


def line_abcd(gamma_length, impedance):
    cosh, sinh = np.cosh(gamma_length), np.sinh(gamma_length)
    return cosh, impedance * sinh, sinh / impedance, cosh


def shunt(y):
    one = np.ones_like(y, complex)
    return one, 0 * one, np.asarray(y, complex), one


def series(z):
    one = np.ones_like(z, complex)
    return one, np.asarray(z, complex), 0 * one, one


def both(abcd, setting):
    return chain(abcd, abcd, setting.legs)


def times(*matrices):
    product = matrices[0]
    for matrix in matrices[1:]:
        product = product @ matrix
    return product


def reversed_chain(m):
    n = m.shape[-1] // 2
    t = lambda x: np.swapaxes(x, -1, -2)
    a, b, c, d = m[:, :n, :n], m[:, :n, n:], m[:, n:, :n], m[:, n:, n:]
    return np.concatenate([np.concatenate([t(d), t(b)], -1), np.concatenate([t(c), t(a)], -1)], -2)


def later_second_leg(setting, seconds):
    """A matched delay on the second leg, on the first where it is below 0."""
    one = np.ones_like(setting.f, complex)
    delayed = line_abcd(1j * setting.w * abs(seconds), setting.leg * one)
    plain = (one, 0 * one, 0 * one, one)
    legs = (plain, delayed) if seconds > 0 else (delayed, plain)
    m = np.zeros((len(setting.f), 4, 4), complex)
    for leg, (a, b, c, d) in enumerate(legs):
        m[:, leg, leg], m[:, leg, 2 + leg], m[:, 2 + leg, leg], m[:, 2 + leg, 2 + leg] = a, b, c, d
    return m


# Laminate and copper

def debye_log(f, low, high):
    return np.log((high + 1j * f) / (low + 1j * f))


def permittivity(dk, dk_hz, df, df_hz, f):
    """Djordjevic et al. 2001 from 10 kHz to 1 THz, dk at one frequency and df at another."""
    at_dk, at_df = debye_log(dk_hz, 1e4, 1e12), debye_log(df_hz, 1e4, 1e12)
    slope = df * dk / (-at_df.imag - df * (at_df.real - at_dk.real)) if df > 0 else 0.0
    return dk - slope * at_dk.real + slope * debye_log(f, 1e4, 1e12)


def material_permittivity(material, direction, f):
    return permittivity(*material[direction], *material["df"], f)


def surface(foil, depth, setting):
    """Surface impedance with skin effect, its joint with DC, and roughness."""
    sigma = foil["conductivity"] / (1 + 0.00393 * (setting.celsius - 20))
    k = np.sqrt(1j * setting.w * MU0 * sigma)  # (1 + j)/delta
    z = k / sigma / np.tanh(np.minimum(k.real * depth, 300) * (1 + 1j)) if math.isfinite(depth) else k / sigma
    delta = 1 / k.real
    if foil["rms"] > 0:
        s = 1.4j * (foil["rms"] / delta) ** 2
        root = np.sqrt(s)
        z = z * (1 + 2 / np.pi * (np.log(1 + root) - np.log(1 + s) / 2 + np.arctan(root)))
    elif foil["huray"]:
        radius, ratio = foil["huray"]
        z = z * (1 + 1.5 * ratio / (1 + delta / (radius * (1 + 1j))))
    return z


# Lines of declared loss

def declared_wave(points, skin_share, delay, delay_hz, f):
    """gamma times length: a sqrt(f) with equal phase, b f with its dispersion, and what is left of the delay in front."""
    a = b = 0.0
    reference = max((hz for _, hz in points), default=10e9)
    if len(points) == 1:
        nepers = points[0][0] / DB
        a, b = nepers * skin_share / math.sqrt(reference), nepers * (1 - skin_share) / reference
    elif points:
        y = np.array([max(db / DB, 1e-12) for db, _ in points])
        hz = np.array([at for _, at in points])
        rows = np.stack([np.sqrt(hz) / y, hz / y], -1)
        # least squares of the relative error, neither below 0
        candidates = [np.linalg.lstsq(rows, np.ones(len(y)), rcond=None)[0]]
        for only in (0, 1):
            alone = np.zeros(2)
            alone[only] = rows[:, only].sum() / (rows[:, only] ** 2).sum()
            candidates.append(alone)
        allowed = [c for c in candidates if (c >= 0).all()]
        a, b = min(allowed, key=lambda c: ((rows @ c - 1) ** 2).sum())
    delay_hz = delay_hz or reference
    band = (1e3, 1e14)
    spread = b / (-2 * np.pi * debye_log(reference, *band).imag)
    front = delay - spread * debye_log(delay_hz, *band).real - a / (2 * np.pi * math.sqrt(delay_hz))
    return a * np.sqrt(f) * (1 + 1j) + 2j * np.pi * f * (max(0.0, front) + spread * debye_log(f, *band))


def loss_points(written, nyquist, times_length=1.0):
    if written is None:
        return []
    values = [quantity(w) for w in (written if isinstance(written, list) else [written])]
    return [(float(v) * times_length, v.at or nyquist) for v in values]


def leg_ohms(values, ohms, setting):
    if not setting.pair:
        return ohms, ohms
    return ohms / 2, 2 * float(get(values, "common-impedance", ohms / 4))


def written_delay(values):
    if "delay" in values:
        return float(get(values, "delay"))
    if "velocity" in values:
        return 1 / float(get(values, "velocity"))
    return math.sqrt(float(get(values, "dk"))) / C0 if "dk" in values else None


def with_skew(m, values, setting, seconds_per_meter=None):
    skew = get(values, "skew")
    if skew is None or not setting.pair:
        return m
    seconds = float(skew) if skew.unit.endswith("s") else float(skew) * seconds_per_meter
    return times(m, later_second_leg(setting, seconds)) if seconds else m


def declared_segment(element, setting):
    values = element["values"]
    length, per_meter = float(get(values, "length")), written_delay(values)
    odd, even = leg_ohms(values, float(get(values, "impedance")), setting)
    if "loss" not in values and "df" in values:
        dk, df = (per_meter * C0) ** 2, get(values, "df")
        at = df.at or getattr(get(values, "dk"), "at", None) or 10e9
        gamma = 1j * setting.w / C0 * np.sqrt(permittivity(dk, at, float(df), at, setting.f)) * length
        scale = math.sqrt(dk) / np.sqrt(permittivity(dk, at, float(df), at, setting.f))
        m = chain(line_abcd(gamma, odd * scale), line_abcd(gamma, even * scale), setting.legs)
    else:
        share = float(get(values, "skin-share", SKIN_SHARE[element["kind"]]))
        points = loss_points(values.get("loss"), setting.nyquist, length)
        gamma = declared_wave(points, share, per_meter * length, getattr(get(values, "dk"), "at", None), setting.f)
        one = np.ones_like(setting.f)
        m = chain(line_abcd(gamma, odd * one), line_abcd(gamma, even * one), setting.legs)
    return with_skew(m, values, setting, per_meter)


def connector(element, setting):
    values = element["values"]
    odd, even = leg_ohms(values, float(get(values, "impedance")), setting)
    share = float(get(values, "skin-share", SKIN_SHARE["connector"]))
    gamma = declared_wave(loss_points(values.get("loss"), setting.nyquist), share, float(get(values, "delay")), None, setting.f)
    one = np.ones_like(setting.f)
    end = both(shunt(1j * setting.w * float(get(values, "capacitance", 0.0)) / 2), setting)
    m = times(end, chain(line_abcd(gamma, odd * one), line_abcd(gamma, even * one), setting.legs), end)
    return with_skew(m, values, setting)


# Traces

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


# Vias, stubs, capacitors

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


# Touchstone

def touchstone(element, setting):
    path = os.path.join(os.path.dirname(element["home"]), element["values"]["touchstone"])
    ports = int(re.search(r"\.s(\d+)p$", path).group(1))
    known, s, ohms = read_touchstone(path, ports)
    order = [int(p) - 1 for end in ("enter", "leave") for p in element["values"]["ports"][end]]
    s = continued(known, s[:, order][:, :, order], setting.f)
    n = setting.legs
    one = np.eye(n)
    s11, s12, s21, s22 = s[:, :n, :n], s[:, :n, n:], s[:, n:, :n], s[:, n:, n:]
    inverse = np.linalg.inv(s21)
    # a2 = (V - R I)/2 and b2 = (V + R I)/2 at the far side, I leaving it
    rows = []
    for sign in (1, -1):
        from_b = (one + sign * s11) @ inverse  # V1 or R I1 for b2
        from_a = sign * s12 - from_b @ s22  # for a2
        rows.append(np.concatenate([(from_b + from_a) / 2, (from_b - from_a) / 2 * ohms], -1) / (1 if sign > 0 else ohms))
    return np.concatenate(rows, -2)


def read_touchstone(path, ports):
    unit, form, ohms, numbers = 1e9, "MA", 50.0, []
    with open(path, encoding="ascii", errors="replace") as file:
        for text in file:
            text = text.split("!")[0].strip()
            if text.startswith("#"):
                words = text[1:].upper().split()
                unit = {"HZ": 1.0, "KHZ": 1e3, "MHZ": 1e6, "GHZ": 1e9}[next((w for w in words if w.endswith("HZ")), "GHZ")]
                form = next((w for w in words if w in ("RI", "MA", "DB")), "MA")
                ohms = float(words[words.index("R") + 1]) if "R" in words else 50.0
            elif text:
                numbers += map(float, text.split())
    table = np.array(numbers).reshape(-1, 1 + 2 * ports * ports)
    x, y = table[:, 1::2], table[:, 2::2]
    if form == "RI":
        s = x + 1j * y
    else:
        s = (x if form == "MA" else 10 ** (x / 20)) * np.exp(1j * np.radians(y))
    s = s.reshape(-1, ports, ports)
    return table[:, 0] * unit, np.swapaxes(s, 1, 2) if ports == 2 else s, ohms


def continued(known, s, f):
    """Between the points a spline through both sides of 0 Hz; above the last a half cosine to 1.5 times it."""
    last = known[-1]
    through = np.abs(s).mean(0) > 0.1
    turning = np.angle((s[1:] * s[:-1].conj() * through).sum((0, 1, 2)) if False else (s[1:] * s[:-1].conj()))
    weight = np.abs(s[1:] * s[:-1])
    delay = -(turning * weight).sum(0) / (2 * np.pi * (np.diff(known)[:, None, None] * weight).sum(0) + 1e-300)
    still = s * np.exp(2j * np.pi * known[:, None, None] * delay)
    start = 1 if known[0] == 0 else 0
    if start:
        still[0] = still[0].real
    x = np.concatenate([-known[:start - 1 if start else None][::-1][: len(known) - start], known])
    x = np.concatenate([-known[start:][::-1], known])
    y = np.concatenate([still[start:][::-1].conj(), still]).reshape(len(x), -1)
    value = spline(x, y, np.minimum(f, last)).reshape(len(f), *s.shape[1:])
    ratio = f / last
    taper = np.where(ratio <= 1, 1.0, np.where(ratio < 1.5, 0.5 + 0.5 * np.cos(np.pi * (ratio - 1) / 0.5), 0.0))
    # what is nothing cannot be turned into a chain: 180 dB down instead
    return value * np.exp(-2j * np.pi * f[:, None, None] * delay) * np.maximum(taper, 1e-9)[:, None, None]


def spline(x, y, at):
    """Natural cubic spline through columns of y."""
    h = np.diff(x)
    n = len(x)
    system = np.zeros((n, n))
    right = np.zeros_like(y)
    system[0, 0] = system[-1, -1] = 1
    rows = np.arange(1, n - 1)
    system[rows, rows - 1], system[rows, rows], system[rows, rows + 1] = h[:-1], 2 * (h[:-1] + h[1:]), h[1:]
    slopes = np.diff(y, axis=0) / h[:, None]
    right[1:-1] = 6 * np.diff(slopes, axis=0)
    bend = np.linalg.solve(system, right)
    i = np.clip(np.searchsorted(x, at, side="right") - 1, 0, n - 2)
    b, w = (at - x[i])[:, None], h[i][:, None]
    return (
        y[i] + b * (slopes[i] - w * (2 * bend[i] + bend[i + 1]) / 6) + b**2 * bend[i] / 2 + b**3 * (bend[i + 1] - bend[i]) / 6 / w
    )


KINDS = {
    "package": declared_segment, "cable": declared_segment, "connector": connector, "via": via,
    "capacitor": capacitor, "stub": stub,
}


def chain_of(element, setting):
    """The element's chain matrix; None where another element's file holds it."""
    if element.get("included"):
        return None
    values = element["values"]
    if "touchstone" in values:
        m = touchstone(element, setting)
    elif element["kind"] == "trace":
        m = trace(element, setting) if "stackup" in element else declared_segment(element, setting)
    else:
        m = KINDS[element["kind"]](element, setting)
    return reversed_chain(m) if str(values.get("reversed", "false")) == "true" else m


def transfer(m, setting, source, load):
    """Differential voltage at the receiver for 2 V behind the source; an end is (ohms, common ohms, farads of a leg)."""
    def admittance(ohms, common, farads):
        y = 1j * setting.w[:, None, None] * farads * np.eye(setting.legs)
        if setting.legs == 1:
            return y + 1 / ohms
        differential, both_legs = np.array([[1, -1], [-1, 1]]) / ohms, np.ones((2, 2)) / (4 * common)
        return y + differential + both_legs

    n = setting.legs
    drive = np.array([1.0, -1.0]) if n == 2 else np.array([2.0])
    injected = admittance(source[0], source[1], 0.0) @ drive
    near, far = admittance(*source), admittance(*load)
    top = m[:, :n, :n] + m[:, :n, n:] @ far
    bottom = m[:, n:, :n] + m[:, n:, n:] @ far
    v = np.linalg.solve(near @ top + bottom, injected[:, :, None])[:, :, 0]
    return v[:, 0] - v[:, 1] if n == 2 else v[:, 0]
