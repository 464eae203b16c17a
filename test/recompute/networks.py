"""Each element's chain matrix by its kind, and the transfer of the whole between its terminations."""

import numpy as np

from chains import reversed_chain
from declared_lines import connector, declared_segment
from lumped import capacitor, stub, via
from touchstone import touchstone
from traces import trace

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
