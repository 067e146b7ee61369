"""The stacks of optics_reference.py; each generator yields (case, places of weights or None)."""
import random

from mpmath import mp, mpc, mpf

from optics_reference_model import Waves

WAVELENGTH = 1064e-9
HIGH, LOW, GLASS = 1.89, 1.46, 1.45


def quarter(index, wavelength=WAVELENGTH):
    return wavelength / (4 * index)


def alternating(count, first=HIGH, second=LOW, extinction=0.0, jitter_seed=None):
    """Quarter-wave layers; `extinction` in the denser ones; optional thickness jitter of 5 %."""
    dice = random.Random(jitter_seed)
    layers = []
    for j in range(count):
        index = second if j % 2 else first
        stretch = 1 + 0.05 * (2 * dice.random() - 1) if jitter_seed is not None else 1.0
        k = extinction if index == max(first, second) else 0.0
        layers.append([index, k, quarter(index) * stretch])
    return layers


def radians(degrees):
    return float(mp.radians(degrees))  # rounded once, not by the C library of the day


def described(name, layers, wavelength=WAVELENGTH, substrate=(GLASS, 0.0), incident=1.0, degrees=0,
              angle=None, polarisation="s", places=None):
    case = {"name": name, "wavelength_m": wavelength,
            "angle_rad": radians(degrees) if angle is None else angle,
            "polarisation": polarisation, "incident_index": incident,
            "substrate_index": list(substrate), "layers": layers}
    return case, places


def spread(layers, p12_first=0.17, p12_second=0.27):
    """Five places for weights: in the first layers, at an interface, without photoelasticity."""
    last = len(layers) - 1
    return [(0, 0.0, p12_first), (0, 0.375, p12_first), (min(1, last), 1.0, p12_second),
            (min(4, last), 0.5, 0.0), (min(last, 7), 0.8125, -0.11)]


def mirror_cases():
    for factor in (0.9, 0.925, 0.95, 0.98, 1.0, 1.03, 1.06, 1.09, 1.15, 1.25):
        layers = alternating(60, jitter_seed=1)
        yield described(f"mirror 60 layers, wavelength factor {factor}", layers,
                        wavelength=factor * WAVELENGTH,
                        places=spread(layers) if factor in (1.0, 1.15) else None)
    yield described("mirror 60 layers, p light at normal incidence", alternating(60, jitter_seed=1),
                    polarisation="p")
    for k in (1e-9, 1e-7, 1e-6, 1e-4):
        for factor in (1.0, 1.06, 1.15):
            layers = alternating(60, extinction=k, jitter_seed=1)
            yield described(f"absorbing mirror 60 layers, k {k}, wavelength factor {factor}",
                            layers, wavelength=factor * WAVELENGTH,
                            places=spread(layers) if (k, factor) == (1e-4, 1.06) else None)
    for count in (20, 30, 36, 40):
        for name, pair in (("high", (2.07, 1.45)), ("low", (1.45, 2.07))):
            layers = alternating(count, *pair)
            yield described(f"quarter-wave {count} layers, {name} index outermost", layers,
                            places=spread(layers) if count == 30 else None)
    yield described("quarter-wave 41 layers, high index outermost", alternating(41, 2.07, 1.45))


def metal_cases():
    shallow = [(0, f, p12) for f, p12 in ((0, 0.05), (1e-3, 0.05), (4e-3, 0.0), (0.01, -0.2),
                                          (0.04, 0.05))]
    for k, n in ((6.7, 0.2), (12.0, 1.5)):
        for position, at in (("top", 0), ("middle", 10), ("bottom", 20)):
            layers = alternating(20, jitter_seed=2)
            layers.insert(at, [n, k, 10e-6])
            yield described(f"metal 10 um, k {k}, {position} of 20 layers", layers,
                            places=shallow if (k, at) == (6.7, 0) else None)
            yield described(f"metal 10 um, k {k}, {position} of 20 layers, 50 degrees p", layers,
                            degrees=50, polarisation="p")
    for thickness in (0.02e-6, 0.1e-6, 0.5e-6, 1e-6, 3e-6):
        for k, n in ((6.7, 0.2), (12.0, 1.5)):
            metal = [[n, k, thickness]]
            tag = f"metal {thickness * 1e6:g} um, k {k}"
            yield described(f"{tag}, alone", metal, wavelength=8e-7)
            stack = alternating(8, jitter_seed=3) + metal + alternating(8, jitter_seed=4)
            yield described(f"{tag}, inside 16 layers", stack, wavelength=8e-7)
    layers = alternating(20, jitter_seed=2)
    for polarisation in "sp":
        yield described(f"metal substrate, 20 layers, 45 degrees {polarisation}", layers,
                        substrate=(0.2, 6.7), degrees=45, polarisation=polarisation)
    yield described("metal substrate, 20 layers", layers, substrate=(0.2, 6.7),
                    places=spread(layers))
    yield described("absorbing substrate, 20 layers", layers, substrate=(3.5, 0.05))
    yield described("absorbing substrate, 20 layers, 60 degrees p", layers, substrate=(3.5, 0.05),
                    degrees=60, polarisation="p")


def oblique_cases():
    for degrees in (30, 45, 60, 80):
        for polarisation in "sp":
            for k in (0.0, 1e-5):
                for factor in (1.0, 0.85):
                    yield described(
                        f"40 layers, {degrees} degrees {polarisation}, k {k}, factor {factor}",
                        alternating(40, 2.07, 1.45, extinction=k, jitter_seed=5), degrees=degrees,
                        polarisation=polarisation, wavelength=factor * WAVELENGTH)
    layers = alternating(30, 2.07, 1.45, extinction=1e-6, jitter_seed=6)
    yield described("glass incident medium, 30 layers", layers, incident=1.45,
                    places=spread(layers))
    for polarisation in "sp":
        yield described(f"glass incident medium, 30 layers, 35 degrees {polarisation}", layers,
                        incident=1.45, degrees=35, polarisation=polarisation)


def evanescent_cases():
    for polarisation in "sp":
        for gap in (0.05e-6, 0.2e-6, 0.5e-6, 1e-6, 2e-6, 4e-6, 20e-6):
            yield described(f"frustrated total reflection, gap {gap * 1e6:g} um, {polarisation}",
                            [[1.0, 0.0, gap]], incident=1.45, substrate=(1.75, 0.0), degrees=60,
                            polarisation=polarisation)
        coupler = [[2.07, 0.0, 0.11e-6], [1.0, 0.0, 0.4e-6], [2.07, 1e-6, 0.3e-6],
                   [1.0, 0.0, 0.4e-6], [2.07, 0.0, 0.11e-6]]
        yield described(f"two gaps around a guide, 60 degrees {polarisation}", coupler,
                        incident=1.45, degrees=60, polarisation=polarisation)
        angle = radians(45)
        critical = float(mpf(1.45) * mp.sin(mpf(angle)))
        for offset in (0.0, 1e-15, -1e-15, 1e-12, -1e-12, 1e-8, -1e-8, 1e-4, -1e-4):
            layer = [critical * (1 + offset), 0.0, 0.7e-6]
            yield described(f"critical angle, relative offset {offset}, {polarisation}", [layer],
                            incident=1.45, substrate=(1.5, 0.0), angle=angle,
                            polarisation=polarisation)
        for k in (0.0, 1e-9, 1e-3):
            stack = alternating(12, 2.07, 1.45, jitter_seed=7)
            stack.insert(5, [critical, k, 0.3e-6])
            yield described(f"critical layer in 12 layers, k {k}, {polarisation}", stack,
                            incident=1.45, angle=angle, polarisation=polarisation)


def cavity_cases():
    mirror = alternating(41, 1.98, 1.45)
    spacer = [1.45, 0.0, 4.05 * WAVELENGTH / (2 * 1.45)]
    complexed = [(mpc(n, k), d) for n, k, d in mirror]

    def mismatch(wavelength):  # phase of one round trip in the spacer, modulo 2 pi
        trip = Waves(wavelength, 1.45, [(mpc(1.45), spacer[2])] + complexed, mpc(GLASS))
        back = Waves(wavelength, 1.45, complexed, mpc(1.0))
        return mp.log(trip.reflection() * back.reflection()).imag

    with mp.workdps(40):
        resonance = mp.findroot(mismatch, (mpf(WAVELENGTH), mpf(WAVELENGTH) * 1.005), tol=1e-30)
        resonance = float(resonance)
    for name, wavelength in (("at resonance", resonance),
                             ("on the flank", resonance * (1 + 1.5e-7)),
                             ("far from resonance", resonance * (1 + 1e-3))):
        yield described(f"cavity 41 + spacer + 41 layers, {name}", mirror + [spacer] + mirror,
                        wavelength=wavelength)


def small_cases():
    for degrees, polarisation in ((0, "s"), (40, "s"), (40, "p"), (75, "p")):
        yield described(f"bare interface, {degrees} degrees {polarisation}", [], degrees=degrees,
                        polarisation=polarisation)
    yield described("bare interface, metal, 70 degrees p", [], substrate=(0.2, 6.7), degrees=70,
                    polarisation="p")
    yield described("bare interface, glass incident medium", [], incident=1.45,
                    substrate=(3.5, 0.0))
    for degrees, polarisation in ((0, "s"), (55, "s"), (55, "p")):
        for k in (0.0, 1e-3):
            layers = [[2.2, k, 0.7e-6]]
            places = [(0, f, 0.2) for f in (0.0, 0.25, 0.5, 0.75, 1.0)]
            yield described(f"slab, k {k}, {degrees} degrees {polarisation}", layers,
                            substrate=(1.0, 0.0), degrees=degrees, polarisation=polarisation,
                            places=places if degrees == 0 and k > 0 else None)
    yield described("half-wave absentee layer", [[2.07, 0.0, WAVELENGTH / (2 * 2.07)]])
    yield described("layer of zero thickness", [[2.07, 0.0, 0.0]])
    yield described("antireflection quarter-wave layer", [[1.21, 0.0, quarter(1.21)]],
                    wavelength=1070e-9)


def all_cases():
    for group in (mirror_cases, metal_cases, oblique_cases, evanescent_cases, cavity_cases,
                  small_cases):
        yield from group()
