"""Makes owen-complex.json: Owen's T of complex h at high precision, by a formula that the program does not use.

Run: python3 make-owen-complex.py > owen-complex.json     (mpmath 1.2 or later; takes some minutes)

With q = h^2/2,  T(h, a) = e^-q/(2 pi) int_0^inf e^-u (sqrt(pi)/2) erf(a sqrt(q + u))/sqrt(q + u) du,  from
1/(1 + x^2) = int_0^inf e^(-u (1 + x^2)) du in Owen's definition (1956). Where the integrand of the definition itself does
not turn too often the value is checked against its quadrature. Every input is the exact binary value of the decimal double
that the JSON shows.
"""

import cmath
import json
import math
import sys

from mpmath import erf, exp, inf, linspace, mp, mpc, mpf, nstr, pi, quad, sqrt

mp.dps = 40
PRINTED = 20

MODULI = [1e-6, 0.01, 1.0, 7.0, 20.0, 33.0, 100.0, 3000.0, 1e5, 1e6, 1e7]
DEGREES = [0, 35, -60, 85, -90, 90]
SLOPES = [1e-3, 0.03, 0.2, 0.6, 0.97, 1.0, 1.1, 2.5, 30.0, 4000.0]


def by_erf(q, a):
    def integrand(u):
        root = sqrt(q + u)
        return exp(-u) * sqrt(pi) / 2 * erf(a * root) / root

    ends = sorted({mpf(0), min(mpf(1), 1 / a**2), mpf(1), mpf(8), mpf(40), mpf(110)})
    return exp(-q) * quad(integrand, ends) / (2 * pi)


def by_definition(q, a):
    pieces = 2 + int(abs(q) * a * a / 3)
    return quad(lambda x: exp(-q * (1 + x * x)) / (1 + x * x), linspace(0, a, pieces + 1)) / (2 * pi)


def squared(modulus, degrees):
    turn = cmath.rect(modulus, math.radians(degrees))
    # At a right angle cos is 6e-17, not 0: the fixed particle's h^2 has no real part.
    return [0.0 if abs(degrees) == 90 else turn.real, 0.0 if degrees == 0 else turn.imag]


def main():
    values = []
    number = 0
    for modulus in MODULI:
        for degrees in DEGREES:
            for slope in SLOPES:
                number += 1
                # A fifth of the grid, spread over it, is enough.
                if "--all" not in sys.argv and number % 5 != (number // 10) % 5:
                    continue
                re, im = squared(modulus, degrees)
                q = mpc(mpf(re), mpf(im)) / 2
                a = mpf(slope)
                value = by_erf(q, a)
                checked = abs(q) * a * a < 200
                if checked and abs(value - by_definition(q, a)) > mpf(10) ** -25:
                    raise SystemExit(f"the two ways differ at {re}, {im}, {slope}")
                values.append(
                    {"hSquared": [re, im], "a": slope, "T": [nstr(value.real, PRINTED), nstr(value.imag, PRINTED)],
                     "checkedByDefinition": checked}
                )
    document = {
        "source": "own computation by make-owen-complex.py, mpmath at 40 digits; definition after Owen (1956)",
        "values": values,
    }
    lines = ",\n    ".join(json.dumps(value) for value in values)
    print("{" + f'\n  "source": {json.dumps(document["source"])},\n  "values": [\n    {lines}\n  ]\n' + "}")


main()
