#!/usr/bin/env python3
"""Reference numbers for whole parts (plate with two coated faces), from 120 working digits.

Independent derivation: amplitudes come from the chain of Fresnel interfaces of
optics_reference_model.py. The sum of intensities is not a summed series here: the four powers that
travel in the plate (down and up, at its front and at its rear) are the solution of the linear
system that the two faces and the attenuation between them impose.

Conventions as in optics_reference.py. For the sum of intensities the faces see the real part of the
plate's index; one pass keeps exp(-2 Im q d), q with the complex index. Where that is below exp(-40)
there are no fringes and the coherent result is the reference. Every input is an IEEE double.

Usage: part_reference.py [--output FILE] | --sample
"""
import argparse
import os
import sys
from functools import partial

from mpmath import mp, mpc, mpf

sys.dont_write_bytecode = True  # the source folder stays clean when this runs as a test
from optics_reference_cases import alternating, radians
from optics_reference_model import Waves, layer_powers
from reference_file import check_sample, write_cases

DATA = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "data",
                    "part_reference.json")
LOG_OPAQUE = -40


def part(name, front, rear, substrate=(1.45, 0.0), thickness=6e-3, incident=1.0, behind=1.0,
         degrees=0, polarisation="s", wavelength=1064e-9):
    return {"name": name, "wavelength_m": wavelength, "angle_rad": radians(degrees),
            "polarisation": polarisation, "incident_index": incident, "front_layers": front,
            "substrate_index": list(substrate), "substrate_thickness_m": thickness,
            "rear_layers": rear, "rear_index": behind}


def all_parts():
    mirror = alternating(30, 2.07, 1.45, extinction=1e-6, jitter_seed=1)
    better = alternating(60, 2.07, 1.45, jitter_seed=2)
    lossy = alternating(24, 2.07, 1.45, extinction=1e-3, jitter_seed=3)
    window = [[1.9, 1e-5, 95e-9], [1.46, 0.0, 250e-9]]
    metal = [[0.2, 6.7, 150e-9]]
    yield part("bare plate", [], [])
    yield part("bare plate, 50 degrees p, water behind", [], [], degrees=50, polarisation="p",
               behind=1.33)
    yield part("mirror with antireflection rear face", mirror, window, substrate=(1.45, 2e-9))
    yield part("mirror, rear window, 45 degrees s", mirror, window, substrate=(1.45, 1e-7),
               degrees=45)
    yield part("mirror, rear window, 45 degrees p", mirror, window, substrate=(1.45, 1e-7),
               degrees=45, polarisation="p")
    yield part("two mirrors, lossless", better, better[::-1], thickness=0.1)
    yield part("two mirrors of 1e-9 loss, absorbing plate", better, better, substrate=(1.45, 1e-12))
    yield part("lossy mirrors on both faces, 30 degrees p", lossy, lossy[::-1],
               substrate=(1.76, 1e-6), degrees=30, polarisation="p")
    for polarisation in "sp":
        yield part(f"total reflection at the rear face, {polarisation}",
                   [[1.7, 1e-5, 120e-9]], [[1.38, 1e-4, 180e-9]], substrate=(1.5, 1e-8),
                   incident=1.45, degrees=60, polarisation=polarisation)
    yield part("gap, plate guide and total reflection", [[1.0, 0.0, 1e-6]], [],
               substrate=(1.75, 1e-11), incident=1.8, degrees=70)
    yield part("thin metal in front", metal, window, substrate=(1.45, 1e-8))
    yield part("thick metal in front, T underflows", [[0.2, 6.7, 20e-6]], window)
    yield part("grey glass", window, [], substrate=(1.52, 1e-4), thickness=2e-3)
    yield part("dark glass, just not opaque", mirror, window, substrate=(1.52, 5e-4),
               thickness=6.7e-3)
    yield part("opaque glass, T underflows", mirror, window, substrate=(3.5, 5e-3),
               thickness=20e-3, degrees=40, polarisation="p")
    yield part("metal plate", alternating(20, jitter_seed=2), metal, substrate=(0.2, 6.7),
               thickness=1e-3, degrees=45, polarisation="p")
    yield part("evanescent plate", [], window, substrate=(1.2, 0.0), incident=1.5, degrees=65,
               thickness=1e-3)


def mp_layers(layers):
    return [(mpc(n, k), mpf(d)) for n, k, d in layers]


def powers(waves):
    absorbed, _, transmitted = layer_powers(waves)
    return {"R": abs(waves.reflection()) ** 2, "T": transmitted, "A": absorbed}


def coherent(case):
    front, rear = mp_layers(case["front_layers"]), mp_layers(case["rear_layers"])
    plate = (mpc(*case["substrate_index"]), mpf(case["substrate_thickness_m"]))
    found = powers(Waves(case["wavelength_m"], case["incident_index"], front + [plate] + rear,
                         mpc(case["rear_index"]), case["angle_rad"], case["polarisation"]))
    at = len(front)
    return collected(found["T"], found["A"][:at], found["A"][at], found["A"][at + 1:], found["R"])


def collected(transmitted, front, plate, rear, reflected):
    lost = transmitted + sum(front) + plate + sum(rear)
    if abs(1 - reflected - lost) > mpf(10) ** -30 * max(lost, mpf(10) ** -20):
        raise ArithmeticError("R + T + A is not 1")
    return {"reflectance": reflected, "transmittance": transmitted,
            "log_transmittance": mp.log(transmitted) if transmitted > 0 else mp.ninf,
            "loss": lost, "front_absorptance": front, "substrate_absorptance": plate,
            "rear_absorptance": rear}


def plate_wavenumber(case):
    beta = mpf(case["incident_index"]) * mp.sin(mpf(case["angle_rad"]))
    return 2 * mp.pi / mpf(case["wavelength_m"]) * mp.sqrt(
        mpc(*case["substrate_index"]) ** 2 - beta ** 2)


def incoherent(case):
    log_kept = -2 * plate_wavenumber(case).imag * mpf(case["substrate_thickness_m"])
    if log_kept < LOG_OPAQUE:
        return coherent(case)
    n0, n, n2 = (mpf(x) for x in (case["incident_index"], case["substrate_index"][0],
                                  case["rear_index"]))
    front, rear = mp_layers(case["front_layers"]), mp_layers(case["rear_layers"])
    angle = mpf(case["angle_rad"])
    within = mp.asin(n0 * mp.sin(angle) / n)
    rest = (case["polarisation"],)
    outside = powers(Waves(case["wavelength_m"], n0, front, mpc(n), angle, *rest))
    inside = powers(Waves(case["wavelength_m"], n, front[::-1], mpc(n0), within, *rest))
    behind = powers(Waves(case["wavelength_m"], n, rear, mpc(n2), within, *rest))
    kept = mp.exp(log_kept)
    # Unknowns: down at the front, down at the rear, up at the rear, up at the front.
    system = mp.matrix([[1, 0, 0, -inside["R"]], [-kept, 1, 0, 0],
                        [0, -behind["R"], 1, 0], [0, 0, -kept, 1]])
    entered, at_rear, back, returned = mp.lu_solve(system, mp.matrix([outside["T"], 0, 0, 0]))
    front_absorbed = [a + returned * b for a, b in zip(outside["A"], inside["A"][::-1])]
    return collected(at_rear * behind["T"], front_absorbed,
                     (entered + back) * (1 - kept),
                     [at_rear * a for a in behind["A"]],
                     outside["R"] + returned * inside["T"])


def relative_sensitivity(case):
    """|d ln(1 - R)/d ln(wavelength)|, rounded up, with coherent passes: what rounding is multiplied by."""
    step = mpf(10) ** -30
    losses = [coherent(dict(case, wavelength_m=mpf(case["wavelength_m"]) * (1 + s)))["loss"]
              for s in (step, -step)]
    total = losses[0] + losses[1]
    if total < mpf(10) ** -60:  # what is left is rounding
        return 0
    return int(mp.ceil(abs(losses[0] - losses[1]) / (step * total)))


def finite(value):
    """JSON has no infinity: the logarithm of nothing is null."""
    if isinstance(value, dict):
        return {key: finite(entry) for key, entry in value.items()}
    return None if isinstance(value, mpf) and mp.isinf(value) else value


def finished(case):
    return finite(dict(case, results={"intensities": incoherent(case), "amplitudes": coherent(case),
                               "relative_sensitivity": relative_sensitivity(case)}))


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--output", default=DATA, help="file to write")
    parser.add_argument("--sample", action="store_true", help="compare with the stored file")
    options = parser.parse_args()
    mp.dps = 120
    if options.sample:
        return check_sample(options.output, [partial(finished, case) for case in all_parts()], 1)
    write_cases(options.output, "independent multi-precision reference for whole parts; "
                "conventions and derivation in tests/generators/part_reference.py",
                (finished(case) for case in all_parts()))
    return 0


if __name__ == "__main__":
    sys.exit(main())
