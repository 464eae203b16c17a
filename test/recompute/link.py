"""From a transfer function to cursors and eye, all of it from the spectrum: no waveform is sampled but to find its peak.

Cursors one UI apart are the inverse transform of the spectrum folded at the symbol rate: exact at any instant.
Tails of the eye come from the moment generating function on a line beside the imaginary axis, which keeps their relative
precision. The program that is checked adds densities bin by bin.
"""

import math

import numpy as np

from channel_file import get, quantity


def butterworth(f, bandwidth):
    """4th order, from its poles."""
    poles = bandwidth * np.exp(1j * np.pi * (np.arange(4) * 2 + 5) / 8)
    return np.prod([-p / (1j * f - p) for p in poles], axis=0)


def ctle(f, gain_db, zero, poles):
    h = 10 ** (gain_db / 20) + 1j * f / zero
    for pole in poles:
        h = h / (1 + 1j * f / pole)
    return h


class Ends:
    """Transmitter and receiver with the format's defaults."""

    def __init__(self, content, symbol_rate, reference):
        tx, rx = content.get("transmitter") or {}, content.get("receiver") or {}
        ui = 1 / symbol_rate
        self.swing = float(get(tx, "swing", 1.0))
        self.sigma_edge = float(get(tx, "rise-time", 0.25 * ui)) / 1.6832424671458286
        ffe = tx.get("ffe") or {}
        pre = [float(c) for c in ffe.get("pre", [])]
        self.taps = {0: float(ffe.get("main", 1))}
        self.taps.update({-i - 1: c for i, c in enumerate(pre)})
        self.taps.update({i + 1: float(c) for i, c in enumerate(ffe.get("post", []))})
        self.random_ui = float(get(tx, "random-jitter", 0.0)) / ui
        self.dirac_ui = float(get(tx, "deterministic-jitter", 0.0)) / ui / 2
        self.noise = float(get(rx, "noise", 0.0))
        self.bandwidth = float(get(rx, "bandwidth", 0.75 * symbol_rate))
        written = rx.get("ctle")
        self.ctles = [None]
        if written == "auto":
            self.ctles = [(-float(g), symbol_rate / 4, [symbol_rate / 4, symbol_rate]) for g in range(13)]
        elif written:
            self.ctles = [(float(get(written, "dc-gain")), float(get(written, "zero")), [float(quantity(p)) for p in written["poles"]])]
        dfe = rx.get("dfe") or {}
        self.dfe_taps, self.dfe_limit = int(dfe.get("taps", 0)), float(dfe.get("limit", "inf"))
        self.source, self.load = (
            (
                float(get(end, "impedance", reference)),
                float(get(end, "common-impedance", float(get(end, "impedance", reference)) / 4)),
                float(get(end, "capacitance", 0.0)),
            )
            for end in (tx, rx)
        )


class Pulse:
    """A symbol's response as a spectrum on multiples of symbol rate / uis."""

    def __init__(self, spectrum, uis):
        self.uis = uis
        lines = len(spectrum)
        self.index = np.arange(lines)
        self.spectrum = spectrum

    def cursors(self, instant):
        """Values at instant + m UI, m = 0 … uis - 1; the instant in UI."""
        turned = self.spectrum * np.exp(2j * np.pi * self.index * instant / self.uis)
        turned[0] /= 2  # 0 Hz has no mirror
        folded = np.resize(turned, (-(-len(turned) // self.uis), self.uis))
        folded.reshape(-1)[len(turned) :] = 0
        return 2 * np.fft.ifft(folded.sum(0)).real

    def sampled(self, per_ui):
        return np.fft.irfft(self.spectrum, self.uis * per_ui) * per_ui

    def scaled(self, factor):
        return Pulse(self.spectrum * factor, self.uis)


def symbol(f, symbol_rate, ends):
    rectangle = np.sinc(f / symbol_rate) * np.exp(-1j * np.pi * f / symbol_rate)
    edge = np.exp(-((2 * np.pi * f * ends.sigma_edge) ** 2) / 2)
    return rectangle * edge * sum(c * np.exp(-2j * np.pi * f * k / symbol_rate) for k, c in ends.taps.items())


def sampling_instant(pulse, first_tap_limit):
    """h(t - 1) = h(t + 1) - b h(t), first before the peak, else after it, in UI; the limit counts up to a half."""
    per_ui = 32
    wave = pulse.sampled(per_ui)
    limit = min(first_tap_limit, 0.5)
    n = len(wave)
    peak = int(np.argmax(wave))

    def unbalance(before, main, after):
        return before - (after - np.clip(after, -limit * abs(main), limit * abs(main)))

    coarse = unbalance(np.roll(wave, per_ui), wave, np.roll(wave, -per_ui))

    def fine(t):
        c = pulse.cursors(t)
        return unbalance(c[-1], c[0], c[1])

    for step in (-1, 1):
        for k in range(1, per_ui + 1):
            i = peak + step * k
            if wave[i % n] < wave[peak] / 2:
                break
            if coarse[i % n] * coarse[(i - step) % n] <= 0:
                a, b = (i - step) / per_ui, i / per_ui
                sign = math.copysign(1, fine(a))
                for _ in range(40):
                    middle = (a + b) / 2
                    a, b = (middle, b) if math.copysign(1, fine(middle)) == sign else (a, middle)
                return (a + b) / 2
    return peak / per_ui


def equalised(cursors, ends):
    """Cursors after the DFE, its taps volts."""
    taps = np.clip(cursors[1 : 1 + ends.dfe_taps], -ends.dfe_limit * cursors[0], ends.dfe_limit * cursors[0])
    left = cursors.copy()
    left[1 : 1 + len(taps)] -= taps
    return left, taps


def noise_at_slicer(ends, setting):
    if setting is None:
        return ends.noise
    x = np.linspace(math.log(1e-5 * ends.bandwidth), math.log(30 * ends.bandwidth), 4001)
    f = np.exp(x)
    power = f * np.abs(butterworth(f, ends.bandwidth)) ** 2  # df = f dx
    return ends.noise * math.sqrt((power * np.abs(ctle(f, *setting)) ** 2).sum() / power.sum())


def figure_of_merit(pulse, instant, noise, ends, levels):
    cursors = pulse.cursors(instant)
    left, _ = equalised(cursors, ends)
    slopes = (pulse.cursors(instant + 1 / 32) - pulse.cursors(instant - 1 / 32)) * 16
    mean_square = (levels**2 - 1) / (3 * (levels - 1) ** 2) / 4
    jitter = ends.random_ui**2 + ends.dirac_ui**2
    disturbance = mean_square * ((left[1:] ** 2).sum() + jitter * (slopes**2).sum()) + noise**2
    return (cursors[0] / 2 / (levels - 1)) ** 2 / disturbance


def cumulant(amplitudes, sigma, s):
    """ln of the moment generating function and its slope at a real s."""
    value = (amplitudes * s + np.log1p(np.expm1(-2 * amplitudes * s) / 2)).sum() + (sigma * s) ** 2 / 2
    return value, (amplitudes * np.tanh(s * amplitudes)).sum() + s * sigma**2


def rough_quantile(amplitudes, sigma, probability):
    """Chernoff's bound turned over: near the x that is exceeded with this probability, a little outside."""
    low, high = 0.0, 50 / sigma
    for _ in range(60):
        s = (low + high) / 2
        value, slope = cumulant(amplitudes, sigma, s)
        low, high = (s, high) if value - s * slope > math.log(probability) else (low, s)
    return slope


def tail_function(amplitudes, sigma, about):
    """P(sum of ± amplitudes + noise > x) for x near `about`, above 0: Bromwich's integral through the saddle point."""
    low, high = 0.0, about / sigma**2
    for _ in range(60):
        s = (low + high) / 2
        low, high = (s, high) if cumulant(amplitudes, sigma, s)[1] < about else (low, s)
    spread = math.sqrt((amplitudes**2 / np.cosh(np.minimum(s * amplitudes, 300)) ** 2).sum() + sigma**2)
    # the sum over a grid repeats the tilted tail each period: 24 spreads, and far enough for exp(-s period) to be nothing
    step = 2 * np.pi / max(24 * spread, 60 / s)
    w = np.arange(0, 9.5 / sigma, step)
    z = s + 1j * w
    log = (sigma * z) ** 2 / 2 - z * about
    for a in amplitudes:
        log = log + a * z + np.log1p(np.expm1(-2 * a * z) / 2)  # ln cosh(a z)
    weight = np.where(w == 0, 0.5, 1.0) * step / np.pi * np.exp(log) / z

    def probability(x):
        if x < about - 8 * spread:
            return 1.0  # far inside: not what is looked for
        return float((weight * np.exp(-z * (x - about))).real.sum())

    return probability


class Eye:
    """Errors at the sampling instant, jitter averaged by Gauss and Hermite's rule, pulses taken at each of its instants."""

    def __init__(self, pulse, instant, taps, noise, droop, ends, levels):
        self.levels, self.droop = levels, droop
        x, weight = np.polynomial.hermite_e.hermegauss(32) if ends.random_ui > 0 else (np.zeros(1), np.ones(1))
        diracs = (-ends.dirac_ui, ends.dirac_ui) if ends.dirac_ui > 0 else (0.0,)
        self.nodes = []
        for dirac in diracs:
            for node, share in zip(x, weight / weight.sum()):
                if share < 1e-22:
                    continue
                cursors = pulse.cursors(instant + dirac + node * ends.random_ui)
                cursors[1 : 1 + len(taps)] -= taps
                self.nodes.append((share / len(diracs), cursors))
        self.noise = noise

    def disturbance(self, cursors):
        """Amplitudes of ± terms, small ones left to the noise."""
        parts = (0.5,) if self.levels == 2 else (1 / 3, 1 / 6)
        others = np.abs(cursors[1:])
        big = others > 2e-4 * abs(cursors[0])
        sigma = math.sqrt(self.noise**2 + sum(((p * others[~big]) ** 2).sum() for p in parts))
        return np.concatenate([p * others[big] for p in parts]), sigma

    def prepare(self, level, threshold):
        """Tail functions for a level near a threshold."""
        tails = []
        for share, cursors in self.nodes:
            amplitudes, sigma = self.disturbance(cursors)
            margin = abs(level * cursors[0] - threshold) - self.droop
            spread = math.sqrt((amplitudes**2).sum() + sigma**2)
            tails.append((share, cursors[0], tail_function(amplitudes, sigma, max(margin, spread))))
        return tails

    def errors(self, tails, level, threshold):
        direction = 1 if level * self.nodes[0][1][0] > threshold else -1
        return sum(
            share * min(1.0, max(0.0, tail(direction * (level * main - threshold) - self.droop))) for share, main, tail in tails
        )

    def edge(self, level, inside, outside, wanted):
        """Threshold at which a level's errors reach what is wanted, between the eye's middle and the level."""
        middle = min(self.nodes, key=lambda node: -node[0])[1]
        threshold = level * self.main - math.copysign(1, outside - inside) * (
            rough_quantile(*self.disturbance(middle), wanted) + self.droop
        )
        if (threshold - inside) * (outside - inside) <= 0:
            threshold = inside
        for _ in range(4):
            tails = self.prepare(level, threshold)
            a, b = inside, outside
            for _ in range(40):
                middle = (a + b) / 2
                a, b = (middle, b) if self.errors(tails, level, middle) <= wanted else (a, middle)
            moved, threshold = abs(threshold - a), a
            if moved < self.noise:
                break
        return threshold

    def height(self, target):
        """Smallest of the eyes, peak to peak, were all alike; the outer eyes mirror each other."""
        main = self.main
        eyes = [(-0.5, 0.5)] if self.levels == 2 else [(-1 / 6, 1 / 6), (1 / 6, 0.5)]
        wanted = target / (0.5 if self.levels == 2 else 3 / 8)
        heights = []
        for low, high in eyes:
            middle = (low + high) / 2 * main
            top = self.edge(high, middle, high * main, wanted)
            bottom = self.edge(low, middle, low * main, wanted)
            heights.append(max(0.0, top - bottom))
        return min(heights)


def link(spectrum, f, uis, content, ends, symbol_rate, levels, droop_share, target):
    """Best equaliser setting, cursors from 16 before the main one on, eye height."""
    base = ends.swing * spectrum * symbol(f, symbol_rate, ends) * butterworth(f, ends.bandwidth)
    limit = ends.dfe_limit if ends.dfe_taps else 0.0
    best = None
    for setting in ends.ctles:
        pulse = Pulse(base if setting is None else base * ctle(f, *setting), uis)
        wave = pulse.sampled(8)
        if -wave.min() > wave.max():
            pulse = pulse.scaled(-1)
        instant = sampling_instant(pulse, limit)
        noise = noise_at_slicer(ends, setting)
        merit = figure_of_merit(pulse, instant, noise, ends, levels)
        if best is None or merit > best[0]:
            best = (merit, setting, pulse, instant, noise)
    _, setting, pulse, instant, noise = best
    cursors = pulse.cursors(instant)
    _, taps = equalised(cursors, ends)
    droop = abs(pulse.spectrum[0].real) * droop_share / 2
    eye = Eye(pulse, instant, taps, noise, droop, ends, levels)
    eye.main = cursors[0]
    return {
        "ctleDcGainDb": None if setting is None else setting[0],
        "mainCursorVolts": cursors[0],
        "cursors": np.concatenate([cursors[-16:], cursors[:200]]).tolist(),
        "precursors": 16,
        "instantUi": instant,
        "noiseVolts": noise,
        "droopVolts": 2 * droop,
        "eyeHeightVolts": eye.height(target),
    }
