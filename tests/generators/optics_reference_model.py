"""Fresnel interfaces and free flights in mp numbers: the model behind optics_reference.py.

The scalar wave u is E_y for s light and H_y for p light. The reflection coefficient of everything
below a plane is carried upwards, then the forward wave downwards; only decaying exponentials occur.
Conventions and the derivation of the weights: see optics_reference.py.
"""
from functools import lru_cache

from mpmath import mp, mpc, mpf

LIGHT_SPEED = 299792458  # [m/s], exact


class Waves:
    """Wavenumbers along z and interface coefficients of one stack, in mp numbers.

    Notation: k0 vacuum wavenumber, beta = n0 sin(angle), q_j wavenumber along z, m_j = 1 (s) or
    n_j^2 (p): u and u'/m are continuous, so an interface reflects
    rho = (q/m - q'/m')/(q/m + q'/m').
    """

    def __init__(self, wavelength, incident, layers, substrate, angle=0, polarisation="s"):
        self.k0 = 2 * mp.pi / mpf(wavelength)
        self.beta = mpf(incident) * mp.sin(mpf(angle))
        self.electric = polarisation == "s"
        squares = [mpc(incident) ** 2] + [mpc(n) ** 2 for n, _ in layers] + [mpc(substrate) ** 2]
        self.squares = squares
        self.thickness = [mpf(0)] + [mpf(d) for _, d in layers]
        root = lru_cache(None)(lambda square: self.k0 * mp.sqrt(square - self.beta ** 2))
        self.q = [root(square) for square in squares]
        # The incident wave has a cosine of its own: no square root of 1 - sin^2 is needed.
        self.q[0] = mpc(self.k0 * mpf(incident) * mp.cos(mpf(angle)))
        self.ratio = [q if self.electric else q / square for q, square in zip(self.q, squares)]
        fresnel = lru_cache(None)(lambda above, below: (above - below) / (above + below))
        self.rho = [fresnel(*pair) for pair in zip(self.ratio, self.ratio[1:])]
        flight = lru_cache(None)(lambda q, d: mp.exp(mpc(0, 1) * q * d))
        self.flight = [flight(q, d) for q, d in zip(self.q, self.thickness)]

    def reflections(self):
        """u backward / u forward just below the top of each medium, 0 for the substrate."""
        below = [mpc(0)]
        for rho, flight in zip(reversed(self.rho), reversed(self.flight)):
            below.append(flight ** 2 * (rho + below[-1]) / (1 + rho * below[-1]))
        return below[::-1]

    def reflection(self):
        return self.reflections()[0] if self.electric else -self.reflections()[0]


def reflection_derivatives(waves):
    """Reflection of u, its first and second derivative by x, and d ln(transmission of u)/dx.

    x scales the frequency, omega (1 + x): every phase iqd is proportional to 1 + x.
    """
    value, first, second, log_transmission = mpc(0), mpc(0), mpc(0), mpc(0)
    for rho, flight, q, d in zip(reversed(waves.rho), reversed(waves.flight),
                                 reversed(waves.q[:-1]), reversed(waves.thickness)):
        denominator = 1 + rho * value
        phase = mpc(0, 1) * q * d
        log_transmission += phase - rho * first / denominator
        slope = (1 - rho ** 2) / denominator ** 2
        value, first, second = ((rho + value) / denominator, slope * first,
                                slope * (second - 2 * rho * first ** 2 / denominator))
        twice, trip = 2 * phase, flight ** 2
        value, first, second = (trip * value, trip * (first + twice * value),
                                trip * (second + 2 * twice * first + twice ** 2 * value))
    return value, first, second, log_transmission


def layer_integrals(q, d, forward, backward):
    """Integrals of |u|^2 and |u'|^2 over u = forward e^{iqz} + backward e^{iq(d-z)}."""
    decay = d if q.imag == 0 else (1 - mp.exp(-2 * q.imag * d)) / (2 * q.imag)
    beat = d if q.real == 0 else mp.sin(q.real * d) / q.real
    single = (abs(forward) ** 2 + abs(backward) ** 2) * decay
    cross = 2 * mp.re(forward * mp.conj(backward)) * mp.exp(-q.imag * d) * beat
    return single + cross, abs(q) ** 2 * (single - cross)


def layer_powers(waves):
    """Absorptance and stored energy [J/W] of each layer, and the transmittance.

    Units with eps0 = mu0 = 1/c: the incident Poynting component is Re(q/m)/(2 k0).
    """
    below = waves.reflections()
    incident = waves.ratio[0].real / (2 * waves.k0)
    absorptance, energy = [], []
    forward = mpc(1)
    for j, (rho, flight) in enumerate(zip(waves.rho, waves.flight)):
        if j > 0:
            square, d = waves.squares[j], waves.thickness[j]
            backward = forward * below[j] / flight  # at the bottom of the layer
            field, slope = layer_integrals(waves.q[j], d, forward, backward)
            slope /= waves.k0 ** 2
            lateral = waves.beta ** 2 * field
            if waves.electric:
                electric, magnetic = field, slope + lateral
            else:
                electric, magnetic = (slope + lateral) / abs(square) ** 2, field
            absorptance.append(waves.k0 * square.imag * electric / (2 * incident))
            energy.append((square.real * electric + magnetic) / (4 * LIGHT_SPEED * incident))
        forward *= flight * (1 + rho) / (1 + rho * below[j + 1])
    return absorptance, energy, abs(forward) ** 2 * waves.ratio[-1].real / waves.ratio[0].real


def waves_of(case):
    layers = [(mpc(n, k), d) for n, k, d in case["layers"]]
    return Waves(case["wavelength_m"], case["incident_index"], layers,
                 mpc(*case["substrate_index"]), case["angle_rad"], case["polarisation"])


def results(case):
    """All results of a case; more digits where 1 - R is small."""
    waves = waves_of(case)
    value, first, second, log_transmission = reflection_derivatives(waves)
    absorptance, energy, transmittance = layer_powers(waves)
    lost = 1 - abs(value) ** 2
    smallest = max(transmittance + sum(absorptance), mpf(10) ** -400)
    if smallest < mpf(10) ** (45 - mp.dps):
        with mp.workdps(60 - int(mp.log10(smallest))):
            return results(case)
    reflection = value if waves.electric else -value
    omega = waves.k0 * LIGHT_SPEED
    ratio = first / value
    return {"reflection": [reflection.real, reflection.imag],
            "log_transmittance": mp.log(transmittance), "transmittance": transmittance,
            "absorptance": absorptance, "reflectance": abs(value) ** 2,
            "one_minus_reflectance": lost, "stored_energy_J_per_W": energy,
            "group_delay_s": ratio.imag / omega,
            "group_delay_dispersion_s2": mp.im(second / value - ratio ** 2) / omega ** 2,
            "transmitted_group_delay_s": log_transmission.imag / omega,
            "sensitivity_to_log_wavelength": abs(first)}


def weight(case, layer, depth, p12, strain):
    """Mixed central difference of xi by slice thickness and by x, see the head of this file."""
    n, k, thickness = case["layers"][layer]
    index, rest = mpc(n, k), mpf(thickness) - mpf(depth)
    others = [(mpc(a, b), d) for a, b, d in case["layers"]]
    start = waves_of(case).reflection()
    step, slice_step = mpf(10) ** -20, mpf(10) ** -20 * mpf(thickness)
    k0 = 2 * mp.pi / mpf(case["wavelength_m"])

    def xi(slice_thickness, x):
        stretched = slice_thickness * (1 + x) if strain else slice_thickness
        changed = index - index ** 3 * mpf(p12) * x / 2 if strain else index + x
        pieces = [(index, mpf(depth)), (changed, stretched), (index, rest - slice_thickness)]
        stack = others[:layer] + pieces + others[layer + 1:]
        waves = Waves(case["wavelength_m"], case["incident_index"], stack,
                      mpc(*case["substrate_index"]))
        turned = mp.log(waves.reflection() / start).imag
        return stretched - slice_thickness - turned / (2 * mpf(case["incident_index"]) * k0)

    corners = [a * b * xi(a * slice_step, b * step) for a in (1, -1) for b in (1, -1)]
    return sum(corners) / (4 * slice_step * step)


def weights(case, places):
    """Five depths: (layer, fraction of its thickness, p12)."""
    block = []
    with mp.workdps(120):
        for layer, fraction, p12 in places:
            depth = fraction * case["layers"][layer][2]
            above = sum((mpf(d) for _, _, d in case["layers"][:layer]), mpf(0))
            block.append({"layer": layer, "depth_in_layer_m": depth, "p12": p12,
                          "depth_m": above + mpf(depth),
                          "index_weight": weight(case, layer, depth, p12, False),
                          "strain_weight": weight(case, layer, depth, p12, True)})
    return block
