"""Real roots and zeros of entire functions for comparison.

Each line of input is a JSON object. {"coefs": [c0, c1, ...]} asks for the real roots of the
polynomial with these rational coefficients: a list of [root, multiplicity] by increasing root.
{"function": name, "radius": r} asks for the zeros of a known function in the disc |s| < r: a
list of [real part, imaginary part]. Numbers are decimal strings. One JSON list is printed for
each line.
"""

import json
import sys

import mpmath
import sympy

mpmath.mp.dps = 30
s = sympy.Symbol("s")


def roots(coefs):
    poly = sympy.Poly([sympy.Rational(c) for c in reversed(coefs)], s)
    found = {}
    for r in sympy.real_roots(poly):
        found[r] = found.get(r, 0) + 1
    return [[str(r.evalf(30)), m] for r, m in found.items()]


def lambert(c, sign):
    """Zeros of s e^s = c, or with sign = -1 of -s e^(-s) = c."""
    return [sign * mpmath.lambertw(c, k) for k in range(-8, 9)]


def sinc():
    return [mpmath.mpc((n * mpmath.pi) ** 2) for n in range(1, 12)]


def airy():
    """The solution of y'' = s y with y(0) = 1, y'(0) = 0, which is 0F1(; 2/3; s^3/9)."""
    y = lambda x: mpmath.hyp0f1(mpmath.mpf(2) / 3, x / 9)
    out, step = [], mpmath.mpf(1)
    x = mpmath.mpf(0)
    while x > -250:
        if y(x) * y(x - step) < 0:
            t = mpmath.findroot(y, (x - step, x), solver="anderson", tol=1e-50)
            for k in range(3):
                out.append(mpmath.cbrt(-t) * mpmath.expjpi((2 * k + 1) / mpmath.mpf(3)))
        x -= step
    return out


functions = {
    "sinc": sinc,
    "lambert 2": lambda: lambert(2, 1),
    "lambert -1/3": lambda: lambert(mpmath.mpf(-1) / 3, 1),
    "1 + s exp(-s)": lambda: lambert(1, -1),
    "airy": airy,
}

for line in sys.stdin:
    case = json.loads(line)
    if "coefs" in case:
        out = roots(case["coefs"])
    else:
        zeros = [mpmath.mpc(z) for z in functions[case["function"]]()]
        near = [z for z in zeros if abs(z) < case["radius"]]
        out = [[mpmath.nstr(z.real, 28), mpmath.nstr(z.imag, 28)] for z in near]
    print(json.dumps(out))
