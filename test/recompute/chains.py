"""Chain matrices of physical legs over frequency.

A chain matrix relates [voltages, currents] of all legs at the transmitter side to those at the receiver side: 2 x 2 for
one conductor, 4 x 4 for a pair. The program that is checked works in mixed-mode scattering instead.
"""

import numpy as np


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
