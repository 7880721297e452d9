"""Makes layered-extra.json: layered spheres at high precision, straight from the boundary conditions.

Run: python3 make-layered.py > layered-extra.json     (mpmath 1.2 or later; takes some minutes)

Every input is the exact binary value of the decimal double that the JSON shows. In each layer the radial function is
u = A psi_n(m t) + B chi_n(m t); at each interface u and u' (for b_n) or u and u'/m^2 (for a_n) are handed on, and A, B
of the next layer follow from the Wronskian. Formulas: Bohren & Huffman (1983), section 8.1 and equations 4.61, 4.62,
4.74, 4.82; asymmetry, p. 120. No stable scheme is used: precision pays for what psi and chi lose in absorbing layers,
and each case is computed twice, the second time with half as many digits more, and must agree to 25 digits.
"""

import json
import sys

from mpmath import mp, mpc, mpf, nstr

PRINTED = 20
BASE_DIGITS = 60

# Size parameters of the outer radii from the inside, and the layers' indices relative to the medium.
SHELLS = [
    # Rayleigh and small
    [[0.005, 0.01], [[1.59, 0.0], [1.33, 0.0]]],
    [[0.005, 0.01], [[0.05, 4.0], [1.45, 0.0]]],
    [[0.009, 0.01], [[1.33, 0.0], [1.5, 1e-8]]],
    [[0.00999, 0.01], [[1.0, 0.0], [1.5, 0.0]]],
    [[0.0001, 0.01], [[1.75, 0.44], [1.33, 0.0]]],
    [[0.05, 0.1], [[1.75, 0.44], [1.33, 1e-9]]],
    [[0.08, 0.1], [[1.0001, 0.0], [1.0002, 0.0]]],
    [[0.05, 0.3], [[3.5, 0.01], [0.2, 3.0]]],
    # Of the order of the wavelength
    [[0.5, 1.0], [[1.33, 0.0], [1.59, 0.0]]],
    [[0.9, 1.0], [[1.45, 0.0], [0.05, 4.0]]],
    [[0.5, 1.0], [[1.001, 1e-6], [1.0005, 0.0]]],
    [[0.99, 1.0], [[60.0, 80.0], [1.5, 0.0]]],
    [[0.2, 1.0], [[1.5, 0.0], [60.0, 80.0]]],
    [[2.0, 5.0], [[1.0, 0.0], [1.59, 0.0]]],
    [[4.999, 5.0], [[1.33, 0.0], [1.5, 0.1]]],
    [[3.0, 5.0], [[1.5, 0.1], [0.5, 0.0]]],
    [[9.0, 10.0], [[1.33, 1e-8], [1.45, 0.0]]],
    [[5.0, 10.0], [[1.75, 0.44], [1.33, 1e-5]]],
    [[9.999999, 10.0], [[1.5, 0.0], [2.0, 1.0]]],
    [[1e-5, 10.0], [[2.0, 1.0], [1.33, 0.0]]],
    [[9.5, 10.0], [[1.59, 0.0], [0.3, 0.0]]],
    [[1.0, 30.0], [[1.59, 0.0], [1.33, 1.5]]],
    [[25.0, 30.0], [[0.01, 0.0], [1.33, 0.0]]],
    [[20.0, 30.0], [[3.5, 0.0], [1.5, 0.0]]],
    # Large
    [[50.0, 100.0], [[1.33, 0.0], [1.5, 0.0]]],
    [[95.0, 100.0], [[1.59, 0.0], [1.33, 1e-5]]],
    [[99.9, 100.0], [[1.33, 0.0], [0.05, 4.0]]],
    [[98.0, 100.0], [[1.5, 0.0], [0.8, 0.0]]],
    [[60.0, 100.0], [[1.0, 0.0], [1.33, 0.01]]],
    [[50.0, 100.0], [[1.0002, 0.0], [1.0001, 1e-5]]],
    [[0.05, 0.1], [[1.00002, 0.0], [1.00001, 0.0]]],
    [[6.0, 10.0], [[1.00001, 0.0], [1.00002, 0.0]]],
    [[0.1, 100.0], [[1.75, 0.44], [1.33, 0.0]]],
    [[399.0, 400.0], [[1.33, 0.0], [1.5, 1.0]]],
    [[10.0, 400.0], [[1.33, 0.0], [1.5, 0.5]]],
    [[700.0, 1000.0], [[1.59, 0.0], [1.33, 1e-4]]],
    [[999.99, 1000.0], [[1.33, 0.0], [1.5, 0.1]]],
    [[1500.0, 2000.0], [[1.33, 1e-4], [1.5, 0.0]]],
    [[1999.0, 2000.0], [[1.5, 0.0], [1.33, 0.0]]],
    [[1000.0, 2000.0], [[1.75, 0.44], [1.33, 1e-5]]],
    [[1990.0, 2000.0], [[1.59, 0.0], [1.4, 0.1]]],
    # Several layers
    [[0.004, 0.007, 0.01], [[1.59, 0.0], [1.33, 0.0], [1.45, 1e-6]]],
    [[1.0, 1.1, 2.0], [[1.45, 0.0], [0.05, 4.0], [1.33, 0.0]]],
    [[6.0, 6.5, 8.0, 10.0], [[1.33, 0.0], [1.59, 0.01], [1.0, 0.0], [1.45, 0.0]]],
    [[90.0, 90.5, 95.0, 99.0, 100.0], [[1.33, 1e-6], [1.59, 0.0], [1.2, 0.0], [1.5, 0.05], [1.4, 0.0]]],
]


def riccati_bessel(z, order):
    """psi_n (downwards, scaled to psi_0 or psi_1) and chi_n (upwards) for n = 0..order."""
    chi = [mp.cos(z), mp.cos(z) / z + mp.sin(z)]
    for n in range(2, order + 1):
        chi.append((2 * n - 1) / z * chi[-1] - chi[-2])
    size = float(abs(z))
    # From so far above, the start is forgotten to the digits in use.
    start = int(max(order, size + 30 * size ** (1 / 3)) + mp.dps) + 100
    psi = [None] * (order + 1)
    above, here = mpf(0), mpf(1)
    for n in range(start, -1, -1):
        if n <= order:
            psi[n] = here
        above, here = here, (2 * n + 1) / z * here - above
    first, second = mp.sin(z), mp.sin(z) / z - mp.cos(z)
    factor = first / psi[0] if abs(first) > abs(second) else second / psi[1]
    return [factor * p for p in psi], chi


def slopes(values, z):
    """Derivatives by the argument for n = 1.. (index 0 unused)."""
    return [None] + [values[n - 1] - n / z * values[n] for n in range(1, len(values))]


def coefficients(sizes, indices, order):
    """a_n and b_n for n = 1..order."""
    fields = {"a": [None] * (order + 1), "b": [None] * (order + 1)}
    bounds = list(zip(sizes, indices, list(indices[1:]) + [mpf(1)]))
    for layer, (x, m, outside) in enumerate(bounds):
        psi, chi = riccati_bessel(m * x, order)
        dpsi, dchi = slopes(psi, m * x), slopes(chi, m * x)
        psi2, chi2 = riccati_bessel(outside * x, order)
        dpsi2, dchi2 = slopes(psi2, outside * x), slopes(chi2, outside * x)
        for kind in "ab":
            inner = 1 / m if kind == "a" else m
            outer = 1 / outside if kind == "a" else outside
            for n in range(1, order + 1):
                A, B = fields[kind][n] if layer > 0 else (mpf(1), mpf(0))
                u = A * psi[n] + B * chi[n]
                v = inner * (A * dpsi[n] + B * dchi[n])
                # psi' chi - psi chi' = 1
                fields[kind][n] = (
                    v / outer * chi2[n] - u * dchi2[n],
                    u * dpsi2[n] - v / outer * psi2[n],
                )
    # Outside u = A psi + B chi ~ psi - c (psi - i chi): A = s (1 - c), B = s i c.
    results = []
    for kind in "ab":
        values = []
        for A, B in fields[kind][1:]:
            values.append(B / (B + mpc(0, 1) * A))
        results.append(values)
    return results


def angular(mu, order):
    pi, tau = [mpf(0), mpf(1)], [mpf(0), mu]
    for n in range(2, order + 1):
        pi.append((mpf(2 * n - 1) * mu * pi[n - 1] - n * pi[n - 2]) / (n - 1))
        tau.append(n * mu * pi[n] - (n + 1) * pi[n - 1])
    return pi, tau


def sums(sizes, indices, cosines, digits):
    mp.dps = digits
    xs = [mpf(s) for s in sizes]
    ms = [mpf(i[0]) if i[1] == 0 else mpc(i[0], i[1]) for i in indices]
    x = xs[-1]
    order = int(sizes[-1] + 12 * sizes[-1] ** (1 / 3)) + 12
    a, b = coefficients(xs, ms, order)
    extinction = scattering = asymmetry = mpf(0)
    backward = forward = mpc(0)
    for n in range(1, order + 1):
        an, bn = mpc(a[n - 1]), mpc(b[n - 1])
        extinction += (2 * n + 1) * (an + bn).real
        scattering += (2 * n + 1) * (abs(an) ** 2 + abs(bn) ** 2)
        backward += (2 * n + 1) * (-1) ** n * (an - bn)
        forward += (2 * n + 1) * (an + bn) / 2
        asymmetry += mpf(2 * n + 1) / (n * (n + 1)) * (an * bn.conjugate()).real
        if n < order:
            cross = an * mpc(a[n]).conjugate() + bn * mpc(b[n]).conjugate()
            asymmetry += mpf(n * (n + 2)) / (n + 1) * cross.real
    amplitudes = []
    for cosine in cosines:
        pi, tau = angular(mpf(cosine), order)
        s1 = s2 = mpc(0)
        for n in range(1, order + 1):
            c = mpf(2 * n + 1) / (n * (n + 1))
            s1 += c * (a[n - 1] * pi[n] + b[n - 1] * tau[n])
            s2 += c * (a[n - 1] * tau[n] + b[n - 1] * pi[n])
        amplitudes.append((s1, s2))
    return {
        "Qext": 2 / x**2 * extinction,
        "Qsca": 2 / x**2 * scattering,
        "Qback": abs(backward) ** 2 / x**2,
        "g": 2 * asymmetry / scattering,
        "S0": forward,
        "amplitudes": amplitudes,
    }


def text(value):
    return nstr(value, PRINTED, min_fixed=-4, max_fixed=8)


def pair(value):
    value = mpc(value)
    return [text(value.real), text(value.imag)]


def agree(first, second):
    for key in ("Qext", "Qsca", "Qback", "g", "S0"):
        if abs(first[key] / second[key] - 1) > mpf(10) ** -25:
            raise ValueError(f"{key}: {first[key]} is not {second[key]}")
    for one, other in zip(first["amplitudes"], second["amplitudes"]):
        size = max(abs(one[0]), abs(one[1]))
        if max(abs(one[0] - other[0]), abs(one[1] - other[1])) > mpf(10) ** -25 * size:
            raise ValueError("amplitudes differ")


def case(sizes, indices):
    absorbed = sum(i[1] * s for s, i in zip(sizes, indices))
    digits = BASE_DIGITS + int(2 * absorbed)
    cosines = [0.9999, 0.5, 0.0, -0.9999]
    if sizes[-1] >= 10:
        cosines.insert(0, 1 - 2 / sizes[-1] ** 2)  # half-way down the forward lobe
    rough = sums(sizes, indices, cosines, digits)
    fine = sums(sizes, indices, cosines, digits * 3 // 2)
    agree(rough, fine)
    return {
        "sizes": sizes,
        "indices": indices,
        "Qext": text(fine["Qext"]),
        "Qsca": text(fine["Qsca"]),
        "Qback": text(fine["Qback"]),
        "g": text(fine["g"]),
        "S0": pair(fine["S0"]),
        "amplitudes": [
            {"cosTheta": c, "S1": pair(s1), "S2": pair(s2)} for c, (s1, s2) in zip(cosines, fine["amplitudes"])
        ],
    }


def main():
    cases = []
    for sizes, indices in SHELLS:
        print(f"sizes {sizes}, indices {indices}", file=sys.stderr)
        cases.append(case(sizes, indices))
    lines = ",\n".join("  " + json.dumps(c) for c in cases)
    print("{")
    print(' "source": "own computation, mpmath, make-layered.py: 60 digits and more, agreeing with half as many more",')
    print(' "convention": "exp(-i omega t), m = n + ik, amplitudes of Bohren & Huffman (1983) chapter 4",')
    print(f' "cases": [\n{lines}\n ]\n}}')


if __name__ == "__main__":
    main()
