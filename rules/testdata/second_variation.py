#!/usr/bin/env python3
"""The second variation of covariant actions from coordinates, in exact rational numbers.

Reads one JSON document on standard input and writes one on standard output. Nothing is
shared with the Go code: the Lagrangians are written out again below, the metric is a 4x4
matrix of components in (t, x, y, z), and Christoffel symbols, Riemann tensor and covariant
derivatives follow from their formulas in coordinates (Wald 1984, section 3.4a).

A quantity is expanded about the background in two independent perturbations, u and v, of
which the squares are dropped, so that its part in u*v is the polarised second variation:

    b(t)  +  v-part * exp(kappa z)  +  u-part * exp(-kappa z)  +  uv-part.

Perturbations grow with a real kappa, so that every number stays rational; k^2 = -kappa^2.
The field v is given by its Taylor series in t. The field u is formal: its part is a sum of
series times u, u', u'', ... of each field, and E_u = sum (-d/dt)^i of the coefficient of
the i-th derivative is the equation of motion of u, at t = 0, free of total derivatives. A
spatial total derivative vanishes by itself, exp(-kappa z) exp(kappa z) being 1.
"""
import json
import sys
from itertools import combinations

from sympy import QQ

ZERO, ONE, HALF = QQ(0), QQ(1), QQ(1, 2)


def number(text):
    p, _, q = text.partition("/")
    return QQ(int(p), int(q or 1))


# Power series in t: a list of coefficients, or None for zero.

def s_add(x, y):
    if x is None or y is None:
        return y if x is None else x
    return [p + q for p, q in zip(x, y)]


def s_scale(x, c):
    return None if x is None or not c else [c * p for p in x]


def s_mul(x, y):
    if x is None or y is None:
        return None
    n = min(len(x), len(y))
    out = [ZERO] * n
    for i in range(n):
        if x[i]:
            for j in range(n - i):
                out[i + j] += x[i] * y[j]
    return out if any(out) else None


def s_dt(x):
    if x is None:
        return None
    out = [i * x[i] for i in range(1, len(x))]
    return out if any(out) else None


def s_inv(x):
    out = [ONE / x[0]]
    for n in range(1, len(x)):
        out.append(-sum((x[i] * out[n - i] for i in range(1, n + 1)), ZERO) / x[0])
    return out


def s_sqrt(x):
    root = QQ.exsqrt(x[0])
    if root is None:
        raise ValueError("%s is no square" % x[0])
    out = [root]
    for n in range(1, len(x)):
        out.append((x[n] - sum((out[i] * out[n - i] for i in range(1, n)), ZERO)) / (2 * root))
    return out


def d_sum(*dicts):
    out = {}
    for d in dicts:
        for key, x in d.items():
            y = s_add(out.get(key), x)
            if y is not None:
                out[key] = y
    return out


def d_map(d, f):
    return {key: y for key, x in d.items() if (y := f(x)) is not None}


class Q:
    """A quantity; u and uv are keyed by (field, number of time derivatives)."""

    __slots__ = ("b", "v", "u", "uv")
    kappa = ZERO
    order = 0  # Taylor coefficients of what is given; each derivative leaves one fewer

    def __init__(self, b=None, v=None, u=None, uv=None):
        self.b, self.v, self.u, self.uv = b, v, u or {}, uv or {}

    def zero(self):
        return self.b is None and self.v is None and not self.u and not self.uv

    def __add__(self, o):
        o = promote(o)
        return Q(s_add(self.b, o.b), s_add(self.v, o.v), d_sum(self.u, o.u), d_sum(self.uv, o.uv))

    __radd__ = __add__

    def times(self, c):
        f = lambda x: s_scale(x, c)
        return Q(f(self.b), f(self.v), d_map(self.u, f), d_map(self.uv, f))

    def __neg__(self):
        return self.times(-ONE)

    def __sub__(self, o):
        return self + (-promote(o))

    def __rsub__(self, o):
        return promote(o) - self

    def __mul__(self, o):
        if not isinstance(o, Q):
            return self.times(QQ(o))
        if self.zero() or o.zero():
            return Q()
        by = lambda x: (lambda y: s_mul(x, y))
        return Q(
            s_mul(self.b, o.b),
            s_add(s_mul(self.b, o.v), s_mul(self.v, o.b)),
            d_sum(d_map(o.u, by(self.b)), d_map(self.u, by(o.b))),
            d_sum(d_map(o.uv, by(self.b)), d_map(self.uv, by(o.b)),
                  d_map(o.u, by(self.v)), d_map(self.u, by(o.v))))

    __rmul__ = __mul__

    def __truediv__(self, o):
        if isinstance(o, Q):
            return self * o.inverse()
        return self.times(ONE / QQ(o))

    def __pow__(self, n):
        out = Q([ONE] + [ZERO] * (Q.order - 1))
        for _ in range(n):
            out = out * self
        return out

    def small(self):
        return Q(None, self.v, self.u, self.uv)

    def inverse(self):
        r = Q(s_inv(self.b))
        d = self.small() * r
        return r - d * r + d * d * r

    def sqrt(self):
        s = Q(s_sqrt(self.b))
        d = self.small() / Q(self.b)
        return s * (1 + d / 2 - d * d / 8)

    def d(self, coordinate):
        if coordinate == 0:
            raised = lambda d: {(f, i + 1): x[:-1] for (f, i), x in d.items()}
            return Q(s_dt(self.b), s_dt(self.v), d_sum(d_map(self.u, s_dt), raised(self.u)),
                     d_sum(d_map(self.uv, s_dt), raised(self.uv)))
        if coordinate == 3:
            return Q(None, s_scale(self.v, Q.kappa), d_map(self.u, lambda x: s_scale(x, -Q.kappa)))
        return Q()


def promote(x):
    return x if isinstance(x, Q) else Q(constant(QQ(x)))


def constant(c):
    return [c] + [ZERO] * (Q.order - 1) if c else None


def exponential(q):
    """exp of a quantity that vanishes on the background."""
    return 1 + q + q * q / 2


# Geometry.

R4 = range(4)
PAIRS = list(combinations(R4, 2))


def determinant(m):
    if len(m) == 1:
        return m[0][0]
    out, sign = Q(), 1
    for j, x in enumerate(m[0]):
        if not x.zero():
            out = out + sign * x * determinant([row[:j] + row[j + 1:] for row in m[1:]])
        sign = -sign
    return out


def inverse_matrix(m, det):
    r = det.inverse()
    out = [[None] * 4 for _ in R4]
    for i in R4:
        for j in R4:
            minor = [[m[p][q] for q in R4 if q != i] for p in R4 if p != j]
            out[i][j] = determinant(minor) * r * (-1) ** (i + j)
    return out


class Geometry:
    """Curvature and scalars of one perturbed background, components in coordinates."""

    def __init__(self, data):
        Q.kappa, Q.order = number(data["kappa"]), len(data["a"])
        self.data = data
        a = Q([number(c) for c in data["a"]])
        lapse = Q([number(c) for c in data["lapse"]])
        p = {name: Q(None, self.series(c), {(name, 0): constant(ONE)}) for name, c in data["fields"].items()}
        zero = Q()
        at = lambda name: p.get(name, zero)
        self.fields = list(data["fields"])
        # N_i dx^i = dB + S dx;  h_ij = a^2 [exp(2 zeta + 2 ddE + gamma)]_ij, or, for a vector,
        # a^2 ((dx + W_z dz)^2 + dy^2 + dz^2)
        n = lapse * (1 + at("A"))
        shift = [at("S"), zero, at("B").d(3)]
        zeta, w = at("zeta"), at("W").d(3)
        h = [[zero] * 3 for _ in range(3)]
        h[0][0] = a * a * exponential(2 * zeta + at("gamma"))
        h[1][1] = a * a * exponential(2 * zeta - at("gamma"))
        h[2][2] = a * a * (exponential(2 * zeta + 2 * at("E").d(3).d(3)) + w * w)
        h[0][2] = h[2][0] = a * a * w
        lift = self.inverse3(h)
        self.a, self.lapse, self.n, self.shift, self.h, self.lift = a, lapse, n, shift, h, lift
        square = sum((lift[i][j] * shift[i] * shift[j] for i in range(3) for j in range(3)), zero)
        self.g = [[square - n * n] + shift] + [[shift[i]] + h[i] for i in range(3)]
        det = determinant(self.g)
        self.root = (-det).sqrt()
        self.up = inverse_matrix(self.g, det)
        self.connect()
        self.curve()
        self.scalars = {name: Q([number(c) for c in c0]) + at("d" + name) for name, c0 in data["scalars"].items()}

    @staticmethod
    def series(texts):
        return [number(c) for c in texts]

    @staticmethod
    def inverse3(h):
        r = determinant(h).inverse()
        minor = lambda i, j: [[h[p][q] for q in range(3) if q != i] for p in range(3) if p != j]
        return [[determinant(minor(i, j)) * r * (-1) ** (i + j) for j in range(3)] for i in range(3)]

    def connect(self):
        dg = [[[self.g[i][j].d(c) for c in R4] for j in R4] for i in R4]
        low = lambda d, b, c: (dg[d][b][c] + dg[d][c][b] - dg[b][c][d]) * HALF
        lows = [[[low(d, b, c) for c in R4] for b in R4] for d in R4]
        self.gamma = [[[sum((self.up[a][d] * lows[d][b][c] for d in R4), Q()) for c in R4] for b in R4] for a in R4]

    def curve(self):
        g = self.gamma
        # R^a_bcd = d_c G^a_bd - d_d G^a_bc + G^a_ce G^e_bd - G^a_de G^e_bc, for c < d
        mixed = {}
        for c, d in PAIRS:
            for a in R4:
                for b in R4:
                    r = g[a][b][d].d(c) - g[a][b][c].d(d)
                    for e in R4:
                        r = r + g[a][c][e] * g[e][b][d] - g[a][d][e] * g[e][b][c]
                    mixed[a, b, c, d] = r
                    mixed[a, b, d, c] = -r
        ric = [[sum((mixed[c, a, c, b] for c in R4 if c != b), Q()) for b in R4] for a in R4]
        self.ric = [[sum((self.up[a][c] * ric[c][b] for c in R4), Q()) for b in R4] for a in R4]  # Ric^a_b
        self.riem = {(a, b, c, d): sum((self.up[b][e] * mixed[a, e, c, d] for e in R4), Q())
                     for a in R4 for b in R4 for c, d in PAIRS}  # R^ab_cd, c < d
        self.R = sum((self.ric[a][a] for a in R4), Q())

    def riemann_squared(self):
        return self.pair_square(self.riem)

    @staticmethod
    def pair_square(r):
        """T^ab_cd T^cd_ab of a tensor antisymmetric in both pairs."""
        return sum((4 * (r[p + q] * r[q + p]) for p in PAIRS for q in PAIRS), Q())

    def ricci_squared(self):
        return sum((self.ric[a][b] * self.ric[b][a] for a in R4 for b in R4), Q())

    def weyl_squared(self):
        c = {}
        for a, b in PAIRS:
            for p, q in PAIRS:
                r, s = self.riem[a, b, p, q], self.ric
                r = r - HALF * ((a == p) * s[b][q] - (a == q) * s[b][p] - (b == p) * s[a][q] + (b == q) * s[a][p])
                if (a, b) == (p, q):
                    r = r + self.R / 6
                c[a, b, p, q] = r
        return self.pair_square(c)

    def kinetic(self, name):
        d = [self.scalars[name].d(a) for a in R4]
        return sum((self.up[a][b] * d[a] * d[b] for a in R4 for b in R4), Q()) * -HALF

    def hessian(self, phi):
        """nabla^a nabla_b of a scalar, given by name or value."""
        phi = self.scalars.get(phi, phi) if isinstance(phi, str) else phi
        d = [phi.d(a) for a in R4]
        low = [[d[a].d(b) - sum((self.gamma[c][a][b] * d[c] for c in R4), Q()) for b in R4] for a in R4]
        return [[sum((self.up[a][c] * low[c][b] for c in R4), Q()) for b in R4] for a in R4]

    def equations(self, lagrangian):
        density = self.root * lagrangian
        out = {}
        for part in ("u", "uv"):
            sums = {f: ZERO for f in self.fields}
            for (f, i), x in getattr(density, part).items():
                for _ in range(i):
                    x = s_scale(s_dt(x), -ONE)
                if x is not None:
                    sums[f] += x[0]
            out["first" if part == "u" else "second"] = {f: str(c) for f, c in sums.items()}
        return out


def trace(m):
    return sum((m[a][a] for a in range(len(m))), Q())


def matmul(m, n):
    span = range(len(m))
    return [[sum((m[a][c] * n[c][b] for c in span), Q()) for b in span] for a in span]


R3 = range(3)


class Slices:
    """The slices of constant time in coordinates, from N, N_i and h_ij of a geometry:
    K_ij = (h_ij' - D_i N_j - D_j N_i)/2N and the Ricci tensor of h_ij; first index up."""

    def __init__(self, geo):
        self.geo, h, up = geo, geo.h, geo.lift
        d = lambda q, i: q.d(i + 1)
        low = lambda i, j, k: (d(h[i][j], k) + d(h[i][k], j) - d(h[j][k], i)) * HALF
        raised = lambda m: [[sum((up[i][k] * m[k][j] for k in R3), Q()) for j in R3] for i in R3]
        c = [[[sum((up[i][l] * low(l, j, k) for l in R3), Q()) for k in R3] for j in R3] for i in R3]
        shift = lambda i, j: d(geo.shift[j], i) - sum((c[k][i][j] * geo.shift[k] for k in R3), Q())
        self.k = raised([[(h[i][j].d(0) - shift(i, j) - shift(j, i)) / (2 * geo.n) for j in R3] for i in R3])
        ric = [[sum((d(c[k][i][j], k) - d(c[k][i][k], j)
                     + sum((c[k][k][l] * c[l][i][j] - c[k][j][l] * c[l][i][k] for l in R3), Q())
                     for k in R3), Q()) for j in R3] for i in R3]
        self.ric = raised(ric)
        self.K, self.R3 = trace(self.k), trace(self.ric)
        self.K2 = trace(matmul(self.k, self.k))
        self.N = geo.n / geo.lapse
        gradient = [d(self.N, i) for i in R3]
        along = sum((up[i][j] * geo.shift[i] * gradient[j] for i in R3 for j in R3), Q())
        self.Vn = (self.N.d(0) - along) / geo.n
        self.acc = [g / self.N for g in gradient]  # index down
        self.acc_up = [sum((up[i][j] * self.acc[j] for j in R3), Q()) for i in R3]
        self.acc2 = sum((self.acc[i] * self.acc_up[i] for i in R3), Q())
        self.H = geo.a.d(0) / geo.a  # the rate of the cosmic and the conformal clock

    def of_time(self, names):
        return [self.geo.scalars[name] for name in names.split()]


class Functions:
    """The free functions of a model: polynomials by their terms, coefficient and powers."""

    def __init__(self, terms):
        self.terms = terms

    def __call__(self, name, *args, by=None):
        """The function at args, or its derivative by the argument with that number."""
        powers = [{0: promote(1)} for _ in args]

        def power(i, n):
            if n not in powers[i]:
                powers[i][n] = power(i, n - 1) * args[i]
            return powers[i][n]

        out = Q()
        for t in self.terms[name]:
            c, e = number(t["coef"]), list(t["powers"])
            if by is not None:
                c, e[by] = c * e[by], e[by] - 1
            if c:
                product = promote(c)
                for i, n in enumerate(e):
                    product = product * power(i, n)
                out = out + product
        return out


# The Lagrangians, by the names of the models.

def quartic(geo, g4, g4x):
    m = geo.hessian("phi")
    box = trace(m)
    return g4 * geo.R + g4x * (box * box - trace(matmul(m, m)))


def quintic(geo, g5, g5x):
    m = geo.hessian("phi")
    m2 = matmul(m, m)
    box = trace(m)
    einstein = sum((geo.ric[a][b] * m[b][a] for a in R4 for b in R4), Q()) - geo.R * box / 2
    return g5 * einstein - g5x * (box ** 3 - 3 * (box * trace(m2)) + 2 * trace(matmul(m2, m))) / 6


def lapwing(geo, c, f):
    return c["M"] ** 2 * geo.R / 2 + geo.kinetic("phi") - f("V", geo.scalars["phi"])


def kestrel(geo, c, f):
    return c["M"] ** 2 * geo.R / 2 + f("P", geo.scalars["phi"], geo.kinetic("phi"))


def redshank(geo, c, f):
    at = geo.scalars["phi"], geo.kinetic("phi")
    return c["M"] ** 2 * geo.R / 2 + f("P", *at) - f("G3", *at) * trace(geo.hessian("phi"))


def godwit(geo, c, f):
    at = geo.scalars["phi"], geo.kinetic("phi")
    return quartic(geo, f("G4", *at), f("G4", *at, by=1))


def turnstone(geo, c, f):
    at = geo.scalars["phi"], geo.kinetic("phi")
    return c["M"] ** 2 * geo.R / 2 + f("P", *at) + quintic(geo, f("G5", *at), f("G5", *at, by=1))


def knot(geo, c, f):
    at = geo.scalars["phi"], geo.kinetic("phi")
    return (f("G2", *at) - f("G3", *at) * trace(geo.hessian("phi"))
            + quartic(geo, f("G4", *at), f("G4", *at, by=1))
            + quintic(geo, f("G5", *at), f("G5", *at, by=1)))


def ruff(geo, c, f):
    phi = geo.scalars["phi"]
    density = geo.riemann_squared() - 4 * geo.ricci_squared() + geo.R * geo.R
    return c["M"] ** 2 * geo.R / 2 + geo.kinetic("phi") - f("V", phi) + f("f", phi) * density


def sanderling(geo, c, f):
    return f("f", geo.R) / 2


def phalarope(geo, c, f):
    phi = geo.scalars["phi"]
    return f("f", geo.R, phi) / 2 + f("omega", phi) * geo.kinetic("phi")


def stilt(geo, c, f):
    return c["M"] ** 2 * geo.R / 2 - c["Lambda"] + c["alpha"] * geo.R * geo.R + c["beta"] * geo.weyl_squared()


# In the gauge with R uniform, f(R) is f + f_R (R - Rbar) at Rbar, the auxiliary scalar's value.

def sanderling_unitary(geo, c, f):
    bar = Q(geo.R.b)
    return (f("f", bar) + f("f", bar, by=0) * (geo.R - bar)) / 2


def stilt_unitary(geo, c, f):
    bar = Q(geo.R.b)
    square = bar * bar + 2 * bar * (geo.R - bar)
    return c["M"] ** 2 * geo.R / 2 - c["Lambda"] + c["alpha"] * square + c["beta"] * geo.weyl_squared()


def tern(geo, c, f):
    phi, chi = geo.scalars["phi"], geo.scalars["chi"]
    return (c["M"] ** 2 * geo.R / 2 + geo.kinetic("phi") + f("f", phi) * geo.kinetic("chi")
            - f("V", phi, chi))


def puffin(geo, c, f):
    return (c["M"] ** 2 * geo.R / 2 + geo.kinetic("phi") - f("V", geo.scalars["phi"])
            + f("P", geo.kinetic("chi")))


def shearwater(geo, c, f):
    s = Slices(geo)
    g, lam, cc, m2, m3, m4, n4 = s.of_time("f Lambda c m2 m3 m4 n4")
    dg = 1 - (s.N * s.N).inverse()
    dk = s.K - 3 * s.H
    dkdk = s.K2 - 2 * (s.H * s.K) + 3 * s.H ** 2
    m = c["M"] ** 2 * HALF
    return (m * (g * (s.R3 + s.K2 - s.K ** 2) - 2 * (g.d(0) * s.K / s.N)) - lam + cc / s.N ** 2
            + m2 ** 4 * dg ** 2 / 2 - m3 ** 3 * dk * dg / 2 - m4 ** 2 * (dk ** 2 - dkdk) + n4 ** 2 * s.R3 * dg / 2)


def fulmar(geo, c, f, names="Lambda c alphaT alphaH alphaK alphaB beta1 beta2 beta3"):
    s = Slices(geo)
    given = s.of_time(names)
    lam, cc, t, h, k, b, b1 = given[:7]
    b2, b3 = given[7:] or (-6 * b1 ** 2, -2 * (b1 * (2 * (1 + h) + b1 * (1 + t))))
    dk = s.K - 3 * s.H
    n = s.N - 1
    return (cc / s.N ** 2 - lam + c["M"] ** 2 * HALF * (
        s.K2 - s.K ** 2 + s.R3 * (1 + t / s.N + h * (1 - s.N.inverse())) + s.H ** 2 * k * n ** 2
        + 4 * (s.H * b * dk * n) + 4 * (b1 * dk * s.Vn) + b2 * s.Vn ** 2 + b3 * s.acc2))


def petrel(geo, c, f):
    return fulmar(geo, c, f, "Lambda c alphaT alphaH alphaK alphaB beta1")


def slices(geo, c, f):
    """Everything that the adm form has."""
    s = Slices(geo)
    b, = s.of_time("b")
    kk = matmul(s.k, s.k)
    pulled = sum((s.acc[i] * s.k[i][j] * s.acc_up[j] for i in R3 for j in R3), Q())
    return (f("F", s.N, s.K, s.R3, s.Vn) + b * trace(matmul(kk, s.k)) + s.N * trace(matmul(s.ric, s.k))
            + trace(matmul(s.ric, s.ric)) + s.acc2 * s.K + pulled + b.d(0) * s.Vn * s.K2)


def everything(geo, c, f):
    phi, x, h = geo.scalars["phi"], geo.kinetic("phi"), geo.hessian("phi")
    down = [phi.d(a) for a in R4]
    up = [sum((geo.up[a][b] * down[b] for b in R4), Q()) for a in R4]
    rate = [geo.R.d(a) for a in R4]
    box = trace(h)
    along = sum((geo.ric[a][b] * down[a] * up[b] for a in R4 for b in R4), Q())  # Ric^ab phi_a phi_b
    # R^ab_cd Ric^c_a phi^d_b, a pair c < d being stored
    mixed = sum((geo.riem[a, b, p, q] * (geo.ric[p][a] * h[q][b] - geo.ric[q][a] * h[p][b])
                 for a in R4 for b in R4 for p, q in PAIRS), Q())
    curved = sum((up[a] * box.d(a) for a in R4), Q())  # phi^a (box phi)_a
    return (f("F", geo.R, phi, x) * along + mixed + c["c"] * x * geo.weyl_squared()
            + geo.R * trace(geo.hessian(geo.R)) + f("U", phi) * sum((rate[a] * up[a] for a in R4), Q())
            + geo.ricci_squared() - geo.R * geo.R / 2
            + sum((down[a] * h[a][b] * up[b] for a in R4 for b in R4), Q()) / (phi * phi)
            + x * (curved + along) - c["c"] * phi * curved)


LAGRANGIANS = {f.__name__: f for f in (everything, shearwater, fulmar, petrel, slices, lapwing, kestrel, redshank, godwit, turnstone, knot, ruff,
                                       sanderling, sanderling_unitary, phalarope, stilt, stilt_unitary, tern, puffin)}


def main():
    out = []
    for data in json.load(sys.stdin):
        geo = Geometry(data)
        answers = {}
        for model in data["models"]:
            constants = {name: number(c) for name, c in model["constants"].items()}
            lagrangian = LAGRANGIANS[model["name"]](geo, constants, Functions(model["functions"]))
            answers[model["name"]] = geo.equations(promote(lagrangian))
        out.append(answers)
    json.dump(out, sys.stdout)


if __name__ == "__main__":
    main()
