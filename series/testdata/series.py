"""Expands the expressions on standard input with SymPy and compares.

Each line of input is a JSON object {"expr", "order", "known"}: an expression in eps, eta and
others, and the claim that, with eps and eta multiplied by l, its Laurent series in l is
"known" (a list of [power, coefficient]) up to terms of the given order. For each line one is
printed: "same", or what SymPy finds instead.
"""

import json
import sys

import sympy

names = {n: sympy.Symbol(n, positive=True) for n in ("eps", "eta", "x", "H", "m")}
scale = sympy.Symbol("l", positive=True)


def read(text):
    return sympy.sympify(text.replace("^", "**"), locals=names)


for line in sys.stdin:
    case = json.loads(line)
    small = {names[n]: scale * names[n] for n in ("eps", "eta")}
    full = read(case["expr"]).subs(small, simultaneous=True)
    found = full.series(scale, 0, case["order"]).removeO()
    known = sum((read(c) * scale**n for n, c in case["known"]), sympy.Integer(0))
    rest = sympy.simplify(sympy.expand(found - known))
    print("same" if rest == 0 else "SymPy finds " + str(sympy.expand(found)))
