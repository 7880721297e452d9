"""Makes mie-extra.json: Mie coefficients summed at high precision, straight from the textbook formulas.

Run: python3 make-mie-extra.py > mie-extra.json     (mpmath 1.2 or later; takes some minutes)

Every input is the exact binary value of the decimal double that the JSON shows, so that a program in double
precision is asked the same question. Formulas: Bohren & Huffman (1983), equations 4.61, 4.62, 4.74, 4.82,
4.88, 4.89; asymmetry, p. 120. Digits lost by cancellation are paid for with working precision, not with clever forms.
"""

import json
import sys

from mpmath import mp, mpc, mpf, nstr

DIGITS = 120
PRINTED = 20
mp.dps = DIGITS

SIZES = [0.001, 0.01, 0.1, 1.0, 10.0, 100.0, 1000.0, 20000.0]
INDICES = [
    [1 + 1e-6, 0.0],
    [1.0, 1e-6],
    [1.001, 0.0],
    [0.999, 0.0],
    [1.33, 0.0],
    [1.33, 1e-8],
    [1.5, 0.1],
    [1.55, 0.0],
    [2.0, 1.0],
    [0.05, 4.0],
    [10.0, 10.0],
    [1.0001, 0.00001],
]
# Beyond the named indices: below the medium's, high without loss, and the ends of the range allowed.
MORE_SIZES = [0.001, 0.7, 30.0, 2000.0]
MORE_INDICES = [[0.75, 0.0], [0.9, 0.0], [0.3, 0.2], [0.01, 0.0], [3.5, 0.0], [100.0, 0.0], [60.0, 80.0]]


def riccati_bessel(x, order):
    """psi_n, chi_n for n = 0..order, upwards: the precision covers what psi loses beyond n = x."""
    psi, chi = [mp.sin(x)], [mp.cos(x)]
    psi.append(psi[0] / x - mp.cos(x))
    chi.append(chi[0] / x + mp.sin(x))
    for n in range(2, order + 1):
        f = mpf(2 * n - 1) / x
        psi.append(f * psi[-1] - psi[-2])
        chi.append(f * chi[-1] - chi[-2])
    return psi, chi


def logarithmic_derivatives(z, order):
    """D_n(z) for n = 0..order, downwards (equation 4.89)."""
    size = float(abs(z))
    start = max(order, int(size + 25 * size ** (1 / 3))) + 80
    values = [None] * (order + 1)
    d = mpf(0)
    inverse = 1 / z
    for n in range(start, 0, -1):
        if n <= order:
            values[n] = d
        step = n * inverse
        d = step - 1 / (d + step)
    values[0] = d
    return values


def coefficients(x, m, psi, chi):
    top = len(psi) - 1
    d = logarithmic_derivatives(m * x, top)
    a, b, largest = [], [], mpf(0)
    for n in range(1, top + 1):
        xi, xi_before = mpc(psi[n], -chi[n]), mpc(psi[n - 1], -chi[n - 1])
        pair = []
        for h in (d[n] / m + mpf(n) / x, d[n] * m + mpf(n) / x):
            pair.append((h * psi[n] - psi[n - 1]) / (h * xi - xi_before))
        a.append(pair[0])
        b.append(pair[1])
        size = abs(pair[0]) + abs(pair[1])
        largest = max(largest, size)
        if n > x and size < mpf(10) ** -40 * largest:
            return a, b
    raise ValueError(f"series not finished at x = {x}, m = {m}")


def angular(mu, order):
    pi, tau = [mpf(0), mpf(1)], [mpf(0), mu]
    for n in range(2, order + 1):
        pi.append((mpf(2 * n - 1) * mu * pi[n - 1] - n * pi[n - 2]) / (n - 1))
        tau.append(n * mu * pi[n] - (n + 1) * pi[n - 1])
    return pi, tau


def text(value):
    return nstr(value, PRINTED, min_fixed=-4, max_fixed=8)


def pair(value):
    value = mpc(value)
    return [text(value.real), text(value.imag)]


def case(x, index, m, psi, chi, angles):
    a, b = coefficients(x, m, psi, chi)
    extinction = scattering = asymmetry = mpf(0)
    backward = mpc(0)
    for n in range(1, len(a) + 1):
        an, bn = mpc(a[n - 1]), mpc(b[n - 1])
        extinction += (2 * n + 1) * (an + bn).real
        scattering += (2 * n + 1) * (abs(an) ** 2 + abs(bn) ** 2)
        backward += (2 * n + 1) * (-1) ** n * (an - bn)
        asymmetry += mpf(2 * n + 1) / (n * (n + 1)) * (an * bn.conjugate()).real
        if n < len(a):
            cross = an * mpc(a[n]).conjugate() + bn * mpc(b[n]).conjugate()
            asymmetry += mpf(n * (n + 2)) / (n + 1) * cross.real
    forward = sum((2 * n + 1) * (a[n - 1] + b[n - 1]) for n in range(1, len(a) + 1)) / 2
    amplitudes = []
    for cosine, (pi, tau) in angles:
        s1 = s2 = mpc(0)
        for n in range(1, len(a) + 1):
            c = mpf(2 * n + 1) / (n * (n + 1))
            p, t = c * pi[n], c * tau[n]
            s1 += a[n - 1] * p + b[n - 1] * t
            s2 += a[n - 1] * t + b[n - 1] * p
        amplitudes.append({"cosTheta": cosine, "S1": pair(s1), "S2": pair(s2)})
    return {
        "x": float(x),
        "m": index,
        "Qext": text(2 / x**2 * extinction),
        "Qsca": text(2 / x**2 * scattering),
        "Qback": text(abs(backward) ** 2 / x**2),
        "g": text(2 * asymmetry / scattering),
        "S0": pair(forward),
        "amplitudes": amplitudes,
    }


def main():
    cases = []
    for sizes, indices in ((SIZES, INDICES), (MORE_SIZES, MORE_INDICES)):
        for size in sizes:
            x = mpf(size)
            top = int(size + 16 * size ** (1 / 3)) + 25
            psi, chi = riccati_bessel(x, top)
            cosines = [0.9999, 0.9, 0.5, 0.0, -0.7, -0.9999, -1.0]
            if size >= 10:
                cosines.insert(0, 1 - 2 / size**2)  # half-way down the forward lobe
            angles = [(mu, angular(mpf(mu), top)) for mu in cosines]
            for index in indices:
                m = mpf(index[0]) if index[1] == 0 else mpc(index[0], index[1])
                print(f"x = {size}, m = {index}", file=sys.stderr)
                cases.append(case(x, index, m, psi, chi, angles))
    lines = ",\n".join("  " + json.dumps(c) for c in cases)
    print("{")
    print(f' "source": "own computation, mpmath {DIGITS} digits, make-mie-extra.py",')
    print(' "convention": "exp(-i omega t), m = n + ik, amplitudes of Bohren & Huffman (1983) chapter 4",')
    print(f' "cases": [\n{lines}\n ]\n}}')


if __name__ == "__main__":
    main()
