"""Segments and connectors that declare impedance, delay and loss."""

import math

import numpy as np

from chains import both, chain, later_second_leg, line_abcd, shunt, times
from channel_file import get, quantity
from cross_section import C0
from materials import debye_log, permittivity

DB = 20 / math.log(10)
SKIN_SHARE = {"trace": 0.5, "package": 0.5, "cable": 0.8, "connector": 0.5}


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
