"""The work of a cold analysis in NumPy: 30 elements on 2,001 points, both modes; networks, cascade, pulse, automatic CTLE, eye.

Twice: as an engineer would write it, every element and every phase for itself with whole-array operations, and tuned by hand: alike
elements once, a cascade that forms one transfer only, all settings and phases of the eye at once. Reading YAML, names, solving
cross-sections, findings are left out, which favours NumPy. Prints the median of some runs in milliseconds as JSON on the last line.
Run on one core: OPENBLAS_NUM_THREADS=1.
"""

import json
import math
import time

import numpy as np

SYMBOL_RATE = 25.78125e9
POINTS = 2001
STEP = 2 * SYMBOL_RATE / (POINTS - 1)
UIS = round(SYMBOL_RATE / STEP)  # 1000
F = np.arange(POINTS) * STEP
F[0] = 1.0
W = 2 * np.pi * F
PER_UI = 32
PHASES = 41
MU0, EPS0, C0 = 1.25663706e-6, 8.8541878e-12, 299792458.0
LEG = 50.0
SIGMA = 1e-3
SWING, TAPS, EDGE = 0.8, (-0.06, 0.82, -0.12), 0.25 / SYMBOL_RATE / 1.6832
GAINS = 10 ** (-np.arange(13) / 20)
DFE_TAPS, DFE_LIMIT = 4, 0.4
RJ, DJ = 0.25e-12 * SYMBOL_RATE, 2e-12 * SYMBOL_RATE
TARGET = 1e-12

# 30 elements: packages at both ends, 14 traces on three layers of a board, 13 vias in between, one capacitor
TRACES = [((i % 3) * 1e-6, 8e-3 + (2 * i % 5) * 1e-3) for i in range(14)]
VIAS = [(0.4e-3 + 0.1e-3 * (i % 2), 0.2e-3) for i in range(13)]


def permittivity(dk, df, at):
    log = lambda f: np.log((1e12 + 1j * f) / (1e4 + 1j * f))
    slope = -dk * df / log(at).imag
    return dk - slope * log(at).real + slope * log(F)


def surface(sigma=58e6, rms=0.5e-6, depth=17e-6):
    k = np.sqrt(1j * W * MU0 * sigma)
    z = k / sigma / np.tanh(np.minimum(k.real * depth, 50) * (1 + 1j))
    s = 1.4j * (rms * k.real) ** 2
    root = np.sqrt(s)
    return z * (1 + 2 / np.pi * (np.log(1 + root) - np.log(1 + s) / 2 + np.arctan(root)))


def line_s(gamma_length, z):
    """S of a line in the leg's reference: s11 = s22, s21 = s12."""
    g = (z - LEG) / (z + LEG)
    p = np.exp(-gamma_length)
    d = 1 - g * g * p * p
    return g * (1 - p * p) / d, p * (1 - g * g) / d


def chain_s(a, b, c, d):
    n = a + b / LEG + c * LEG + d
    return (a + b / LEG - c * LEG - d) / n, 2 / n, (-a + b / LEG - c * LEG + d) / n


def star(x, y):
    """Cascade of (s11, s21, s22), reciprocal."""
    d = 1 / (1 - x[2] * y[0])
    return x[0] + x[1] * x[1] * y[0] * d, x[1] * y[1] * d, y[2] + y[1] * y[1] * x[2] * d


def trace_constants(offset, mode):
    """gamma and Zc: inductance, air capacitance and walls as a cross-section gives them."""
    ohms = (76 if mode == "odd" else 105) + offset * 1e6
    wall = 9e3
    z = 1j * W * ohms / C0 + wall * surface() + wall / 3 * surface(depth=1e-3)
    y = 1j * W * (1 + 0.9 * (permittivity(3.4, 0.004, 10e9) - 1)) / (ohms * C0)
    return np.sqrt(z * y), np.sqrt(z / y)


def via_s(barrel, stub):
    eps = permittivity(3.4, 0.004, 10e9)
    inductance, capacitance = MU0 / 2 / np.pi * 2.06, 2 * np.pi * EPS0 / 1.25
    z = np.sqrt(inductance / capacitance / eps)
    gamma = 1j * W * np.sqrt(inductance * capacitance * eps)
    pad = 1j * W * 20e-15
    branch = pad + np.tanh(gamma * stub) / z
    cosh, sinh = np.cosh(gamma * barrel), np.sinh(gamma * barrel)
    a, b, c, d = cosh, z * sinh, sinh / z, cosh
    a, c = a + b * branch, c + d * branch
    c, d = c + pad * a, d + pad * b
    return chain_s(a, b, c, d)


def package_s():
    log = np.log((1e14 + 1j * F) / (1e3 + 1j * F))
    gamma = 2e-7 * np.sqrt(F) * (1 + 1j) + 1j * W * (55e-12 + 1e-13 * log)
    s11, s21 = line_s(gamma, 48.0)
    return s11, s21, s11


def capacitor_s():
    one, pad, z = np.ones(POINTS, complex), 1j * W * 10e-15, 1j * W * 0.2e-9
    a, b, c, d = one, z, pad, one + pad * z
    return chain_s(a + b * pad, b, c + d * pad, d)


def elements(mode, constants, via):
    yield package_s()
    for i, (offset, length) in enumerate(TRACES):
        gamma, z = constants(offset, mode)
        s11, s21 = line_s(gamma * length, z)
        yield s11, s21, s11
        if i < len(VIAS):
            yield via(*VIAS[i])
    yield capacitor_s()
    yield package_s()


def receiver_spectrum(s):
    """Symbol, taps, matched ends, receiver filter; times 1/UIS."""
    x = F / SYMBOL_RATE
    shape = np.sinc(x) * np.exp(-1j * np.pi * x) * np.exp(-((W * EDGE) ** 2) / 2)
    taps = sum(c * np.exp(-2j * np.pi * x * (k - 1)) for k, c in enumerate(TAPS))
    u = F / (0.75 * SYMBOL_RATE)
    filtered = 1 / (1 - 3.414214 * u**2 + u**4 + 2.613126j * (u - u**3))
    return SWING * s[1] * shape * taps * filtered


def to_pulse(spectrum):
    return np.fft.irfft(spectrum, UIS * PER_UI) * PER_UI


def ctle_parts(spectrum):
    zero = 1 / (1 + 4j * F / SYMBOL_RATE) / (1 + 1j * F / SYMBOL_RATE)
    return to_pulse(spectrum * zero), to_pulse(spectrum * zero * 4j * F / SYMBOL_RATE)


def instant(pulse):
    peak = int(np.argmax(pulse))
    before = pulse[np.arange(peak - 48, peak + 48) - PER_UI]
    main = pulse[np.arange(peak - 48, peak + 48) % len(pulse)]
    after = pulse[np.arange(peak - 48, peak + 48) + PER_UI]
    unbalance = before - (after - np.clip(after, -DFE_LIMIT * main, DFE_LIMIT * main))
    crossings = np.nonzero(np.diff(np.sign(unbalance)))[0]
    return peak - 48 + int(crossings[np.argmin(np.abs(crossings - 48))]) if len(crossings) else peak


def merit(pulse, at):
    cursors = np.roll(pulse, -at)[::PER_UI]
    left = cursors.copy()
    left[1 : 1 + DFE_TAPS] -= np.clip(cursors[1 : 1 + DFE_TAPS], -DFE_LIMIT * cursors[0], DFE_LIMIT * cursors[0])
    slopes = (np.roll(pulse, -at - 1)[::PER_UI] - np.roll(pulse, 1 - at)[::PER_UI]) * PER_UI / 2
    noise = (left[1:] ** 2).sum() / 4 + (RJ**2 + DJ**2 / 4) * (slopes**2).sum() / 4 + SIGMA**2
    return cursors[0] ** 2 / 4 / noise


def gaussian_tail(x):
    return 0.5 * np.vectorize(math.erfc)(x / math.sqrt(2))


def cursors_of_phases(pulse, at):
    """One row a phase: cursors, DFE taken off, main one first."""
    place = (at + np.arange(PHASES) - PHASES // 2)[:, None] + PER_UI * np.arange(UIS)
    rows = pulse[place % len(pulse)]
    main = rows[PHASES // 2]
    rows[:, 1 : 1 + DFE_TAPS] -= np.clip(main[1 : 1 + DFE_TAPS], -DFE_LIMIT * main[0], DFE_LIMIT * main[0])
    return rows


def jitter_weights():
    place = np.arange(PHASES) - PHASES // 2
    z = place / PER_UI
    weight = sum(np.exp(-(((z - d) / max(RJ, 1 / PER_UI / 2)) ** 2) / 2) for d in (-DJ / 2, DJ / 2))
    return weight / weight.sum()


def measures(density_rows, mains, bin_volts):
    """Height at the sampling instant and bathtub from each phase's density with noise."""
    bins = density_rows.shape[1]
    tails = np.cumsum(density_rows[:, ::-1], 1)[:, ::-1]
    x = (np.arange(bins) - bins // 2) * bin_volts
    weight = jitter_weights()
    errors = sum(w * np.interp(mains[i] / 2 - x, x, tails[i]) for i, w in enumerate(weight))
    height = 2 * x[errors <= 2 * TARGET].max(initial=0.0)
    bathtub = np.convolve([np.interp(m / 2, x, t) for m, t in zip(mains, tails)], weight, "same")
    return height, bathtub


def eye_by_adding(pulse, at):
    """Each phase, each cursor: two shifted copies of the density; noise by convolution."""
    rows = cursors_of_phases(pulse, at)
    main = rows[PHASES // 2, 0]
    bins = 2048
    bin_volts = 2 * main / bins
    k = np.arange(-int(8 * SIGMA / bin_volts) - 1, int(8 * SIGMA / bin_volts) + 2)
    noise = gaussian_tail((k - 0.5) * bin_volts / SIGMA) - gaussian_tail((k + 0.5) * bin_volts / SIGMA)
    densities = []
    for row in rows:
        density = np.zeros(bins)
        density[bins // 2] = 1
        shifts = np.rint(np.abs(row[1:]) / 2 / bin_volts).astype(int)
        for n in np.sort(shifts[shifts > 0]):
            density = (np.roll(density, n) + np.roll(density, -n)) / 2
        densities.append(np.convolve(density, noise, "same"))
    return measures(np.array(densities), rows[:, 0], bin_volts)


def eye_by_characteristic_functions(pulse, at):
    """All phases at once: product of cosines, tails no deeper than 1e-14."""
    rows = cursors_of_phases(pulse, at)
    main = rows[PHASES // 2, 0]
    bins = 1024
    bin_volts = 2 * main / bins
    w = 2 * np.pi * np.arange(bins // 2 + 1) / (bins * bin_volts)
    order = np.sort(np.abs(rows[:, 1:]), 1)[:, ::-1] / 2
    big = int((order > main / 4000).sum(1).max())
    small = (order[:, big:] ** 2).sum(1)
    product = np.exp(-(w**2) * (SIGMA**2 + small[:, None]) / 2)
    needed = int((product.max(0) > 1e-17).sum())
    for column in order[:, :big].T:
        product[:, :needed] *= np.cos(column[:, None] * w[:needed])
    return measures(np.fft.fftshift(np.fft.irfft(product, bins, axis=1), 1), rows[:, 0], bin_volts)


def vectorised():
    totals = {}
    for mode in ("odd", "even"):
        total = None
        for s in elements(mode, trace_constants, via_s):
            total = s if total is None else star(total, s)
        totals[mode] = total
    flat, rising = ctle_parts(receiver_spectrum(totals["odd"]))
    pulses = [g * flat + rising for g in GAINS]
    instants = [instant(p) for p in pulses]
    best = max(range(len(GAINS)), key=lambda i: merit(pulses[i], instants[i]))
    return eye_by_adding(pulses[best], instants[best])


def tuned():
    held = {}

    def once(f):
        def call(*key):
            if (f, key) not in held:
                held[f, key] = f(*key)
            return held[f, key]

        return call

    eps, smooth, deep = permittivity(3.4, 0.004, 10e9), surface(), surface(depth=1e-3)

    def constants(offset, mode):
        ohms = (76 if mode == "odd" else 105) + offset * 1e6
        z = 1j * W * ohms / C0 + 9e3 * smooth + 3e3 * deep
        y = 1j * W * (1 + 0.9 * (eps - 1)) / (ohms * C0)
        return np.sqrt(z * y), np.sqrt(z / y)

    shared, via = once(constants), once(via_s)
    totals = {}
    for mode in ("odd", "even"):
        total = None
        for s in elements(mode, shared, via):
            total = s if total is None else star(total, s)
        totals[mode] = total
    flat, rising = ctle_parts(receiver_spectrum(totals["odd"]))
    peak = int(np.argmax(rising + flat))
    near = slice(max(0, peak - 8 * PER_UI), peak + 120 * PER_UI)  # settings are compared where the response is
    pulses = [g * flat[near] + rising[near] for g in GAINS]
    instants = [instant(p) for p in pulses]
    best = max(range(len(GAINS)), key=lambda i: merit(pulses[i][instants[i] % PER_UI :][: 120 * PER_UI], instants[i] - instants[i] % PER_UI))
    return eye_by_characteristic_functions(GAINS[best] * flat + rising, near.start + instants[best])


def milliseconds(work, runs):
    times = []
    for _ in range(runs):
        start = time.perf_counter()
        work()
        times.append((time.perf_counter() - start) * 1e3)
    return sorted(times[2:])[(runs - 2) // 2]


if __name__ == "__main__":
    for work in (vectorised, tuned):
        height, _ = work()
        print(f"{work.__name__}: eye {height * 1e3:.1f} mV")
    print(json.dumps({"vectorised": milliseconds(vectorised, 11), "tuned": milliseconds(tuned, 21)}))
