"""Laminate and copper over frequency."""

import math

import numpy as np

from cross_section import MU0


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
