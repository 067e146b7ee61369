#!/usr/bin/env python3
"""Reference numbers for the noise of a half-space mirror, derived a second time, numerically.

Coating Brownian: the full strain tensor at every point of a thin layer (elasticity, FDT of
Y. Levin, Phys. Rev. D 57, 659 (1998)). Thermal: the heat equation of each wavenumber by high-order
finite elements; the noise is the dissipation ∫κ(|Θ'|² + k²|Θ|²) dz, the sources come from the
forward thermo-elastic problem of a film thin against the beam and from perturbed wave matrices.
Substrate: integrals over wavenumber in 30 digits. Everything is computed twice, with different
resolution or by two integrals; `relative_accuracy` is what that changes.

Writes tests/data/noise_reference.json (about two minutes); `--sample` recomputes a part, compares
it with the file and exits with 1 on a mismatch.
"""

import argparse
import json
import os
import pathlib
import sys

for _name in ("OPENBLAS_NUM_THREADS", "OMP_NUM_THREADS"):
    os.environ.setdefault(_name, "1")
sys.dont_write_bytecode = True

import mpmath as mp  # noqa: E402  (after the number of threads is set)
import numpy as np  # noqa: E402

import noise_reference_cases as cases  # noqa: E402
import noise_reference_solution as solution  # noqa: E402

FILE = pathlib.Path(__file__).resolve().parent.parent / "data" / "noise_reference.json"
BOLTZMANN = solution.BOLTZMANN
FLOOR = 2e-14  # no number is claimed better than this


def accuracy(value, other, error=0.0):
    """Relative change between two resolutions, at least FLOOR."""
    value, other = np.asarray(value, float), np.asarray(other, float)
    nonzero = np.where(value == 0, 1.0, value)
    return np.maximum(np.maximum(abs(other - value) / abs(nonzero), error), FLOOR).tolist()


# --- Coating and substrate together: heat ---------------------------------------------------------


def thermal_rows(case, order, pieces, limit, tolerance, frequencies):
    """Per frequency the five coherent sums and the bare substrate; and the quadrature's error."""
    stack = solution.heat_stack(case, order, pieces)
    bare = solution.heat_stack(case | {"layers": []}, order, 1)
    rows, errors = [], []
    for frequency in frequencies:
        psd, error = solution.thermal_psd(stack, case, frequency, limit, tolerance)
        below, other = solution.thermal_psd(bare, case, frequency, limit, tolerance)
        rows.append([*psd, below[-1]])
        errors.append(max(error, other))
    return np.array(rows), np.array(errors)


def thermal(case, final=True, frequencies=None):
    frequencies = frequencies or case["frequencies_Hz"]
    names = solution.QUANTITIES + ["substrate_thermo_elastic"]
    rows, errors = thermal_rows(case, 10, 1, 14, 1e-11, frequencies)
    result = dict(case)
    slopes = [solution.clamped_index_slope(layer) for layer in case["layers"]]
    result["clamped_index_slope_per_K"] = slopes
    if final:
        coarse, (rows, errors) = rows, thermal_rows(case, 15, 2, 15, 1e-13, frequencies)
        close = accuracy(rows, coarse, errors[:, None])
        result["relative_accuracy"] = {n: [row[i] for row in close] for i, n in enumerate(names)}
    result["psd_m2_per_Hz"] = {name: rows[:, i].tolist() for i, name in enumerate(names)}
    return result


# --- Coating Brownian -----------------------------------------------------------------------------


def brownian_energies(case, order):
    """Energies (bulk, shear) of all layers for light that stays outside and light that enters."""
    node, weight = np.polynomial.legendre.leggauss(order)
    k0 = 2 * np.pi / case["wavelength_m"]
    pieces = [max(1, int(np.ceil(2 * k0 * layer[0] * layer[2] / 4))) for layer in case["layers"]]
    depths = [np.concatenate([(e + (node + 1) / 2) / n for e in range(n)]) for n in pieces]
    strain, index = solution.readout_weights(case, depths)
    below, radius = case["substrate"], case["beam_radius_m"]
    result = {"at_the_face": [], "penetrating": [], "integrals": []}
    for j, (layer, n) in enumerate(zip(case["layers"], pieces)):
        share = np.tile(weight / 2 / n * layer[2], n)
        for name, g in (("at_the_face", np.ones(len(share))), ("penetrating", strain[j])):
            energy = solution.layer_energies(layer, below, radius, share, g)
            result[name].append([float(part) for part in energy])
        weights = (strain[j], strain[j] ** 2, index[j])
        result["integrals"].append([float(share @ weight_) for weight_ in weights])
    return {name: np.array(rows) for name, rows in result.items()}


def brownian(case, final=True):
    energy = brownian_energies(case, 14)
    result = dict(case)
    if final:
        coarse, energy = energy, brownian_energies(case, 24)
        scale = np.array([layer[2] for layer in case["layers"]])[:, None]
        changes = [np.max(abs(coarse["integrals"] - energy["integrals"]) / scale)]
        for name in ("at_the_face", "penetrating"):
            changes.append(np.max(accuracy(energy[name], coarse[name])))
        result["relative_accuracy"] = float(max(changes))
    losses = np.array([case["loss_bulk"], case["loss_shear"]]).T
    omega = 2 * np.pi * np.array(case["frequencies_Hz"])
    names = ("strain_m", "strain_squared_m", "index_m")
    integrals = energy["integrals"].T.tolist()
    result["readout_integrals"] = dict(zip(names, integrals))
    for name in ("at_the_face", "penetrating"):
        result[f"energy_{name}_J_per_N2"] = {"bulk": energy[name][:, 0].tolist(),
                                             "shear": energy[name][:, 1].tolist()}
        noise = 8 * BOLTZMANN * case["temperature_K"] / omega * np.sum(losses * energy[name])
        result[f"psd_{name}_m2_per_Hz"] = noise.tolist()
    return result


# --- Substrate ------------------------------------------------------------------------------------


def substrate_brownian(name, base, radius, temperature, frequency, loss_bulk, loss_shear):
    bulk, shear = solution.half_space_energies(base, radius)
    lost = loss_bulk * bulk + loss_shear * shear
    psd = 8 * BOLTZMANN * temperature / (2 * np.pi * frequency) * lost
    return {"name": name, "substrate": base, "beam_radius_m": radius, "temperature_K": temperature,
            "frequency_Hz": frequency, "loss_bulk": loss_bulk, "loss_shear": loss_shear,
            "energy_bulk_J_per_N2": float(bulk), "energy_shear_J_per_N2": float(shear),
            "psd_m2_per_Hz": float(psd)}


def breakpoints(values, limit):
    """Sorted ends of the pieces of an integral from 0 to `limit`."""
    return sorted({mp.mpf(0), mp.mpf(limit)} | {mp.mpf(v) for v in values if 0 < v < limit})


def cerdonio_double(omega):
    """J(Ω) of M. Cerdonio et al., Phys. Rev. D 63, 082003 (2001), as a double integral, polar."""
    omega = mp.mpf(omega)

    def angular(rho):
        half = rho * rho / 2
        return 2 * mp.quad(lambda t: t * (2 - t) * mp.exp(-half * t * (2 - t)),
                           breakpoints([1 / (half + 1)], 1))

    root = mp.sqrt(omega)
    pieces = [root / 4, root, 4 * root, 1, 4, 16]
    return mp.sqrt(2 / mp.pi**3) * mp.quad(lambda p: p * p / (p**4 + omega**2) * angular(p),
                                           breakpoints(pieces, mp.inf))


def cerdonio(omega):
    """The same with one of the two integrals done by residues."""
    omega, root = mp.mpf(omega), mp.sqrt(omega)

    def residue(u):
        return u**3 * mp.exp(-u * u / 2) * (1 / u - mp.re(1 / mp.sqrt(u * u + 1j * omega)))

    pieces = [root / 4, root, 4 * root, 1, 4]
    return mp.sqrt(2 / mp.pi) / omega**2 * mp.quad(residue, breakpoints(pieces, 14))


def cerdonio_rows(values):
    rows = {"parameter": list(values), "integral": [], "relative_accuracy": []}
    for value in values:
        integral = cerdonio(value)
        rows["integral"].append(float(integral))
        rows["relative_accuracy"] += accuracy([integral], [cerdonio_double(value)])
    return rows


def transmission(name, base, slope, length, wavelength, radius, temperature, frequencies):
    """Light crossing the substrate: a single pass, and what the standing wave adds, over all k.

    `standing_wave` neglects the transverse wavenumber against that of the standing wave, as the
    article does; `standing_wave_full` does not.
    """
    kappa, capacity = base["conductivity_W_per_mK"], base["heat_capacity_J_per_m3K"]
    k_wave = 4 * mp.pi * mp.mpf(base["index"]) / mp.mpf(wavelength)
    rows = {"single_pass": [], "standing_wave": [], "standing_wave_full": []}
    errors = []
    for frequency in frequencies:
        omega = 2 * mp.pi * frequency
        knee = omega * capacity / kappa * mp.mpf(radius) ** 2  # (k_T w)²
        root = mp.sqrt(knee)

        def rate(x2):  # Re of the response at (k w)² = x2, times κ/w²
            return x2 / (x2 * x2 + knee * knee)

        points = breakpoints([root / 5, root, 5 * root, 2], 20)
        whole = mp.quad(lambda x: x * mp.exp(-x * x / 4) * rate(x * x), points)
        along = (k_wave * mp.mpf(radius)) ** 2
        full = mp.quad(lambda x: x * mp.exp(-x * x / 4) * rate(x * x + along), [0, 2, 20])
        factor = 2 * BOLTZMANN * (mp.mpf(temperature) * slope) ** 2 * length / (mp.pi * kappa)
        rows["single_pass"].append(float(factor * whole))
        rows["standing_wave_full"].append(float(factor / 2 * full))
        rows["standing_wave"].append(float(factor / 2 * 2 * rate(along)))
        closed = mp.re(mp.exp(1j * knee / 4) * mp.e1(1j * knee / 4)) / 2
        errors += accuracy([whole], [closed])
    return {"name": name, "substrate": base, "index_slope_per_K": slope, "length_m": length,
            "wavelength_m": wavelength, "beam_radius_m": radius, "temperature_K": temperature,
            "frequencies_Hz": list(frequencies), "psd_m2_per_Hz": rows, "relative_accuracy": errors}


# --- The classic closed form ----------------------------------------------------------------------


def face_temperature(base, radius, temperature, frequency):
    """Beam-averaged temperature of the face [K²/Hz]: (all frequencies, diffusion length ≪ w)."""
    kappa, omega = base["conductivity_W_per_mK"], 2 * mp.pi * frequency
    ratio = 1j * omega * base["heat_capacity_J_per_m3K"] / kappa * mp.mpf(radius) ** 2
    root = mp.sqrt(abs(ratio))
    points = breakpoints([root / 3, root, 3 * root, 2], 20)
    shape = mp.re(mp.quad(lambda x: x * mp.exp(-x * x / 4) / mp.sqrt(x * x + ratio), points))
    scale = 2 * BOLTZMANN * mp.mpf(temperature) ** 2 / (mp.pi * kappa * mp.mpf(radius))
    return float(scale * shape), float(scale * mp.re(2 / mp.sqrt(ratio)))


def refractive_length(case, growth):
    """β̄λ [m/K]: slope of the phase of r if indices grow by β and layers by `growth` per kelvin."""
    index, layers, wavelength = solution.indices(case), case["layers"], mp.mpf(case["wavelength_m"])
    slopes = [layer[6] for layer in layers]
    cold = solution.reflection(wavelength, index, [layer[2] for layer in layers])

    def phase(step):
        warm = [index[0]] + [n + b * step for n, b in zip(index[1:-1], slopes)] + [index[-1]]
        thick = [layer[2] * (1 + mp.mpf(e) * step) for layer, e in zip(layers, growth)]
        return mp.arg(solution.reflection(wavelength, warm, thick) / cold)

    step = mp.mpf(10) ** -9
    slope = (8 * (phase(step) - phase(-step)) - phase(2 * step) + phase(-2 * step)) / (12 * step)
    return float(slope * wavelength / (4 * mp.pi * case["incident_index"]))


def thickness_factor(xi, ratio, elastic_share, order=14):
    """Γ: one homogeneous film, elastic source uniform, refractive source at its face."""
    pieces = max(2, int(np.ceil(xi)))
    point, weight, hats, shapes = solution.reference_element(order)[:4]
    uniform = np.full((pieces, len(point), 1), elastic_share / pieces / 2)
    loads = [np.einsum("p,pi,eps->eis", weight, basis, uniform) for basis in (hats, shapes)]
    loads[0][0, 0, 0] += 1 - elastic_share
    # Units: film thickness, conductivity and ω are 1; then C = ξ²/2 and κ_sC_s = C/R².
    capacity = xi * xi / 2
    below = {"conductivity_W_per_mK": 1.0, "heat_capacity_J_per_m3K": capacity / ratio**2}
    stack = solution.HeatStack([1.0] * pieces, [capacity] * pieces, [1 / pieces] * pieces, loads,
                               order, below, [0.0])
    k = np.array([1e-9 * xi])
    bare = (1 / stack.decay(k, 1.0)).real
    return float((stack.dissipation(k, 1.0) / bare)[0, 0])


def factor_rows():
    return [{"xi": x, "ratio": r, "elastic_share": p, "factor": thickness_factor(x, r, p)}
            for x, r, p in cases.THICKNESS_FACTORS]


def classic(case, final=True, frequencies=None):
    layers, base = case["layers"], case["substrate"]
    thickness = np.array([layer[2] for layer in layers])
    total = thickness.sum()
    capacity = sum(layer[8] * layer[2] for layer in layers) / total
    conductivity = total / sum(layer[2] / layer[7] for layer in layers)
    lengths = np.array([solution.expansion_lengths(layer, base) for layer in layers])
    elastic = float(lengths.sum(axis=1) @ thickness)
    below = base["heat_capacity_J_per_m3K"]
    elastic -= float(solution.substrate_source(base) * total * capacity / below)
    frequencies = frequencies or case["frequencies_Hz"]
    faces = [face_temperature(base, case["beam_radius_m"], case["temperature_K"], f)
             for f in frequencies]
    result = case | {"frequencies_Hz": list(frequencies), "thermo_elastic_length_m_per_K": elastic,
                     "face_temperature_psd_K2_per_Hz": [face[0] for face in faces],
                     "face_temperature_psd_one_dimensional_K2_per_Hz": [face[1] for face in faces]}
    ratio = np.sqrt(conductivity * capacity / base["conductivity_W_per_mK"] / below)
    depths = [total * np.sqrt(4 * np.pi * f * capacity / conductivity) for f in frequencies]
    for name, growth in (("own_thickness", lengths[:, 0]), ("with_substrate", lengths.sum(axis=1))):
        refractive = refractive_length(case, [float(e) for e in growth])
        sum_ = elastic - refractive
        order = 20 if final else 14
        factors = [thickness_factor(xi, ratio, elastic / sum_, order) for xi in depths]
        result[name] = {"thermo_refractive_length_m_per_K": refractive, "thickness_factor": factors,
                        "psd_m2_per_Hz": [face[0] * g * sum_**2 for face, g in zip(faces, factors)]}
    return result


# --- File and sample ------------------------------------------------------------------------------


def document():
    mp.mp.dps = 30
    transmissions = [transmission(*c, cases.FREQUENCIES) for c in cases.transmission_cases()]
    return {
        "description":
            "Noise of a half-space mirror, independent derivation and numerical solution, made by "
            "tests/generators/noise_reference.py. SI units; one-sided spectra; beam radius at "
            "1/e^2 of intensity; layers from the light side, thin against the beam; index slope of "
            "a layer at zero stress (clamped_index_slope_per_K multiplies the index weight; it "
            "takes the real part of the index, the strain weight the complex one). Accuracy of "
            "readout_integrals is relative to the thickness of the layer.",
        "layer_columns": cases.LAYER_COLUMNS,
        "boltzmann_constant_J_per_K": BOLTZMANN,
        "thermal": [thermal(case) for case in cases.thermal_cases()],
        "coating_brownian": [brownian(case) for case in cases.brownian_cases()],
        "substrate_brownian": [substrate_brownian(*c) for c in cases.substrate_brownian_cases()],
        "cerdonio": cerdonio_rows(cases.CERDONIO_PARAMETERS),
        "transmission": transmissions,
        "thickness_factor": factor_rows(),
        "classic_thermo_optic": [classic(case) for case in cases.classic_cases()],
    }


def mismatches(new, old, tolerance, path=""):
    """Places where a freshly computed piece differs from the file (only keys of `new` count)."""
    if type(new) is not type(old):
        return [f"{path}: {new!r} instead of {old!r}"]
    found = []
    if isinstance(new, dict):
        for key in new:
            if key != "relative_accuracy":
                found += mismatches(new[key], old.get(key), tolerance, f"{path}/{key}")
    elif isinstance(new, list):
        if len(new) != len(old):
            return [f"{path}: {len(new)} values instead of {len(old)}"]
        for i, (a, b) in enumerate(zip(new, old)):
            if "readout_integrals" in path:  # may vanish by symmetry: compare with the largest
                a, b = a + 2 * max(map(abs, old)), b + 2 * max(map(abs, old))
            found += mismatches(a, b, tolerance, f"{path}[{i}]")
    elif new != old and (isinstance(new, str) or not abs(new - old) <= tolerance * abs(old)):
        found.append(f"{path}: {new!r} instead of {old!r}")
    return found


def at_one_frequency(entry, chosen):
    """An entry of the file cut down to one of its frequencies."""
    count = len(entry["frequencies_Hz"])
    cut = {"frequencies_Hz": [entry["frequencies_Hz"][chosen]]}

    def pick(value):
        if isinstance(value, dict):
            return {key: pick(inner) for key, inner in value.items()}
        return [value[chosen]] if isinstance(value, list) and len(value) == count else value

    whole = ("layers", "substrate", "clamped_index_slope_per_K")
    return {key: cut.get(key, value if key in whole else pick(value))
            for key, value in entry.items()}


def sample():
    """Compare a part with the file: coarser resolution, one frequency per thermal case."""
    mp.mp.dps = 25
    stored = json.loads(FILE.read_text(encoding="utf-8"))
    wrong, checked = [], 0

    def check(kind, new, old):
        nonlocal checked
        checked += 1
        wrong.extend(mismatches(new, old, 1e-10, f"{kind}/{new.get('name', '')}"))

    for i, case in enumerate(cases.thermal_cases()):
        chosen = i % len(case["frequencies_Hz"])
        one = case | {"frequencies_Hz": [case["frequencies_Hz"][chosen]]}
        check("thermal", thermal(one, final=False), at_one_frequency(stored["thermal"][i], chosen))
    for i, case in enumerate(cases.brownian_cases()):
        check("coating_brownian", brownian(case, final=False), stored["coating_brownian"][i])
    for i, case in enumerate(cases.substrate_brownian_cases()):
        check("substrate_brownian", substrate_brownian(*case), stored["substrate_brownian"][i])
    for new, old in zip(factor_rows(), stored["thickness_factor"]):
        check("thickness_factor", new, old)
    values = cases.CERDONIO_PARAMETERS
    new = {"parameter": values, "integral": [float(cerdonio(value)) for value in values]}
    check("cerdonio", new, stored["cerdonio"])
    for i, case in enumerate(cases.transmission_cases()):
        chosen = 2 * i + 1
        one = transmission(*case, [cases.FREQUENCIES[chosen]])
        check("transmission", one, at_one_frequency(stored["transmission"][i], chosen))
    for i, case in enumerate(cases.classic_cases()):
        chosen = i % len(case["frequencies_Hz"])
        one = classic(case, final=False, frequencies=[case["frequencies_Hz"][chosen]])
        old = at_one_frequency(stored["classic_thermo_optic"][i], chosen)
        check("classic_thermo_optic", one, old)
    return checked, wrong


def main():
    parser = argparse.ArgumentParser(description=__doc__.split("\n")[0])
    parser.add_argument("--sample", action="store_true", help="compare a part with the file")
    if not parser.parse_args().sample:
        FILE.write_text(json.dumps(document(), indent=1) + "\n", encoding="utf-8")
        return 0
    checked, wrong = sample()
    for line in wrong:
        print("mismatch:", line, file=sys.stderr)
    print(f"checked {checked} cases")
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main())
