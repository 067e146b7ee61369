#!/usr/bin/env python3
"""Reference numbers for the optics of a layered mirror, from at least 80 working digits.

Independent derivation: no formula is shared with the program. The stack is a chain of Fresnel
interfaces and free flights. The reflection coefficient of everything below a plane is carried
upwards (Airy's and Parratt's recursion, Phys. Rev. 95, 359 (1954)); then the forward wave is
carried downwards. Only decaying exponentials occur. Absorption and stored energy are Joule heat and
field energy of the components of E and H, integrated over each layer in closed form.

Conventions: time factor exp(-i omega t), index n + ik with k >= 0, depth z into the mirror from its
face, layers listed from the light side, angle in radians in the incident medium (real index),
vacuum wavelength. Every input is an IEEE double, taken exactly. The scalar wave u is E_y for s
light and H_y for p light; "reflection" is the ratio of tangential electric fields for both, so
r_p = r_s at normal incidence. Transmittance is the power that enters the substrate. Stored energy
is (eps0 Re(n^2)|E|^2 + mu0 |H|^2)/4 (non-dispersive form) over the incident Poynting z component.
Delays are derivatives of arg r (arg t: tangential E at the top of the substrate) by omega at fixed
angle and constant indices. sensitivity_to_log_wavelength is |dr/d ln(wavelength)|.

Weights (normal incidence), by differences on the exact model and without any closed form:
the layer is cut at the depth z below its top into three, a | slice of thickness e | rest - e.
index weight h:  the slice has index n + v;                                       x = v.
strain weight g: the slice has thickness e (1 + s), index n - n^3 p12 s / 2 (complex n), the rest
keeps its thickness, so that the face moves towards the light by e s;             x = s.
With xi = (motion of the face towards the light) - (change of arg r)/(2 n0 k0), both are the mixed
derivative of xi by e and x at e = x = 0, the response per metre of depth. It is a central
difference of exact reflections at 120 digits with relative steps of 1e-20, truncation 1e-40.
Negative e is the analytic continuation. "layer" counts from 0 at the light side; depth_in_layer_m
is the exact input, depth_m the same depth counted from the face. p12 belongs to that place alone.

Usage: optics_reference.py [--output FILE] | --sample N | --verify
"""
import argparse
import json
import os
import sys

from mpmath import mp, mpf

sys.dont_write_bytecode = True  # the source folder stays clean when this runs as a test
from optics_reference_cases import all_cases
from optics_reference_laws import broken_laws
from optics_reference_model import results, weights

WORKING_DIGITS = 80
PRINTED_DIGITS = 25
DATA = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "data",
                    "optics_reference.json")


def completed(case, places):
    finished = dict(case, results=results(case))
    if places:
        finished["weights"] = weights(case, places)
    return finished


def text(value):
    """JSON in which doubles keep their shortest exact form and mp numbers have 25 digits."""
    if isinstance(value, mpf):
        return mp.nstr(value, PRINTED_DIGITS, min_fixed=0, max_fixed=0)
    if isinstance(value, dict):
        return "{" + ", ".join(f"{json.dumps(k)}: {text(v)}" for k, v in value.items()) + "}"
    if isinstance(value, list):
        return "[" + ", ".join(text(v) for v in value) + "]"
    return json.dumps(value)


def write(path):
    note = ("independent multi-precision reference for the optics of layered mirrors; "
            "conventions and derivation in tests/generators/optics_reference.py")
    lines = [text(completed(case, places)) for case, places in all_cases()]
    with open(path, "w", encoding="ascii") as file:
        file.write('{"note": ' + json.dumps(note) + ',\n"cases": [\n')
        file.write(",\n".join(lines) + "\n]}\n")
    print(f"wrote {len(lines)} cases")


def differences(fresh, stored, where, exact):
    """Places where two parsed documents differ by more than 20 digits (or at all if exact)."""
    if isinstance(fresh, dict) and isinstance(stored, dict) and fresh.keys() == stored.keys():
        loose = ("results", "depth_m", "index_weight", "strain_weight", "in_plane_weight")
        return [d for key in fresh for d in differences(
            fresh[key], stored[key], f"{where}/{key}", exact and key not in loose)]
    if isinstance(fresh, list) and isinstance(stored, list) and len(fresh) == len(stored):
        return [d for j, pair in enumerate(zip(fresh, stored))
                for d in differences(*pair, f"{where}/{j}", exact)]
    if fresh == stored:
        return []
    if not exact and isinstance(fresh, str) and isinstance(stored, str):
        if abs(mpf(fresh) - mpf(stored)) <= mpf(10) ** -20 * abs(mpf(fresh)):
            return []
    return [f"{where}: regenerated {fresh}, stored {stored}"]


def sample(every, path):
    with open(path, encoding="ascii") as file:
        stored = json.load(file, parse_float=str)["cases"]
    described_cases = list(all_cases())
    found = [] if len(stored) == len(described_cases) else ["number of cases"]
    chosen = list(zip(described_cases, stored))[::every]
    for (case, places), kept in chosen:
        fresh = json.loads(text(completed(case, places)), parse_float=str)
        found += differences(fresh, kept, case["name"], True)
    for line in found:
        print(line, file=sys.stderr)
    print(f"checked {len(chosen)} cases")
    return 1 if found else 0


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--output", default=DATA, help="file to write")
    parser.add_argument("--sample", type=int, metavar="N",
                        help="regenerate every N-th case and compare with the stored file")
    parser.add_argument("--verify", action="store_true", help="check laws and second routes")
    options = parser.parse_args()
    mp.dps = WORKING_DIGITS
    if options.verify:
        return broken_laws()
    if options.sample is not None:
        return sample(max(options.sample, 1), options.output)
    write(options.output)
    return 0


if __name__ == "__main__":
    sys.exit(main())
