"""Reads channels and parts files for the recomputation: YAML 1.2, quantities, names, layers.

Nothing here is shared with the program that is checked; both follow the reference of the format.
"""

import os
import re

import yaml


class Yaml12(yaml.SafeLoader):
    """Every plain scalar stays text, as in YAML 1.2's failsafe schema; only `<<` is resolved."""


Yaml12.yaml_implicit_resolvers = {
    first: [(tag, pattern) for tag, pattern in resolvers if tag == "tag:yaml.org,2002:merge"]
    for first, resolvers in yaml.SafeLoader.yaml_implicit_resolvers.items()
}

UNITS = {
    "": 1, "nm": 1e-9, "um": 1e-6, "mm": 1e-3, "cm": 1e-2, "m": 1, "mil": 25.4e-6, "in": 25.4e-3,
    "fs": 1e-15, "ps": 1e-12, "ns": 1e-9, "us": 1e-6,
    "Hz": 1, "kHz": 1e3, "MHz": 1e6, "GHz": 1e9, "b/s": 1, "Mb/s": 1e6, "Gb/s": 1e9,
    "mohm": 1e-3, "ohm": 1, "kohm": 1e3,
    "fF": 1e-15, "pF": 1e-12, "nF": 1e-9, "uF": 1e-6, "pH": 1e-12, "nH": 1e-9, "uH": 1e-6,
    "uV": 1e-6, "mV": 1e-3, "V": 1, "dB": 1,
    "dB/mm": 1e3, "dB/cm": 1e2, "dB/m": 1, "dB/in": 1 / 25.4e-3,
    "ps/mm": 1e-9, "ps/in": 1e-12 / 25.4e-3, "ns/m": 1e-9,
    "c": 299792458.0, "m/s": 1, "S/m": 1, "MS/m": 1e6, "degC": 1, "UI": 1, "%": 1e-2,
}

QUANTITY = re.compile(r"^\s*([+-]?[0-9.]+(?:[eE][+-]?[0-9]+)?)\s*([^\s@±+]*)")
AT = re.compile(r"@\s*(.+?)\s*$")


class Quantity(float):
    """Nominal value in SI; `at` is the frequency it holds at, `unit` as written."""

    at = None
    unit = ""


def quantity(text):
    text = str(text).replace("µ", "u").replace("μ", "u").replace("Ω", "ohm")
    match = QUANTITY.match(text)
    if not match or match.group(2) not in UNITS:
        raise ValueError(f"no quantity: {text!r}")
    value = Quantity(float(match.group(1)) * UNITS[match.group(2)])
    value.unit = match.group(2)
    at = AT.search(text)
    if at:
        value.at = at.group(1) if at.group(1) == "nyquist" else float(quantity(at.group(1)))
    return value


def get(mapping, key, default=None):
    return quantity(mapping[key]) if key in mapping else default


def read(path):
    with open(path, encoding="utf-8") as file:
        return yaml.load(file, Loader=Yaml12)


class Parts:
    """What a file and the files that it uses declare, found by name, its own first."""

    def __init__(self, path, content):
        self.path = path
        self.content = content
        folder = os.path.dirname(path)
        self.used = {}
        for prefix, file in (content.get("use") or {}).items():
            inner = os.path.normpath(os.path.join(folder, file))
            self.used[prefix] = Parts(inner, read(inner))

    def find(self, what, name):
        """The entry, and the parts file in which it stands."""
        own = self.content.get(what) or {}
        if name in own:
            return own[name], self
        if "." in name:
            prefix, inner = name.split(".", 1)
            return self.used[prefix].find(what, inner)
        for parts in self.used.values():
            if name in (parts.content.get(what) or {}):
                return parts.find(what, name)
        raise KeyError(f"{what}: {name}")


def dk_point(written):
    value = quantity(written)
    return float(value), value.at or 10e9


def material(parts, name):
    entry, _ = parts.find("materials", name)
    dk = entry["dk"]
    if isinstance(dk, dict):
        through = dk_point(dk.get("through", dk.get("in-plane")))
        in_plane = dk_point(dk.get("in-plane", dk.get("through")))
    else:
        through = in_plane = dk_point(dk)
    return {"through": through, "in-plane": in_plane, "df": dk_point(entry["df"])}


def foil(parts, name):
    if name is None:
        return {"conductivity": 58e6, "rms": 0.0, "huray": None}
    entry, _ = parts.find("foils", name)
    rough = entry.get("roughness") or {}
    huray = None
    if "huray" in rough:
        huray = (float(get(rough["huray"], "radius")), float(get(rough["huray"], "ratio")))
    if "rz" in rough:
        # 14 spheres on 36 r², r = Rz / (2√3) / (2 (1 + √2))
        huray = (float(get(rough, "rz")) / (2 * 3**0.5) / (2 * (1 + 2**0.5)), 14 * 4 * 3.141592653589793 / 36)
    return {"conductivity": float(get(entry, "conductivity", 58e6)), "rms": float(get(rough, "rms", 0.0)), "huray": huray}


def stackup(parts, name):
    """Layers from top to bottom; masks are left out: they are neglected."""
    rows, owner = parts.find("stackups", name)
    layers = []
    for row in rows:
        if "copper" in row:
            layers.append({
                "copper": row["copper"], "thickness": float(get(row, "thickness")),
                "plane": str(row.get("plane", "false")) == "true", "foil": foil(owner, row.get("foil")),
            })
        elif "dielectric" in row:
            layers.append({"thickness": float(get(row, "thickness")), "material": material(owner, row["material"])})
    return layers


def channel(path):
    """The channel with its elements: part merged in, via ends derived, stackups and files resolved."""
    content = read(path)
    parts = Parts(path, content)
    elements = []
    for entry in content["path"]:
        kind, name = next(iter(entry.items()))
        values = dict(entry)
        home = path
        if "part" in entry:
            part, owner = parts.find("parts", entry["part"])
            values = {**part, **entry}
            home = owner.path if "touchstone" not in entry else path
        element = {"kind": kind, "name": name, "values": values, "home": home}
        if "stackup" in values:
            element["stackup"] = stackup(parts, values["stackup"])
            element["stackup-name"] = values["stackup"]
        elements.append(element)
    for at, element in enumerate(elements):
        for name in element["values"].get("includes") or []:
            next(e for e in elements if e["name"] == name)["included"] = True
        if element["kind"] == "via":
            element["from"] = element["values"].get("from") or nearest_layer(elements, at, -1)
            element["to"] = element["values"].get("to") or nearest_layer(elements, at, 1)
    return content, elements


def nearest_layer(elements, at, step):
    """Layer of the nearest trace of the via's stackup, or what another via leaves or asks for."""
    i = at + step
    while 0 <= i < len(elements):
        other = elements[i]
        if other["kind"] == "trace":
            return other["values"]["layer"]
        if other["kind"] == "via":
            end = "to" if step < 0 else "from"
            return other.get(end) or other["values"].get(end) or nearest_layer(elements, i, step)
        if other["kind"] not in ("capacitor", "stub") and not other.get("included"):
            break
        i += step
    return None
