"""Answers the questions of sympy_test.go with SymPy.

Standard input is a JSON list of {"op", "n", "args"}: n variables, polynomials as lists
of [coefficient as text, [exponents]].  Standard output is a JSON list of answers: a
polynomial, null for an inexact quotient, or for "squarefree" a list of
[polynomial, exponent].
"""
import json
import sys

from sympy import ZZ, ring
from sympy.polys.polyerrors import ExactQuotientFailed


def read(R, p):
    return R.from_dict({tuple(e): ZZ(int(c)) for c, e in p})


def write(p):
    return [[str(int(c)), [int(x) for x in e]] for e, c in p.terms() if c]


def answer(case):
    R = ring(["x%d" % i for i in range(case["n"])], ZZ)[0]
    args = [read(R, p) for p in case["args"]]
    if case["op"] == "mul":
        return write(args[0] * args[1])
    if case["op"] == "div":
        try:
            return write(args[0].exquo(args[1]))
        except ExactQuotientFailed:
            return None
    if case["op"] == "gcd":
        return write(args[0].gcd(args[1]))
    if case["op"] == "squarefree":
        return [[write(f), k] for f, k in args[0].sqf_list()[1]]
    raise ValueError(case["op"])


json.dump([answer(c) for c in json.load(sys.stdin)], sys.stdout)
