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
import os
import sys
from functools import partial

from mpmath import mp

sys.dont_write_bytecode = True  # the source folder stays clean when this runs as a test
from optics_reference_cases import all_cases
from optics_reference_laws import broken_laws
from optics_reference_model import results, weights
from reference_file import check_sample, write_cases

WORKING_DIGITS = 80
DATA = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "data",
                    "optics_reference.json")


def completed(case, places):
    finished = dict(case, results=results(case))
    if places:
        finished["weights"] = weights(case, places)
    return finished


def write(path):
    write_cases(path, "independent multi-precision reference for the optics of layered mirrors; "
                "conventions and derivation in tests/generators/optics_reference.py",
                (completed(case, places) for case, places in all_cases()))


def sample(every, path):
    return check_sample(path, [partial(completed, *described) for described in all_cases()], every)


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
