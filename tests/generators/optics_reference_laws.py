"""Laws and second routes that the reference numbers must satisfy (optics_reference.py --verify).

Second routes: the amplitudes of all waves from one dense linear system of boundary conditions, the
layer integrals by quadrature of the field components, the delays by numerical differentiation.
"""
from mpmath import mp, mpc, mpf

from optics_reference_cases import all_cases
from optics_reference_model import (LIGHT_SPEED, Waves, reflection_derivatives, results, waves_of,
                                    weight)


def boundary_value_fields(case, frequency_factor=1):
    """Reflection, transmission of u, and the field components, by one dense linear solve.

    In each medium two plane waves with E (s) or H (p) of unit size along y; tangential E and H are
    continuous. fields(j, z): E tangential, E normal, H tangential, H normal at depth z in medium j
    (0 is the incident medium).
    """
    k0 = 2 * mp.pi / mpf(case["wavelength_m"]) * frequency_factor
    beta = mpf(case["incident_index"]) * mp.sin(mpf(case["angle_rad"]))
    indices = [mpc(case["incident_index"])] + [mpc(n, k) for n, k, _ in case["layers"]]
    indices.append(mpc(*case["substrate_index"]))
    depths = [mpf(0)] + [mpf(d) for _, _, d in case["layers"]] + [mpf(0)]

    def plane_wave(j, direction, z):
        n = indices[j]
        cosine = direction * mp.sqrt(1 - (beta / n) ** 2)
        start = 0 if direction > 0 else depths[j]
        size = mp.exp(mpc(0, 1) * k0 * n * cosine * (z - start))
        if case["polarisation"] == "s":
            return size, 0, -n * cosine * size, beta * size  # Ey, -, Hx, Hz
        return cosine / n * size, -beta / n ** 2 * size, size, 0  # Ex, Ez, Hy, -

    last = len(indices) - 1
    matrix, source = mp.zeros(2 * last), mp.zeros(2 * last, 1)
    for j in range(last):
        for row, component in ((2 * j, 0), (2 * j + 1, 2)):
            matrix[row, 2 * j] = plane_wave(j, -1, depths[j])[component]
            matrix[row, 2 * j + 1] = -plane_wave(j + 1, 1, 0)[component]
            if j > 0:
                matrix[row, 2 * j - 1] = plane_wave(j, 1, depths[j])[component]
            if j + 1 < last:
                matrix[row, 2 * j + 2] = -plane_wave(j + 1, -1, 0)[component]
    for row, component in ((0, 0), (1, 2)):
        source[row] = -plane_wave(0, 1, 0)[component]
    amplitudes = mp.lu_solve(matrix, source)

    def fields(j, z):
        forward = plane_wave(j, 1, z)
        backward = plane_wave(j, -1, z)
        return [amplitudes[2 * j - 1] * f + amplitudes[2 * j] * b
                for f, b in zip(forward, backward)]

    sign = 1 if case["polarisation"] == "s" else -1
    return sign * amplitudes[0], amplitudes[2 * last - 1], fields


def compare(name, value, expected, digits, floor=0):
    """0, or 1 and a line when fewer than `digits` digits of max(|expected|, floor) agree."""
    if value == expected:
        return 0
    worst = abs(value - expected) / max(abs(expected), floor, mpf(10) ** -9999)
    if worst < mpf(10) ** -digits:
        return 0
    print(f"BROKEN {name}: {mp.nstr(value, 30)} against {mp.nstr(expected, 30)}")
    return 1


def second_amplitudes(case, found):
    """Reflection and transmittance from the linear system; returns the number of disagreements."""
    reflection, transmission, _ = boundary_value_fields(case)
    substrate = mpc(*case["substrate_index"])
    n0, angle = mpf(case["incident_index"]), mpf(case["angle_rad"])
    inside = mp.sqrt(1 - (n0 * mp.sin(angle) / substrate) ** 2)
    if case["polarisation"] == "s":
        entering = mp.re(substrate * inside) / (n0 * mp.cos(angle))
    else:
        entering = mp.re(inside / substrate) / (mp.cos(angle) / n0)
    broken = compare(case["name"] + " r", reflection, mpc(*found["reflection"]), 40)
    return broken + compare(case["name"] + " T", abs(transmission) ** 2 * entering,
                            found["transmittance"], 40)


def second_integrals(case, found):
    """Absorptances and stored energies by quadrature of the field components."""
    broken = 0
    _, _, fields = boundary_value_fields(case)
    n0, angle = mpf(case["incident_index"]), mpf(case["angle_rad"])
    k0 = 2 * mp.pi / mpf(case["wavelength_m"])
    incident = n0 * mp.cos(angle) / 2  # units with eps0 = mu0 = 1/c
    if case["polarisation"] == "p":
        incident = mp.cos(angle) / (2 * n0)
    for j, (n, k, d) in enumerate(case["layers"]):
        square = mpc(n, k) ** 2

        def size(z, first, j=j):
            return sum(abs(part) ** 2 for part in fields(j + 1, z)[first:first + 2])

        depths = mp.linspace(0, mpf(d), 5)
        electric = mp.quad(lambda z: size(z, 0), depths)
        magnetic = mp.quad(lambda z: size(z, 2), depths)
        energy = (square.real * electric + magnetic) / (4 * LIGHT_SPEED * incident)
        broken += compare(f"{case['name']} W{j}", energy, found["stored_energy_J_per_W"][j], 30)
        broken += compare(f"{case['name']} A{j}", k0 * square.imag * electric / (2 * incident),
                          found["absorptance"][j], 30)
    return broken


def second_delays(case, found):
    """Group delay and dispersion by differences of the phase of the linear system's r."""
    reflection, _, _ = boundary_value_fields(case)

    def phase(x):
        return mp.log(boundary_value_fields(case, 1 + x)[0] / reflection).imag

    omega = 2 * mp.pi * LIGHT_SPEED / mpf(case["wavelength_m"])
    step, floor = mpf(10) ** -14, mpf(10) ** -25
    up, down = phase(step), phase(-step)
    return (compare(case["name"] + " delay", (up - down) / (2 * step),
                    found["group_delay_s"] * omega, 15, floor)
            + compare(case["name"] + " dispersion", (up + down) / step ** 2,
                      found["group_delay_dispersion_s2"] * omega ** 2, 15, floor))


def quarter_wave_laws():
    """Exact quarter waves: r from the admittance; delay of a practically infinite stack."""
    broken = 0
    high, low, base, wavelength = mpf("2.07"), mpf("1.45"), mpf("1.45"), mpf("1064e-9")
    for pairs in (10, 15, 20, 200):
        for first, second in ((high, low), (low, high)):
            layers = [(mpc(n), wavelength / (4 * n)) for n in (first, second) * pairs]
            admittance = (first / second) ** (2 * pairs) * base
            waves = Waves(wavelength, 1, layers, base)
            broken += compare("quarter-wave r", waves.reflection(),
                              (1 - admittance) / (1 + admittance), 60)
            value, slope, _, _ = reflection_derivatives(waves)
            delay = (slope / value).imag / (waves.k0 * LIGHT_SPEED)
            expected = wavelength / (2 * LIGHT_SPEED * (high - low))
            expected *= 1 if first == high else high * low
            if pairs == 200:
                broken += compare("quarter-wave delay", delay, expected, 55)
    return broken


def weight_laws():
    """The integral of a weight over a layer is the response to a change of the whole layer."""
    broken, p12, step = 0, 0.3, mpf(10) ** -30
    case = {"wavelength_m": 1e-6, "angle_rad": 0.0, "polarisation": "s", "incident_index": 1.2,
            "substrate_index": [1.5, 0.0],
            "layers": [[2.1, 0.0, 2e-7], [1.4, 0.01, 3e-7], [0.9, 3.0, 4e-8]]}
    for layer, (n, k, d) in enumerate(case["layers"]):
        for strain in (False, True):
            def response(x, layer=layer, n=n, k=k, d=d, strain=strain):
                stack = [(mpc(a, b), mpf(c)) for a, b, c in case["layers"]]
                index = mpc(n, k)
                stack[layer] = (index - index ** 3 * mpf(p12) * x / 2, mpf(d) * (1 + x)) \
                    if strain else (index + x, mpf(d))
                waves = Waves(case["wavelength_m"], case["incident_index"], stack, mpf(1.5))
                turn = mp.log(waves.reflection() / waves_of(case).reflection()).imag
                return (mpf(d) * x if strain else 0) - turn / (2 * mpf(1.2) * waves.k0)

            with mp.workdps(110):
                whole = (response(step) - response(-step)) / (2 * step)

                def local(z, layer=layer, strain=strain):
                    return weight(case, layer, z, p12, strain)

                integral = mp.quad(local, [0, mpf(d)], method="gauss-legendre", maxdegree=4)
            broken += compare(f"integral of weight, layer {layer}, strain {strain}", integral,
                              whole, 25)
    return broken


def case_laws(case, found):
    """Energy balance, precision, and for lossless normal incidence the law of the delays."""
    total = found["reflectance"] + found["transmittance"] + sum(found["absorptance"])
    broken = compare(case["name"] + " R + T + A", total, mpf(1), 40)
    broken += compare(case["name"] + " 1 - R", found["one_minus_reflectance"],
                      found["transmittance"] + sum(found["absorptance"]), 40)
    with mp.workdps(mp.dps + 60):
        finer = results(case)
    for key in found:
        pairs = zip(found[key], finer[key]) if isinstance(found[key], list) else \
            [(found[key], finer[key])]
        broken += sum(compare(f"{case['name']} {key}", a, b, 30) for a, b in pairs)
    if is_plain(case):
        sides = (found["reflectance"] * found["group_delay_s"]
                 + found["transmittance"] * found["transmitted_group_delay_s"])
        broken += compare(case["name"] + " delay law", sides,
                          sum(found["stored_energy_J_per_W"], mpf(0)), 40)
    return broken


def is_plain(case):
    lossless = case["substrate_index"][1] == 0 and all(k == 0 for _, k, _ in case["layers"])
    return lossless and case["angle_rad"] == 0


def broken_laws():
    """Checks every case, prints one line, returns 1 if anything is broken."""
    broken = quarter_wave_laws() + weight_laws()
    count, plain, amplitudes, integrals = 0, 0, 0, 0
    for case, _ in all_cases():
        found = results(case)
        broken += case_laws(case, found)
        plain += is_plain(case)
        size = len(case["layers"])
        if size <= 5 or (size <= 21 and count % 4 == 0) or (size == 40 and count % 16 == 0):
            amplitudes += 1
            broken += second_amplitudes(case, found)
        if 0 < size <= 13 and count % 3 == 0:
            integrals += 1
            broken += second_integrals(case, found) + second_delays(case, found)
        count += 1
    print(f"{count} cases: {plain} delay laws, {amplitudes} amplitudes, {integrals} integrals and "
          f"delays by second routes, {broken} broken")
    return 1 if broken else 0
