"""Touchstone data as chain matrices, continued to all frequencies."""

import os
import re

import numpy as np


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
    steps = s[1:] * s[:-1].conj()
    width = (np.diff(known)[:, None, None] * np.abs(steps)).sum(0)
    delay = -(np.angle(steps) * np.abs(steps)).sum(0) / (2 * np.pi * np.maximum(width, 1e-300))
    still = s * np.exp(2j * np.pi * known[:, None, None] * delay)
    start = 1 if known[0] == 0 else 0
    if start:
        still[0] = still[0].real
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
