"""Repeats operations on differential operators with SymPy, by acting on an unknown u(t).

An operator is the list of its coefficients of 1, D, D^2, ..., written in t. Each line of
input is a JSON object {"op", "a", "b", "results"}:

  product   a(b(u)) has the coefficients results[0]
  adjoint   results[0] is sum (-1)^i (a_i u)^(i)
  divide    a = q b + r with results q, r, by long division on the action

For each line one is printed: "same", or what SymPy finds.
"""

import json
import sys

import sympy

t = sympy.Symbol("t")
u = sympy.Function("u")(t)


def read(texts):
    return [sympy.sympify(c.replace("^", "**"), locals={"t": t}) for c in texts]


def act(op, f):
    total = sympy.Integer(0)
    for c in op:
        total += c * f
        f = f.diff(t)
    return total


def coefficients(expr):
    """The operator that made expr out of u."""
    expr = sympy.expand(expr)
    order = max((d.derivative_count for d in expr.atoms(sympy.Derivative)), default=0)
    slots = sympy.symbols("u0:%d" % (order + 1))
    expr = expr.xreplace({u.diff(t, i): slots[i] for i in range(order + 1)})
    return trim([tidy(expr.coeff(s)) for s in slots])


def tidy(c):
    return c if c.is_polynomial(t) else sympy.cancel(c)


def trim(op):
    while op and op[-1] == 0:
        op = op[:-1]
    return op


def divide(a, b):
    q = [sympy.Integer(0)] * max(len(a) - len(b) + 1, 0)
    while len(a) >= len(b):
        part = [0] * (len(a) - len(b)) + [sympy.cancel(a[-1] / b[-1])]
        q[len(part) - 1] = part[-1]
        rest = coefficients(act(a, u) - act(part, act(b, u)))
        if len(rest) >= len(a):
            raise ArithmeticError("the leading coefficient did not cancel")
        a = rest
    return [trim(q), a]


def found(case):
    a, b = read(case["a"]), read(case["b"])
    if case["op"] == "product":
        return [coefficients(act(a, act(b, u)))]
    if case["op"] == "adjoint":
        terms = [(-1) ** i * (c * u).diff(t, i) for i, c in enumerate(a)]
        return [coefficients(sum(terms, sympy.Integer(0)))]
    return divide(a, b)


def agree(x, y):
    return len(x) == len(y) and all(tidy(sympy.expand(p - q)) == 0 for p, q in zip(x, y))


for line in sys.stdin:
    case = json.loads(line)
    want = found(case)
    got = [read(r) for r in case["results"]]
    if len(want) == len(got) and all(agree(x, y) for x, y in zip(want, got)):
        print("same")
    else:
        print("SymPy finds", want)
