"""Closed forms for traces: Cohn and Wheeler (stripline), Hammerstad-Jensen and Kirschning-Jansen (microstrip).

All lengths in metres, impedances in air and per leg, mode 'odd' or 'even'.
"""

import math

ETA = 376.730313668
C0 = 299792458.0
MU0 = ETA / C0
EPS0 = 1 / (ETA * C0)


def elliptic_k(k):
    """K of the modulus k, by its infinite product (descending Landen steps)."""
    if k >= 1:
        return math.inf
    product = 1.0
    while k > 1e-17:
        complement = math.sqrt((1 - k) * (1 + k))
        k = (1 - complement) / (1 + complement)
        product *= 1 + k
    return math.pi / 2 * product


def quarter(k, complement):
    return ETA / 4 * elliptic_k(k) / elliptic_k(complement)


def thin_strip(w):
    return quarter(1 / math.cosh(math.pi * w / 2), math.tanh(math.pi * w / 2))


def thin_pair(w, s):
    a, b = math.tanh(math.pi * w / 2), math.tanh(math.pi * (w + s) / 2)
    even, odd = a * b, a / b
    return {
        "even": quarter(math.sqrt(1 - even * even), even),
        "odd": quarter(math.sqrt(1 - odd * odd), odd),
    }


def thick_strip(w, x):
    """Wheeler 1978; w and x = t by the distance of the planes."""
    if x <= 0:
        return thin_strip(w)
    m = 2 / (1 + 2 / 3 * x / (1 - x))
    log = math.log((x / (2 - x)) ** 2 + (0.0796 * x / (w + 1.1 * x)) ** m)
    v = 1 / (w / (1 - x) + x / (math.pi * (1 - x)) * (1 - log / 2))
    return 30 * math.log(1 + 4 / math.pi * v * (8 / math.pi * v + math.sqrt((8 / math.pi * v) ** 2 + 6.27)))


def fringing(x):
    """Cohn 1955, one edge of a thick strip to one plane, by epsilon."""
    u = 1 / (1 - x)
    return (2 * u * math.log(u + 1) - ((u - 1) * math.log(u * u - 1) if u > 1 else 0)) / math.pi


def thick_pair(w, s, x):
    """Cohn 1955, equations 18 to 20, joined as the program documents it."""
    thin = thin_pair(w, s)
    if x <= 0:
        return thin
    alone, thick = 1 / thin_strip(w), 1 / thick_strip(w, x)
    ratio = fringing(x) / fringing(0)
    # odd: both of Cohn's forms, the larger capacitance, passing smoothly from one to the other
    wide = thick + ratio * (1 / thin["odd"] - alone)
    narrow = 1 / thin["odd"] + thick - alone - 2 / ETA * (fringing(x) - fringing(0)) + 2 / ETA * x / s
    odd = max(wide, narrow) * (1 + max(0, min(wide, narrow) / max(wide, narrow)) ** 64) ** (1 / 64)
    # even: the mean of Cohn's form and of the thin pair whose strips alone have the thick one's impedance
    equal = thin_strip_width(1 / thick)
    pair = thin_pair(equal, s * math.exp(-(equal - w) / s))
    even = (thick - ratio * (alone - 1 / thin["even"]) + 1 / pair["even"]) / 2
    return {"even": 1 / even, "odd": 1 / odd}


def thin_strip_width(ohms):
    """Width by the distance of the planes of the thin strip that has an impedance, by halving."""
    low, high = 1e-6, 10.0
    for _ in range(60):
        w = math.sqrt(low * high)
        low, high = (w, high) if thin_strip(w) > ohms else (low, w)
    return w


def hammerstad_z(u):
    f = 6 + (2 * math.pi - 6) * math.exp(-((30.666 / u) ** 0.7528))
    return ETA / 2 / math.pi * math.log(f / u + math.sqrt(1 + 4 / u**2))


def hammerstad_ee(u, er):
    a = 1 + math.log((u**4 + (u / 52) ** 2) / (u**4 + 0.432)) / 49 + math.log(1 + (u / 18.1) ** 3) / 18.7
    b = 0.564 * ((er - 0.9) / (er + 3)) ** 0.053
    return (er + 1) / 2 + (er - 1) / 2 * (1 + 10 / u) ** (-a * b)


def widening(u, t, er):
    if t <= 0:
        return 0.0
    air = t / math.pi * math.log(1 + 4 * math.e * math.tanh(math.sqrt(6.517 * u)) ** 2 / t)
    return air / 2 * (1 + 1 / math.cosh(math.sqrt(er - 1)))


def microstrip(u, er, t):
    """Impedance and effective dielectric constant of one strip."""
    air, filled = u + widening(u, t, 1), u + widening(u, t, er)
    z, ee = hammerstad_z(filled), hammerstad_ee(filled, er)
    return z / math.sqrt(ee), ee * (hammerstad_z(air) / z) ** 2


def kirschning(u, g, er, mode):
    """Kirschning and Jansen 1984, static, no thickness: impedance of a mode."""
    z, ee = microstrip(u, er, 0)
    q1 = 0.8695 * u**0.194
    q2 = 1 + 0.7519 * g + 0.189 * g**2.31
    q3 = 0.1975 + (16.6 + (8.4 / g) ** 6) ** -0.387 + math.log(g**10 / (1 + (g / 3.4) ** 10)) / 241
    q4 = 2 * q1 / q2 / (math.exp(-g) * u**q3 + (2 - math.exp(-g)) * u**-q3)
    if mode == "even":
        v = u * (20 + g * g) / (10 + g * g) + g * math.exp(-g)
        own, q = hammerstad_ee(v, er), q4
    else:
        ao = 0.7287 * (ee - (er + 1) / 2) * (1 - math.exp(-0.179 * u))
        bo = 0.747 * er / (0.15 + er)
        co = bo - (bo - 0.207) * math.exp(-0.414 * u)
        do = 0.593 + 0.694 * math.exp(-0.562 * u)
        own = ((er + 1) / 2 + ao - ee) * math.exp(-co * g**do) + ee
        q5 = 1.794 + 1.14 * math.log(1 + 0.638 / (g + 0.517 * g**2.43))
        q6 = 0.2305 + math.log(g**10 / (1 + (g / 5.8) ** 10)) / 281.3 + math.log(1 + 0.598 * g**1.154) / 5.1
        q7 = (10 + 190 * g * g) / (1 + 82.3 * g**3)
        q8 = math.exp(-6.5 - 0.95 * math.log(g) - (g / 0.15) ** 5)
        q9 = math.log(q7) * (q8 + 1 / 16.5)
        q = (q2 * q4 - q5 * math.exp(q6 * math.log(u) * u**-q9)) / q2
    return z * math.sqrt(ee / own) / (1 - z / ETA * math.sqrt(ee) * q)


def microstrip_pair(u, g, er, t, mode):
    """With thickness: Jansen 1978, odd mode after Cohn 1955. Impedance and effective dielectric constant."""
    def width(dk):
        single = widening(u, t, dk)
        if t <= 0:
            return u
        wall = 2 * t / (g * dk)
        if mode == "even":
            return u + single * (1 - 0.5 * math.exp(-0.69 * single / wall))
        return u + single / 2 + max(single / 2, wall)  # free edge; the facing walls' plates in place of the other

    z = kirschning(width(er), g, er, mode)
    return z, (kirschning(width(1), g, 1, mode) / z) ** 2


class Section:
    """A strip, or a pair with `gap`, over a plane at `low`, with a second plane at `high` (stripline) or a cover of that height."""

    def __init__(self, width, gap, thickness, low, low_dk, high, high_dk, plane_above):
        self.width, self.gap, self.thickness = width, gap, thickness
        self.low, self.low_dk, self.high, self.high_dk = low, low_dk, high, high_dk
        self.plane_above = plane_above

    def changed(self, strip=0.0, low=0.0, high=0.0):
        return Section(
            self.width - 2 * strip, None if self.gap is None else self.gap + 2 * strip, self.thickness - 2 * strip,
            self.low + strip + low, self.low_dk, self.high + strip + high if self.plane_above else self.high, self.high_dk,
            self.plane_above,
        )

    def centred(self, b, mode):
        if self.gap is None:
            return thick_strip(self.width / b, self.thickness / b)
        return thick_pair(self.width / b, self.gap / b, self.thickness / b)[mode]

    def in_dielectric(self, er, mode):
        h = self.low
        if self.gap is None:
            return microstrip(self.width / h, er, self.thickness / h)
        return microstrip_pair(self.width / h, self.gap / h, er, self.thickness / h, mode)

    def air(self, mode):
        if self.plane_above:
            # off the middle by e: as if centred between planes b cos(pi e / b) apart, exact for a thin wire
            b = self.low + self.high + self.thickness
            return self.centred(b * math.cos(math.pi * (self.high - self.low) / 2 / b), mode)
        return self.in_dielectric(1.0, mode)[0]

    def shares(self, mode):
        if self.plane_above:
            below, above = (1 / self.centred(2 * h + self.thickness, mode) for h in (self.low, self.high))
            return below / (below + above), above / (below + above)
        if self.low_dk <= 1 + 1e-9:
            return 1.0, 0.0
        lower = (self.in_dielectric(self.low_dk, mode)[1] - 1) / (self.low_dk - 1)
        return lower, (1 - lower) * (1 - math.exp(-2 * self.high / self.low)) if self.high > 0 else 0.0

    def impedance(self, mode):
        lower, upper = self.shares(mode)
        dk = 1 + lower * (self.low_dk - 1) + upper * (self.high_dk - 1)
        return self.air(mode) / math.sqrt(dk)

    def walls(self, mode):
        """Wheeler's rule: (1/mu0) dL/dn of strip, lower and upper plane; five-point differences."""
        smallest = min(x for x in (self.width, self.gap, self.low, self.thickness, self.high if self.plane_above else None) if x)

        def slope(**which):
            n = 2e-3 * smallest
            f = lambda k: self.changed(**{key: k * n for key in which}).air(mode) / C0
            return (8 * (f(1) - f(-1)) - (f(2) - f(-2))) / 12 / n / MU0

        strip = slope(strip=1) if self.thickness > 0 else 0.0
        return strip, slope(low=1), slope(high=1) if self.plane_above else 0.0


def width_for(make, pair, ohms, height):
    """Width that gives an impedance, a pair with a gap of 1.5 widths; the wider root, by halving."""
    wanted = ohms / 2 if pair else ohms
    f = lambda w: make(w, 1.5 * w if pair else None).impedance("odd") - wanted
    wide = 8 * height  # as low as 20 ohm
    narrow = wide
    while f(narrow) < 0:
        wide, narrow = narrow, narrow / 1.05
        if narrow < height / 50:
            return None
    for _ in range(80):
        middle = math.sqrt(wide * narrow)
        if f(middle) < 0:
            wide = middle
        else:
            narrow = middle
    return narrow
