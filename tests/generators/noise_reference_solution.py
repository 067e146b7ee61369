"""Numerical solutions behind noise_reference.py: elasticity, wave optics, heat flow.

No closed formula of a noise article is used here; every quantity is found by solving its field
equation numerically. z points into the mirror, time factor e^{-iωt} in the optics, e^{+iωt} in the
heat equation, w is the 1/e² intensity radius, spectra are one-sided.
"""

import functools

import mpmath as mp
import numpy as np

BOLTZMANN = 1.380649e-23  # [J/K], exact


# --- Elasticity -----------------------------------------------------------------------------------


def lame(youngs, poisson):
    return youngs * poisson / ((1 + poisson) * (1 - 2 * poisson)), youngs / (2 * (1 + poisson))


def half_space_wave(youngs, poisson, pressure, shear):
    """Coefficients (a, b, c, e) of u = (iU, W)e^{ix}, U = (a+bz)e^{-z}, W = (c+ez)e^{-z}, k = 1/m.

    Equilibrium along x in both powers of z, σ_zz(0) = -pressure, σ_xz(0) = i·shear.
    """
    lam, mu = lame(youngs, poisson)
    rows = [
        [-(lam + mu), -2 * mu, -(lam + mu), lam + mu],  # z⁰ of λ(W'-U) - 2μU + μ(U''+W') = 0
        [0, 1, 0, 1],                                   # z¹ of the same
        [-lam, 0, -(lam + 2 * mu), lam + 2 * mu],       # σ_zz(0)
        [-mu, mu, mu, 0],                               # σ_xz(0)/i
    ]
    scaled = np.array(rows, float)
    scaled[[0, 2, 3]] /= mu
    return np.linalg.solve(scaled, np.array([0, 0, -pressure, shear], float) / mu)


def face_dilatation(substrate):
    """In-plane dilatation of the face per unit pull [1/Pa]; independent of the wavenumber."""
    youngs, poisson = substrate["youngs_modulus_Pa"], substrate["poisson_ratio"]
    return half_space_wave(youngs, poisson, 1.0, 0.0)[0]


def half_space_energies(substrate, beam_radius):
    """(bulk, shear) energy of a half-space under a Gaussian pressure, per squared force [J/N²]."""
    youngs, poisson = substrate["youngs_modulus_Pa"], substrate["poisson_ratio"]
    lam, mu = lame(youngs, poisson)
    a, b, c, e = half_space_wave(youngs, poisson, 1.0, 0.0)
    node, weight = np.polynomial.laguerre.laggauss(8)  # exact: polynomials times e^{-2z}
    z, weight = node / 2, weight / 2
    shrink = -(a + b * z)                              # ε_xx, ε_zz, ε_xz/i without e^{-z}
    along = e - c - e * z
    slide = (b - a - b * z + c + e * z) / 2
    theta = shrink + along
    squares = (shrink - theta / 3) ** 2 + (along - theta / 3) ** 2 + (theta / 3) ** 2 + 2 * slide**2
    bulk = np.sum(weight * (lam + 2 * mu / 3) * theta**2) / 2
    shear = np.sum(weight * mu * squares)
    # A unit wave stores this energy density times 1/k; Parseval: ∫(k dk/2π) e^{-k²w²/4}/k.
    scale = float(mp.quad(lambda x: mp.exp(-x * x / 4), [0, 4, 16, 40]) / (2 * mp.pi)) / beam_radius
    return bulk * scale, shear * scale


def layer_energies(layer, substrate, beam_radius, depth_weights, strain_weights):
    """(bulk, shear) energy of one layer per squared force [J/N²], from the strain at every point.

    The substrate's face imposes ε_rr(r), ε_θθ(r) of a Gaussian pressure p(r); σ_zz = -p(r) g(z).
    """
    lam, mu = lame(layer[3], layer[4])
    node, weight = np.polynomial.legendre.leggauss(160)
    near, tail = 3 * (node + 1), (node + 1) / 2
    radius = beam_radius * np.concatenate([near, 6 / tail])
    measure = beam_radius * np.concatenate([3 * weight, 3 / tail**2 * weight]) * 2 * np.pi * radius
    ratio = radius / beam_radius
    pressure = 2 / (np.pi * beam_radius**2) * np.exp(-2 * ratio**2)
    enclosed = -np.expm1(-2 * ratio**2) / (2 * np.pi * radius**2)  # ∫p r dr / r²
    eta = face_dilatation(substrate)
    hoop = -eta * enclosed
    radial = -eta * (pressure - enclosed)
    stress = -pressure[:, None] * np.asarray(strain_weights)[None, :]
    normal = (stress - lam * (radial + hoop)[:, None]) / (lam + 2 * mu)
    strain = np.stack(np.broadcast_arrays(radial[:, None], hoop[:, None], normal))
    theta = strain.sum(axis=0)
    deviator = strain - theta / 3
    bulk = (lam + 2 * mu / 3) / 2 * theta**2
    shear = mu * (deviator**2).sum(axis=0)
    return measure @ bulk @ depth_weights, measure @ shear @ depth_weights


def expansion_lengths(layer, substrate):
    """Motion of the face per kelvin and metre of layer: (own thickness, bulge of the substrate).

    Forward: a layer that may not widen grows in thickness and pushes sideways; the sideways force,
    varying along the face as e^{ikx}, drags the substrate's face and lifts it.
    """
    youngs, poisson, alpha = layer[3:6]
    lam, mu = lame(youngs, poisson)
    # Unknown ε_zz and σ_∥ of the layer with ε_xx = ε_yy = 0, σ_zz = 0 at 1 K.
    thermal = (3 * lam + 2 * mu) * alpha
    own, membrane = np.linalg.solve([[lam + 2 * mu, 0], [lam, -1]], [thermal, thermal])
    base = substrate["youngs_modulus_Pa"], substrate["poisson_ratio"]
    wave = half_space_wave(*base, 0.0, -membrane)
    return own, -wave[2]


def substrate_source(substrate, steepness=2.7):
    """q_s of the face's motion ∫ q_s e^{-kz} Θ dz, from the stress of Θ = e^{-qz} at k = 1."""
    youngs, poisson = substrate["youngs_modulus_Pa"], substrate["poisson_ratio"]
    mu = lame(youngs, poisson)[1]
    q = steepness
    potential = substrate["expansion_per_K"] * (1 + poisson) / (1 - poisson) / (q * q - 1)
    wave = half_space_wave(youngs, poisson, 2 * mu * potential, 2 * mu * q * potential)
    return (q * potential - wave[2]) * (q + 1)


# --- Optics ---------------------------------------------------------------------------------------


def interface(above, below):
    """Forward and backward amplitudes just above an interface from those just below it."""
    total, change = (above + below) / (2 * above), (above - below) / (2 * above)
    return mp.matrix([[total, change], [change, total]])


def propagation(phase):
    """Amplitudes at the top of a slab from those at its bottom."""
    return mp.matrix([[mp.expj(-phase), 0], [0, mp.expj(phase)]])


def indices(case):
    end = case["substrate"]
    inside = [mp.mpc(layer[0], layer[1]) for layer in case["layers"]]
    return [mp.mpc(case["incident_index"])] + inside + [mp.mpc(end["index"], end["extinction"])]


def reflection(wavelength, index, thickness):
    """Amplitude reflection coefficient referred to the face."""
    amplitude = mp.matrix([1, 0])
    for j in range(len(index) - 2, -1, -1):
        amplitude = interface(index[j], index[j + 1]) * amplitude
        if j > 0:
            phase = 2 * mp.pi * index[j] * thickness[j - 1] / wavelength
            amplitude = propagation(phase) * amplitude
    return amplitude[1] / amplitude[0]


def readout_weights(case, points):
    """g(z), h(z) at relative depths `points` of every layer: the chain of wave matrices, perturbed.

    Stretching a slice adds phase, an index change couples the two waves; δr follows from the
    matrices above and the amplitudes below. Photoelasticity: δn = -(n³/2) p12 ε_zz, n complex.
    """
    index = indices(case)
    layers, count = case["layers"], len(case["layers"])
    k0 = 2 * mp.pi / mp.mpf(case["wavelength_m"])
    bottom = [None] * (count + 1)  # amplitudes at the bottom of each layer
    amplitude = mp.matrix([1, 0])
    for j in range(count, -1, -1):
        bottom[j] = interface(index[j], index[j + 1]) * amplitude
        if j > 0:
            amplitude = propagation(k0 * index[j] * layers[j - 1][2]) * bottom[j]
    amplitude = bottom[0]
    incident, r = amplitude[0], amplitude[1] / amplitude[0]
    above, stretch, change = mp.eye(2), [], []
    for j in range(1, count + 1):
        above = above * interface(index[j - 1], index[j])
        phase = k0 * index[j] * layers[j - 1][2]
        rows = ([], [])
        for s in points[j - 1]:
            field = propagation(phase * (1 - s)) * bottom[j]
            chain = above * propagation(phase * s)
            grow = mp.mpc(0, 1) * k0 * index[j] * mp.matrix([field[0], -field[1]])
            couple = mp.mpc(0, 1) * k0 * (field[0] + field[1]) * mp.matrix([1, -1])
            for row, slope in zip(rows, (grow, couple)):
                moved = -(chain * slope)
                row.append((moved[1] - r * moved[0]) / incident / r)
        above = above * propagation(phase)
        elastic_optic = -index[j] ** 3 / 2 * layers[j - 1][10]
        scale = 2 * mp.mpf(case["incident_index"]) * k0
        both = [a + elastic_optic * b for a, b in zip(*rows)]
        stretch.append(np.array([float(1 - mp.im(slope) / scale) for slope in both]))
        change.append(np.array([float(-mp.im(b) / scale) for b in rows[1]]))
    return stretch, change


def clamped_index_slope(layer):
    """dn/dT at fixed strain [1/K] from the value at zero stress, real part of the index."""
    return layer[6] + layer[0] ** 3 / 2 * (layer[9] + 2 * layer[10]) * layer[5]


# --- Heat flow ------------------------------------------------------------------------------------


@functools.lru_cache(maxsize=None)
def reference_element(order):
    """Gauss points and weights, hat functions, bubbles there, bubble masses μ_n, coupling ∫φ_i v_n.

    Bubbles are integrated Legendre polynomials, turned so that stiffness is the unit matrix and
    mass is diagonal; hats and bubbles have orthogonal gradients, so a uniform temperature conducts
    nothing, exactly.
    """
    point, weight = np.polynomial.legendre.leggauss(order + 8)
    values = np.polynomial.legendre.legvander(point, order + 1)
    n = np.arange(1, order)
    bubbles = (values[:, n + 1] - values[:, n - 1]) / np.sqrt(2 * (2 * n + 1))
    masses, turn = np.linalg.eigh(bubbles.T @ (weight[:, None] * bubbles))
    bubbles = bubbles @ turn
    hats = np.stack([(1 - point) / 2, (1 + point) / 2], axis=1)
    return point, weight, hats, bubbles, masses, bubbles.T @ (weight[:, None] * hats)


class HeatStack:
    """High-order finite elements (Galerkin) through the layers, joined by their end temperatures.

    The substrate is exact. Wavenumbers come as an array; the last axis of a result counts sources.
    """

    def __init__(self, conductivity, capacity, thickness, loads, order, substrate, source):
        self.conductivity, self.capacity = np.array(conductivity), np.array(capacity)
        self.thickness = np.array(thickness)
        self.end_loads, self.bubble_loads = loads  # (elements, 2 or order-1, sources): ∫ q φ dz
        self.order, self.source = order, np.array(source, float)
        self.kappa = substrate["conductivity_W_per_mK"]
        self.capacity_below = substrate["heat_capacity_J_per_m3K"]

    def solve(self, k, omega):
        """Temperatures of iωC Θ - (κΘ')' + κk²Θ = q.

        Returns (interfaces (k, elements+1, sources), drop across each element, bubble amplitudes).
        """
        _, _, _, _, masses, coupling = reference_element(self.order)
        stiff = 2 * self.conductivity / self.thickness
        decay = k[:, None] ** 2 + 1j * omega * self.capacity / self.conductivity
        tau = decay * self.thickness**2 / 4
        share = tau[..., None] / (1 + tau[..., None] * masses)  # (k, elements, bubbles)
        both = coupling.sum(axis=1)
        series = stiff * (0.5 - tau / 3 + tau * (share @ (coupling[:, 0] * coupling[:, 1])))
        shunt = (stiff * tau)[..., None] * (1 - share @ (coupling * both[:, None]))
        push = self.end_loads - np.einsum("keb,bi,ebs->keis", share, coupling, self.bubble_loads)
        count, sources = len(self.thickness), len(self.source)
        admittance, current = np.zeros((len(k), 1), complex), np.zeros((len(k), sources), complex)
        passed = []
        for e in range(count):  # downwards: everything above as one admittance and one heat current
            admittance, current = admittance + shunt[:, e, :1], current + push[:, e, 0]
            g = series[:, e, None]
            passed.append((admittance, current, g))
            admittance = g * admittance / (g + admittance) + shunt[:, e, 1:]
            current = g * current / (g + passed[-1][0]) + push[:, e, 1]
        gamma = self.decay(k, omega)
        face = (current + self.source / (gamma + k[:, None])) / (admittance + self.kappa * gamma)
        ends, drop = np.zeros((2, len(k), count + 1, sources), complex)
        ends[:, count] = face
        for e in range(count - 1, -1, -1):
            admittance, current, g = passed[e]
            drop[:, e] = (current - admittance * ends[:, e + 1]) / (g + admittance)
            ends[:, e] = ends[:, e + 1] + drop[:, e]
        bubbles = np.einsum("kes,b->kebs", ends[:, :-1], coupling[:, 0])
        bubbles += np.einsum("kes,b->kebs", ends[:, 1:], coupling[:, 1])
        free = self.bubble_loads / stiff[:, None, None] / (1 + tau[..., None] * masses)[..., None]
        return ends, drop[:, :count], free - share[..., None] * bubbles

    def decay(self, k, omega):
        return np.sqrt(k * k + 1j * omega * self.capacity_below / self.kappa)[:, None]

    def dissipation(self, k, omega):
        """Re ∫qΘ dz of every source, as the dissipation ∫κ(|Θ'|² + k²|Θ|²) dz: no cancellation."""
        if len(self.thickness) == 0:
            gamma = self.decay(k, omega)
            return self.below(k, omega, self.source / (self.kappa * gamma * (gamma + k[:, None])))
        ends, drop, bubbles = self.solve(k, omega)
        _, weight, hats, shapes, _, _ = reference_element(self.order)
        value = np.einsum("kes,p->keps", ends[:, :-1], hats[:, 0])
        value += np.einsum("kes,p->keps", ends[:, 1:], hats[:, 1]) + shapes @ bubbles
        inside = np.einsum("p,keps->kes", weight, np.abs(value) ** 2)
        half = self.thickness[:, None] / 2
        density = (np.abs(drop) ** 2 / 2 + (np.abs(bubbles) ** 2).sum(axis=2)) / half
        density += half * (k * k)[:, None, None] * inside
        inside = np.einsum("e,kes->ks", self.conductivity, density)
        return inside + self.below(k, omega, ends[:, -1])

    def below(self, k, omega, face):
        """Dissipation in the substrate whose face has the complex temperatures `face`."""
        gamma, k = self.decay(k, omega), k[:, None]
        rate, total = gamma.real, k + gamma
        # Θ = A e^{-kz} + B e^{-γz}: without loss of digits where diffusion is slow, |γ| > 3k.
        a = self.source / (1j * omega * self.capacity_below)
        b = face - a
        cross = a * np.conj(b) / np.conj(total)
        value = abs(a) ** 2 / (2 * k) + 2 * cross.real + abs(b) ** 2 / (2 * rate)
        slope = k * abs(a) ** 2 / 2 + 2 * (k * np.conj(gamma) * cross).real
        slope = slope + abs(gamma * b) ** 2 / (2 * rate)
        slow = slope + k * k * value
        # Θ = A (e^{-kz} - e^{-γz}) + face e^{-γz}, A(γ-k) = a: for γ → k, where A has no bound.
        a = self.source / (self.kappa * total)
        spread = (k + rate) / (2 * k * rate * abs(total) ** 2)
        overlap = 1 / (2 * rate * np.conj(total))
        value = abs(a) ** 2 * spread + 2 * (a * np.conj(face) * overlap).real
        value = value + abs(face) ** 2 / (2 * rate)
        tail = a - gamma * face
        slope = k * k * abs(a) ** 2 * spread - 2 * k * (a * np.conj(tail) * overlap).real
        slope = slope + abs(tail) ** 2 / (2 * rate)
        return self.kappa * np.where(abs(gamma) > 3 * k, slow, slope + k * k * value)


QUANTITIES = ["coating_thermo_elastic", "coating_thermo_refractive", "coating_coherent",
              "thermo_elastic_with_substrate", "everything_coherent"]


def heat_stack(case, order, pieces):
    """The elements of a case with the five source combinations of QUANTITIES."""
    layers, substrate = case["layers"], case["substrate"]
    k0 = 2 * np.pi / case["wavelength_m"]
    split = [pieces * max(1, int(np.ceil(2 * k0 * layer[0] * layer[2] / 4))) for layer in layers]
    point, weight, hats, shapes = reference_element(order)[:4]
    depths = [np.concatenate([(e + (point + 1) / 2) / n for e in range(n)]) for n in split]
    strain, index = readout_weights(case, depths)
    kappa, capacity, thickness, sources = [], [], [], []
    for j, (layer, n) in enumerate(zip(layers, split)):
        own, bulge = expansion_lengths(layer, substrate)
        elastic = np.full(len(depths[j]), own + bulge)
        refractive = (strain[j] - 1) * own + index[j] * clamped_index_slope(layer)
        together = strain[j] * own + bulge + index[j] * clamped_index_slope(layer)
        source = np.stack([elastic, refractive, together, elastic, together], axis=1)
        sources.append(source.reshape(n, len(point), 5) * layer[2] / n / 2)
        kappa += [layer[7]] * n
        capacity += [layer[8]] * n
        thickness += [layer[2] / n] * n
    sources = np.concatenate(sources) if sources else np.zeros((0, len(point), 5))
    loads = [np.einsum("p,pi,eps->eis", weight, basis, sources) for basis in (hats, shapes)]
    below = substrate_source(substrate) * np.array([0, 0, 0, 1, 1])
    return HeatStack(kappa, capacity, thickness, loads, order, substrate, below)


def adaptive_integral(function, limit, tolerance):
    """∫₀^limit of a vector function of an array: Gauss panels, halved until the halves agree.

    Returns (integral, summed differences of the accepted panels).
    """
    node, weight = np.polynomial.legendre.leggauss(12)
    edges = np.linspace(0, limit, 5)
    low, high = edges[:-1], edges[1:]

    def panels(low, high):
        x = (low + high)[:, None] / 2 + (high - low)[:, None] / 2 * node
        values = function(x.ravel()).reshape(len(low), len(node), -1)
        return np.einsum("p,ips->is", weight, values) * (high - low)[:, None] / 2

    whole = panels(low, high)
    scale, total, error = whole.sum(axis=0), 0.0, 0.0
    for _ in range(40):
        middle = (low + high) / 2
        left, right = panels(low, middle), panels(middle, high)
        change = abs(left + right - whole)
        good = (change <= tolerance * scale).all(axis=1)
        total, error = total + (left + right)[good].sum(axis=0), error + change[good].sum(axis=0)
        if good.all():
            return total, error
        open_ = ~good
        low, high, middle = low[open_], high[open_], middle[open_]
        low, high = np.concatenate([low, middle]), np.concatenate([middle, high])
        whole = np.concatenate([left[open_], right[open_]])
    raise ArithmeticError("the integral over wavenumbers did not converge")


def thermal_psd(stack, case, frequency, limit, tolerance):
    """PSDs [m²/Hz], 4k_BT² ∫(k dk/2π) e^{-k²w²/4} Re∫qΘ dz, and the quadrature's relative error."""
    omega, w = 2 * np.pi * frequency, case["beam_radius_m"]

    def integrand(x):
        return (x / (2 * np.pi) * np.exp(-x * x / 4))[:, None] * stack.dissipation(x / w, omega)

    value, error = adaptive_integral(integrand, limit, tolerance)
    relative = np.max(error / np.where(value > 0, value, 1))
    return 4 * BOLTZMANN * case["temperature_K"] ** 2 / w**2 * value, relative
