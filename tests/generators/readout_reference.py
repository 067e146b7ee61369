#!/usr/bin/env python3
"""Reference readout weights at oblique incidence, from differences with 120 digits.

Independent derivation: no formula is shared with the program. The stack is the chain of Fresnel
interfaces and free flights of optics_reference_model.py; the disturbed slice is uniaxial, with its
exact wavenumbers, and the weights are differences of exact reflections.

A layer is cut at the depth z below its top into three, a | slice of thickness e | rest - e, and the
slice is changed by x:
index weight h:    index n + x.
strain weight g:   thickness e (1 + x); inverse permittivities 1/n^2 + p11 x across the layer and
                   1/n^2 + p12 x in its plane; the face moves towards the light by e x.
in-plane weight:   dilatation x in the plane, x/2 in each direction: inverse permittivities
                   1/n^2 + p12 x across and 1/n^2 + (p11 + p12) x/2 in the plane.
With xi = (motion of the face) - (change of arg r)/(2 n0 k0 cos angle), a weight is the mixed
derivative of xi by e and x at e = x = 0: central differences with relative steps of 1e-20,
truncation 1e-40. Conventions, units and the meaning of the keys: see optics_reference.py.

Usage: readout_reference.py [--output FILE] | --sample N | --verify
"""
import argparse
import os
import random
import sys
from functools import partial

from mpmath import mp, mpc, mpf

sys.dont_write_bytecode = True  # the source folder stays clean when this runs as a test
from optics_reference_cases import alternating, described, radians
from optics_reference_model import Waves, weight
from reference_file import check_sample, write_cases

WORKING_DIGITS = 120
DATA = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "data",
                    "readout_reference.json")
KINDS = ("strain_weight", "in_plane_weight", "index_weight")


class UniaxialWaves(Waves):
    """Waves in layers (permittivity in the plane, permittivity across, thickness).

    s light feels the first alone; p light, u = H_y with u'/(permittivity in the plane) continuous,
    has q^2 = k0^2 (plane)(1 - beta^2/across).
    """

    def __init__(self, case, layers):
        super().__init__(case["wavelength_m"], case["incident_index"], [],
                         mpc(*case["substrate_index"]), case["angle_rad"], case["polarisation"])
        plane = [p for p, _, _ in layers]
        across = plane if self.electric else [a for _, a, _ in layers]
        q = [self.k0 * mp.sqrt(p - self.beta ** 2 * p / a) for p, a in zip(plane, across)]
        ratio = q if self.electric else [one / p for one, p in zip(q, plane)]
        self.thickness = [mpf(0)] + [mpf(d) for _, _, d in layers]
        self.q = [self.q[0]] + q + [self.q[1]]
        self.ratio = [self.ratio[0]] + ratio + [self.ratio[1]]
        self.rho = [(a - b) / (a + b) for a, b in zip(self.ratio, self.ratio[1:])]
        self.flight = [mp.exp(mpc(0, 1) * one * d) for one, d in zip(self.q, self.thickness)]


def changed_slice(kind, index, thickness, p11, p12, x):
    """The slice as a layer of UniaxialWaves."""
    if kind == "index_weight":
        return (index + x) ** 2, (index + x) ** 2, thickness
    inverse = 1 / index ** 2
    if kind == "strain_weight":
        return 1 / (inverse + p12 * x), 1 / (inverse + p11 * x), thickness * (1 + x)
    return 1 / (inverse + (p11 + p12) * x / 2), 1 / (inverse + p12 * x), thickness


def slice_weight(case, kind, layer, depth, p11, p12):
    """Mixed central difference of xi by slice thickness and by x."""
    p11, p12 = mpf(p11), mpf(p12)
    others = [(mpc(n, k) ** 2, mpc(n, k) ** 2, mpf(d)) for n, k, d in case["layers"]]
    square, _, thickness = others[layer]
    index = mpc(*case["layers"][layer][:2])
    start = UniaxialWaves(case, others).reflection()
    step, slice_step = mpf(10) ** -20, mpf(10) ** -20 * thickness
    turning = 2 * mpf(case["incident_index"]) * 2 * mp.pi / mpf(case["wavelength_m"])
    turning *= mp.cos(mpf(case["angle_rad"]))

    def xi(slice_thickness, x):
        changed = changed_slice(kind, index, slice_thickness, p11, p12, x)
        pieces = [(square, square, mpf(depth)), changed,
                  (square, square, thickness - mpf(depth) - slice_thickness)]
        waves = UniaxialWaves(case, others[:layer] + pieces + others[layer + 1:])
        turned = mp.log(waves.reflection() / start).imag
        return changed[2] - slice_thickness - turned / turning

    corners = [a * b * xi(a * slice_step, b * step) for a in (1, -1) for b in (1, -1)]
    return sum(corners) / (4 * slice_step * step)


def completed(case, places):
    block = []
    for layer, fraction, p11, p12 in places:
        depth = fraction * case["layers"][layer][2]
        place = {"layer": layer, "depth_in_layer_m": depth, "p11": p11, "p12": p12}
        for kind in KINDS:
            place[kind] = slice_weight(case, kind, layer, depth, p11, p12)
        block.append(place)
    return dict(case, weights=block)


def spread(layers, seed, chosen=None):
    """Places in the first layers or in the `chosen` ones, with photoelastic constants by chance."""
    dice = random.Random(seed)
    chosen = chosen or [0, min(1, len(layers) - 1), min(4, len(layers) - 1)]
    return [(layer, fraction, round(dice.uniform(-0.1, 0.4), 3), round(dice.uniform(-0.1, 0.4), 3))
            for layer, fraction in zip(chosen, (0.3125, 1.0, 0.5, 0.8125))]


def mirror_cases():
    for degrees in (30, 45, 70):
        for polarisation in "sp":
            for k in (0.0, 1e-4, 0.1):
                for factor in (1.0, 0.85):
                    layers = alternating(30, 2.07, 1.45, extinction=k, jitter_seed=8)
                    yield described(
                        f"30 layers, {degrees} degrees {polarisation}, k {k}, factor {factor}",
                        layers, degrees=degrees, polarisation=polarisation,
                        wavelength=factor * 1064e-9, places=spread(layers, degrees))
    layers = alternating(30, 2.07, 1.45, extinction=1e-6, jitter_seed=6)
    for polarisation in "sp":
        yield described(f"glass incident medium, 30 layers, 35 degrees {polarisation}", layers,
                        incident=1.45, degrees=35, polarisation=polarisation,
                        places=spread(layers, 1))
        yield described(f"30 layers, 1e-4 rad {polarisation}", layers, angle=1e-4,
                        polarisation=polarisation, places=spread(layers, 2))


def metal_cases():
    for polarisation in "sp":
        layers = alternating(10, 2.07, 1.45, jitter_seed=2)
        yield described(f"metal substrate, 10 layers, 50 degrees {polarisation}", layers,
                        substrate=(0.2, 6.7), degrees=50, polarisation=polarisation,
                        places=spread(layers, 3))
        layers = layers[:4] + [[0.2, 6.7, 15e-9]] + layers[4:]
        yield described(f"metal layer in 10 layers, 50 degrees {polarisation}", layers, degrees=50,
                        polarisation=polarisation, places=spread(layers, 4, [3, 4, 4, 5]))


def evanescent_cases():
    angle = radians(45)
    critical = float(mpf(1.45) * mp.sin(mpf(angle)))
    for polarisation in "sp":
        for gap in (0.05e-6, 0.3e-6, 2e-6):
            layers = alternating(8, 2.07, 1.45, extinction=1e-5, jitter_seed=9)
            layers.insert(2, [1.0, 0.0, gap])
            yield described(f"evanescent gap {gap * 1e6:g} um, 60 degrees {polarisation}", layers,
                            incident=1.45, degrees=60, polarisation=polarisation,
                            places=spread(layers, 5, [1, 2, 2, 3]))
        for offset, k, thickness in (
                (0.0, 0.0, 0.3e-6), (0.0, 1e-9, 0.3e-6), (0.0, 1e-3, 0.3e-6), (1e-12, 0.0, 0.3e-6),
                (-1e-12, 0.0, 0.3e-6), (1e-6, 0.0, 0.3e-6), (-1e-6, 0.0, 0.3e-6),
                (1e-4, 0.0, 0.3e-6), (-1e-4, 0.0, 0.3e-6), (1e-3, 0.0, 0.3e-6),
                (-1e-3, 0.0, 0.3e-6), (2e-3, 1e-4, 0.3e-6), (5e-3, 0.0, 0.1e-6),
                (-5e-3, 0.0, 0.1e-6), (0.0, 0.0, 5e-6), (1e-6, 0.0, 5e-6), (0.0, 0.0, 1e-9)):
            layers = alternating(12, 2.07, 1.45, jitter_seed=7)
            layers.insert(5, [critical * (1 + offset), k, thickness])
            yield described(
                f"critical layer of {thickness * 1e6:g} um in 12 layers, relative offset {offset}, "
                f"k {k}, {polarisation}", layers, incident=1.45, angle=angle,
                polarisation=polarisation, places=spread(layers, 6, [4, 5, 5, 5]))


def all_cases():
    for group in (mirror_cases, metal_cases, evanescent_cases):
        yield from group()


def verify():
    """At normal incidence, as in optics_reference.json; and both polarisations agree there."""
    broken = 0
    for case, places in all_cases():
        straight = dict(case, angle_rad=0.0)
        if max(k for _, k, _ in case["layers"]) > 1 or not case["name"].startswith("30 layers, 45"):
            continue
        for layer, fraction, p11, p12 in places:
            depth = fraction * case["layers"][layer][2]
            pairs = [(weight(straight, layer, depth, p12, kind != KINDS[2]),
                      slice_weight(straight, kind, layer, depth, p11, p12))
                     for kind in (KINDS[0], KINDS[2])]
            swapped = dict(straight, polarisation="p" if case["polarisation"] == "s" else "s")
            pairs += [(slice_weight(straight, kind, layer, depth, p11, p12),
                       slice_weight(swapped, kind, layer, depth, p11, p12)) for kind in KINDS]
            for one, other in pairs:
                if abs(one - other) > mpf(10) ** -30 * max(abs(one), 1):
                    broken += 1
                    print(f"BROKEN {case['name']}: {mp.nstr(one, 25)}, {mp.nstr(other, 25)}")
    print(f"{broken} broken")
    return 1 if broken else 0


def sample(every, path):
    return check_sample(path, [partial(completed, *described) for described in all_cases()], every)


def write(path):
    write_cases(path, "independent multi-precision reference for readout weights at oblique "
                "incidence; conventions and derivation in tests/generators/readout_reference.py",
                (completed(case, places) for case, places in all_cases()))


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--output", default=DATA, help="file to write")
    parser.add_argument("--sample", type=int, metavar="N",
                        help="regenerate every N-th case and compare with the stored file")
    parser.add_argument("--verify", action="store_true",
                        help="hold against the other generator at normal incidence")
    options = parser.parse_args()
    mp.dps = WORKING_DIGITS
    if options.verify:
        return verify()
    if options.sample is not None:
        return sample(max(options.sample, 1), options.output)
    write(options.output)
    return 0


if __name__ == "__main__":
    sys.exit(main())
