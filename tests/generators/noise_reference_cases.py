"""Inputs of noise_reference.py: plain SI numbers. Materials are round demonstration values.

A layer is [n, k, d, E, nu, alpha, beta, kappa, C, p11, p12], listed from the light side; beta is
dn/dT at zero stress.
"""

LAYER_COLUMNS = ["index", "extinction", "thickness_m", "youngs_modulus_Pa", "poisson_ratio",
                 "expansion_per_K", "index_slope_per_K", "conductivity_W_per_mK",
                 "heat_capacity_J_per_m3K", "p11", "p12"]
FREQUENCIES = [0.1, 1.0, 10.0, 100.0, 1000.0, 10000.0, 100000.0]
RADII = [0.06, 250e-6]
CERDONIO_PARAMETERS = [1e-4, 0.01, 0.1, 1.0, 10.0, 100.0, 1e4, 1e6]
THICKNESS_FACTORS = [(0.01, 1.3, 1.5), (1.5, 0.7, 2.0), (3.0, 2.3, -0.5), (12.0, 0.4, 0.3),
                     (40.0, 5.0, 1.2)]  # (ξ, R, elastic share)


def substrate(index, youngs, poisson, expansion, conductivity, capacity, extinction=0.0):
    return {"index": index, "extinction": extinction, "youngs_modulus_Pa": youngs,
            "poisson_ratio": poisson, "expansion_per_K": expansion,
            "conductivity_W_per_mK": conductivity, "heat_capacity_J_per_m3K": capacity}


SILICA = substrate(1.45, 72e9, 0.17, 5.1e-7, 1.38, 1.64e6)
SILICON = substrate(3.48, 187.5e9, 0.26, 2.6e-6, 148.0, 1.66e6)
SAPPHIRE = substrate(1.75, 400e9, 0.23, 5.0e-6, 40.0, 3.16e6)


def film(index, extinction, thickness, elastic, thermal, photoelastic=(0.0, 0.0)):
    return [index, extinction, thickness, *elastic, *thermal, *photoelastic]


def low(thickness):
    return film(1.45, 0.0, thickness, (72e9, 0.17), (5.1e-7, 8e-6, 1.38, 1.64e6))


def high(thickness):
    return film(2.07, 0.0, thickness, (140e9, 0.23), (3.6e-6, 1.4e-5, 33.0, 2.1e6))


def quarter_wave_pairs(first, second, pairs):
    return [make(1064e-9 / (4 * make(0.0)[0])) for _ in range(pairs) for make in (first, second)]


def unequal():
    soft = ((60e9, 0.2), (1.2e-6, -2.5e-5, 0.85, 1.9e6))
    stiff = ((240e9, 0.28), (6.4e-6, 1.1e-4, 12.0, 2.6e6))
    crystal = ((88e9, 0.31), (5.2e-6, 2.1e-4, 62.0, 1.75e6))
    plan = [(1.46, 311e-9, soft), (2.19, 128.5e-9, stiff), (1.46, 402e-9, soft),
            (3.05, 97e-9, crystal), (2.19, 233e-9, stiff), (1.46, 187e-9, soft),
            (3.05, 163e-9, crystal), (1.46, 288e-9, soft), (2.19, 151e-9, stiff)]
    return [film(n, 0.0, d, elastic, thermal) for n, d, (elastic, thermal) in plan]


def absorbing():
    layers = []
    for j in range(6):
        layers.append(film(2.11, 1e-3, (118 + 3 * j) * 1e-9, (131e9, 0.25),
                           (3.1e-6, 2.4e-5, 4.0, 2.2e6), (0.09, 0.17)))
        layers.append(film(1.447, 1e-3, (190 - 4 * j) * 1e-9, (70e9, 0.19),
                           (6.0e-7, 9e-6, 1.2, 1.6e6), (0.121, 0.27)))
    return layers


def thick():
    return [film(2.2, 0.0, 20e-6, (175e9, 0.27), (2.7e-6, 3.2e-5, 2.3, 2.8e6))]


def immersed():
    layers = []
    for j in range(4):
        layers.append(film(2.35, 2e-5, (95 + 11 * j) * 1e-9, (105e9, 0.26),
                           (2.2e-6, 6e-5, 7.5, 3.0e6), (-0.01, 0.16)))
        layers.append(film(1.38, 0.0, (210 - 9 * j) * 1e-9, (138e9, 0.28),
                           (1.1e-5, 1e-6, 21.0, 3.1e6)))
    return layers


def stacks():
    """(name, layers, substrate, wavelength, incident index, temperature)."""
    return [
        ("quarter-wave-high-index-outermost", quarter_wave_pairs(high, low, 19), SILICA, 1064e-9,
         1.0, 300.0),
        ("quarter-wave-low-index-outermost", quarter_wave_pairs(low, high, 19), SILICA, 1064e-9,
         1.0, 300.0),
        ("unequal-layers-on-silicon", unequal(), SILICON, 1550e-9, 1.0, 295.0),
        ("absorbing-photoelastic-layers", absorbing(), SILICA, 1064e-9, 1.0, 300.0),
        ("thick-film-on-sapphire", thick(), SAPPHIRE, 1064e-9, 1.0, 300.0),
        ("layers-below-glass", immersed(), SILICA, 852e-9, 1.449, 310.0),
        ("no-layers-silica", [], SILICA, 1064e-9, 1.0, 300.0),
        ("no-layers-silicon", [], SILICON, 1550e-9, 1.0, 295.0),
    ]


def base_case(name, layers, below, wavelength, incident, temperature, radius):
    return {"name": name, "wavelength_m": wavelength, "incident_index": incident, "layers": layers,
            "substrate": below, "temperature_K": temperature, "beam_radius_m": radius}


def thermal_cases():
    return [base_case(*stack, radius) | {"frequencies_Hz": FREQUENCIES}
            for stack in stacks() for radius in RADII]


def brownian_cases():
    """Coatings with losses (bulk, shear) per layer."""
    cases = []

    def add(stack, radius, losses, label):
        base = base_case(*stack, radius)
        base["name"] += "-" + label
        base["loss_bulk"] = [losses(layer, j)[0] for j, layer in enumerate(stack[1])]
        base["loss_shear"] = [losses(layer, j)[1] for j, layer in enumerate(stack[1])]
        cases.append(base | {"frequencies_Hz": [100.0]})

    def equal(layer, _):
        return (4e-5, 4e-5) if layer[0] < 1.8 else (2.3e-4, 2.3e-4)

    def unlike(layer, j):
        return (5.3e-4 + 1e-5 * j, 1.1e-4) if layer[0] > 1.8 else (2.5e-5, 6.1e-5 + 1e-6 * j)

    by_name = {stack[0]: stack for stack in stacks()}
    high_out, low_out = (by_name[f"quarter-wave-{end}-index-outermost"] for end in ("high", "low"))
    add(high_out, 0.06, equal, "equal-losses")
    add(low_out, 0.06, equal, "equal-losses")
    add(high_out, 0.06, unlike, "unlike-losses")
    for name in ("unequal-layers-on-silicon", "absorbing-photoelastic-layers",
                 "thick-film-on-sapphire", "layers-below-glass"):
        add(by_name[name], 250e-6, unlike, "unlike-losses")
    cold = list(by_name["absorbing-photoelastic-layers"])
    cold[0], cold[2], cold[5] = "absorbing-photoelastic-layers-on-silicon", SILICON, 124.0
    add(cold, 0.09, unlike, "unlike-losses")
    alike = film(1.45, 0.0, 7e-6, (72e9, 0.17), (5.1e-7, 8e-6, 1.38, 1.64e6))
    vacuum = (1064e-9, 1.0, 300.0)
    add(("film-equal-to-substrate", [alike], SILICA, *vacuum), 0.06, equal, "equal-losses")
    auxetic = substrate(1.5, 35e9, -0.12, 1e-6, 1.0, 2e6)
    strange = film(2.0, 0.0, 350e-9, (410e9, 0.44), (1e-6, 1e-5, 1.0, 2e6))
    add(("stiff-film-on-auxetic-base", [strange], auxetic, *vacuum), 0.02, unlike, "unlike-losses")
    return cases


def classic_cases():
    """Coatings without photoelasticity for the closed form of thermo-optic noise."""
    chosen = ("quarter-wave-high-index-outermost", "quarter-wave-low-index-outermost",
              "unequal-layers-on-silicon", "thick-film-on-sapphire")
    return [base_case(*stack, radius) | {"frequencies_Hz": FREQUENCIES}
            for stack in stacks() if stack[0] in chosen for radius in RADII]


def substrate_brownian_cases():
    """(name, substrate, beam radius, temperature, frequency, loss in bulk, loss in shear)."""
    return [
        ("silica-small-beam", SILICA | {"youngs_modulus_Pa": 73e9}, 0.02, 300.0, 100.0, 1e-6, 1e-6),
        ("silica-large-beam", SILICA, 0.06, 300.0, 100.0, 5e-9, 5e-9),
        ("silicon-unlike-losses", SILICON, 0.09, 124.0, 10.0, 1e-9, 7e-9),
        ("sapphire-unlike-losses", SAPPHIRE, 250e-6, 4.0, 1.0, 3e-8, 2e-9),
    ]


def transmission_cases():
    """(name, substrate, index slope, path length, wavelength, beam radius, temperature)."""
    return [
        ("silica-plate-large-beam", SILICA, 8.6e-6, 0.2, 1064e-9, 0.06, 300.0),
        ("silica-plate-small-beam", SILICA, 8.6e-6, 6.35e-3, 1064e-9, 250e-6, 300.0),
        ("silicon-plate", SILICON, 1.8e-4, 0.1, 1550e-9, 0.05, 295.0),
    ]
