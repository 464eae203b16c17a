"""Recomputes channels from their YAML and Touchstone files alone, by other means than the program: python3 recompute.py FILES.

Prints JSON: for each file insertion loss at 32 steps up to Nyquist, cursors and eye height.
Needs Debian's python3-numpy and python3-yaml.
"""

import json
import math
import sys

import numpy as np

from chains import Setting
from channel_file import channel, get
from link import Ends, link
from networks import chain_of, transfer

UIS = 4096
LINES_PER_UI = 4  # up to 4 times the symbol rate


def recompute(path):
    content, elements = channel(path)
    pam4 = content.get("modulation", "NRZ") == "PAM4"
    symbol_rate = float(get(content, "line-rate")) / (2 if pam4 else 1)
    pair = content.get("signalling", "differential") != "single-ended"
    reference = float(get(content, "reference-impedance", 100.0 if pair else 50.0))
    celsius = float(get(content.get("conditions") or {}, "temperature", 20.0))
    target = float(content.get("target-ber", 1e-12))
    f = np.arange(UIS * LINES_PER_UI + 1) * symbol_rate / UIS
    f[0] = 1.0  # as good as DC, and nothing divides by 0
    setting = Setting(f, reference, pair, symbol_rate / 2, celsius)
    whole = None
    for element in elements:
        m = chain_of(element, setting)
        if m is not None:
            whole = m if whole is None else whole @ m
    matched = (reference, reference / 4, 0.0)
    steps = np.arange(1, 33) * UIS // 64
    loss = -20 * np.log10(np.abs(transfer(whole, setting, matched, matched)[steps]))
    ends = Ends(content, symbol_rate, reference)
    spectrum = transfer(whole, setting, ends.source, ends.load)
    f[0] = 0.0
    result = link(
        spectrum, f, UIS, content, ends, symbol_rate, 4 if pam4 else 2, droop_share(content, elements, ends, pair, symbol_rate, target), target
    )
    return {"insertionLossDb": loss.tolist(), **result}


def droop_share(content, elements, ends, pair, symbol_rate, target):
    """1 - exp(-run / RC) of all capacitors in series, R of one leg."""
    elastance = sum(
        1 / float(get(e["values"], "value"))
        for e in elements
        if e["kind"] == "capacitor" and "value" in e["values"] and not e.get("included")
    )
    if elastance == 0:
        return 0.0
    coding = content.get("coding", "scrambled")
    if coding == "8b10b":
        run = 5
    elif isinstance(coding, dict):
        run = int(coding["longest-run"])
    else:
        run = math.ceil(-math.log2(target) - 1e-9)
    ohms = (ends.source[0] + ends.load[0]) / (2 if pair else 1)
    return 1 - math.exp(-run / symbol_rate * elastance / ohms)


if __name__ == "__main__":
    json.dump({path: recompute(path) for path in sys.argv[1:]}, sys.stdout)
