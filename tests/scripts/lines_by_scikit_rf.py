"""Makes tests/data/line/scikit_rf.json: random lines and networks as scikit-rf, a general RF network library, sees them.

    python3 -m venv venv && venv/bin/pip install scikit-rf==2.2.0
    venv/bin/python tests/scripts/lines_by_scikit_rf.py > tests/data/line/scikit_rf.json

Lines are made from R, L, G and C per metre (scikit-rf's DistributedCircuit); everything is carried as S-parameters on
50 ohm, cascaded by the library, and the loss is the library's S-parameters in the definition of the operating power
gain. Nothing here shares a formula with the program, which carries voltage and current through chain matrices.
"""

import json
import math
import random

import numpy as np
import skrf
from skrf.media import DefinedGammaZ0, DistributedCircuit

PORT_OHM = 50.0
LIGHT = 299_792_458.0


def frequency_of(hz):
    return skrf.Frequency.from_f([hz], unit="hz")


def medium(hz, line=None):
    if line is None:
        return DefinedGammaZ0(frequency_of(hz), z0_port=PORT_OHM, z0=PORT_OHM, gamma=1j)
    return DistributedCircuit(frequency_of(hz), z0_port=PORT_OHM, R=line["r"], L=line["l"], G=line["g"], C=line["c"])


def random_line(rng, hz):
    """R, L, G and C per metre of a line with some loss, from thin coax to open wire."""
    z0 = math.exp(rng.uniform(math.log(25), math.log(700)))
    velocity = rng.uniform(0.6, 1.0) * LIGHT
    beta = 2 * math.pi * hz / velocity
    # shares of the reactance and the susceptance: 1e-4 to 0.1 and 1e-6 to 1e-2
    r = 10 ** rng.uniform(-4, -1) * beta * z0
    g = 10 ** rng.uniform(-6, -2) * beta / z0
    return {"r": r, "l": z0 / velocity, "g": g, "c": 1 / (z0 * velocity)}


def random_load(rng):
    r = 10 ** rng.uniform(-0.5, 4)
    return complex(r, rng.choice([-1, 1]) * 10 ** rng.uniform(0, 3.7))


def random_element(rng, hz):
    omega = 2 * math.pi * hz
    kind = rng.choice(
        ["line", "open_stub", "shorted_stub", "series_coil", "shunt_coil", "series_capacitor", "shunt_capacitor", "turns"]
    )
    if kind in ("line", "open_stub", "shorted_stub"):
        # stubs stay clear of the lengths at which they are exact shorts or opens
        return {"kind": kind, "length_m": rng.uniform(0.3, 40), **random_line(rng, hz)}
    if kind == "turns":
        return {"kind": kind, "turns": 10 ** rng.uniform(-0.7, 0.7)}
    # a coil with its resistance in series, a capacitor with its conductance across
    size = 10 ** rng.uniform(0.7, 3.3)
    if kind.endswith("coil"):
        return {"kind": kind, "henry": size / omega, "ohm": size / rng.uniform(50, 500)}
    return {"kind": kind, "farad": 1 / (size * omega), "siemens": 1 / size / rng.uniform(200, 3000)}


def network_of(element, hz):
    """The element as a two-port of scikit-rf, port 0 toward the source."""
    plain = medium(hz)
    kind = element["kind"]
    if kind == "line":
        return medium(hz, element).line(element["length_m"], "m")
    if kind in ("open_stub", "shorted_stub"):
        line = medium(hz, element)
        end = line.open() if kind == "open_stub" else line.short()
        return plain.shunt(line.line(element["length_m"], "m") ** end)
    if kind == "turns":
        n = element["turns"]
        s = skrf.network.a2s(np.array([[[1 / n, 0], [0, n]]], dtype=complex), PORT_OHM)
        return skrf.Network(frequency=plain.frequency, s=s, z0=PORT_OHM)
    if kind == "series_coil":
        return plain.resistor(element["ohm"]) ** plain.inductor(element["henry"])
    if kind == "shunt_coil":
        one_port = plain.resistor(element["ohm"]) ** plain.inductor(element["henry"]) ** plain.short()
        return plain.shunt(one_port)
    if kind == "shunt_capacitor":
        leak = plain.shunt(plain.resistor(1 / element["siemens"]) ** plain.short())
        return plain.shunt_capacitor(element["farad"]) ** leak
    # capacitor and its conductance side by side, in series: as an admittance matrix
    y = element["siemens"] + 2j * math.pi * hz * element["farad"]
    s = skrf.network.y2s(np.array([[[y, -y], [-y, y]]]), PORT_OHM)
    return skrf.Network(frequency=plain.frequency, s=s, z0=PORT_OHM)


def seen(two_port, load):
    """Input impedance and loss of a two-port that ends in a load."""
    s = two_port.s[0]
    gamma_load = (load - PORT_OHM) / (load + PORT_OHM)
    end = skrf.Network(frequency=two_port.frequency, s=np.array([[[gamma_load]]]), z0=PORT_OHM)
    gamma_in = (two_port ** end).s[0, 0, 0]
    z_in = PORT_OHM * (1 + gamma_in) / (1 - gamma_in)
    # operating power gain |S21|^2 (1 - |GL|^2) / ((1 - |Gin|^2) |1 - S22 GL|^2)
    gain = (
        abs(s[1, 0]) ** 2
        * (1 - abs(gamma_load) ** 2)
        / ((1 - abs(gamma_in) ** 2) * abs(1 - s[1, 1] * gamma_load) ** 2)
    )
    return z_in, gamma_in, -10 * math.log10(gain)


def pair(z):
    return [float(z.real), float(z.imag)]


def line_case(rng):
    hz = 10 ** rng.uniform(math.log10(1.8e6), math.log10(54e6))
    line = random_line(rng, hz)
    length_m = rng.uniform(0.5, 100)
    load = random_load(rng)
    media = medium(hz, line)
    z_in, gamma_in, loss_db = seen(media.line(length_m, "m"), load)
    return {
        "frequency_hz": hz, **line, "length_m": length_m, "load_ohm": pair(load),
        "z0_ohm": pair(media.z0[0]), "gamma_per_m": pair(media.gamma[0]),
        "gamma_in": pair(gamma_in), "z_in_ohm": pair(z_in), "loss_db": loss_db,
    }


def network_case(rng):
    hz = 10 ** rng.uniform(math.log10(1.8e6), math.log10(54e6))
    load = random_load(rng)
    # from the load to the source
    elements = [random_element(rng, hz) for _ in range(rng.randint(2, 5))]
    whole = network_of(elements[-1], hz)
    for element in reversed(elements[:-1]):
        whole = whole ** network_of(element, hz)
    z_in, gamma_in, loss_db = seen(whole, load)
    return {
        "frequency_hz": hz, "load_ohm": pair(load), "elements": elements,
        "gamma_in": pair(gamma_in), "z_in_ohm": pair(z_in), "loss_db": loss_db,
    }


def main():
    rng = random.Random(20261201)
    lines = [line_case(rng) for _ in range(150)]
    networks = []
    while len(networks) < 150:
        case = network_case(rng)
        # What swallows nearly everything tells nothing: S-parameters then hold neither impedance nor loss to 1e-6.
        if case["loss_db"] < 30 and abs(complex(*case["gamma_in"])) < 0.99999:
            networks.append(case)
    source = f"scikit-rf {skrf.__version__} (tests/scripts/lines_by_scikit_rf.py)"
    print('{\n"source": ' + json.dumps(source) + ",")
    for name, cases in (("lines", lines), ("networks", networks)):
        rows = ",\n".join(json.dumps(case) for case in cases)
        print(f'"{name}": [\n{rows}\n]' + ("," if name == "lines" else "\n}"))


main()
