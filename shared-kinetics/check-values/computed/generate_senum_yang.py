"""Derives the rational forms of the temperature integral anew, independently of the program: python3 generate_senum_yang.py (mpmath, 50 digits)

senum-yang.json   coefficients of the [n-1/n] Pade forms of x e^x p(x), degree n = 1..8, solved exactly (fractions) from the asymptotic series
                  x e^x p(x) = sum_k (-1)^k (k+1)! x^-(k+1); their relative error of p; and pi(x) = x^2 e^x p(x) by mpmath's own exponential integral
"""
import json
from fractions import Fraction
from math import factorial
from pathlib import Path
from mpmath import exp, expint, mp, mpf, nstr

mp.dps = 50
points = [5, 8, 10, 15, 20, 30, 40, 60, 100]


def solve(rows, right):
    n = len(rows)
    m = [list(map(Fraction, row)) + [Fraction(r)] for row, r in zip(rows, right)]
    for i in range(n):
        pivot = next(j for j in range(i, n) if m[j][i] != 0)
        m[i], m[pivot] = m[pivot], m[i]
        m[i] = [v / m[i][i] for v in m[i]]
        for j in range(n):
            if j != i:
                m[j] = [a - m[j][i] * b for a, b in zip(m[j], m[i])]
    return [row[-1] for row in m]


def pade(n):
    """N (degree n-1) and D (degree n) in x, both monic, highest power first. With z = 1/x the series is z * sum_k c_k z^k."""
    c = [Fraction((-1) ** k * factorial(k + 1)) for k in range(2 * n)]
    # sum_k c_k z^k = P(z)/Q(z), deg P = n-1, deg Q = n, Q(0) = 1: the coefficients of z^n..z^(2n-1) in c*Q vanish.
    q = [Fraction(1)] + solve([[c[n + i - j] for j in range(1, n + 1)] for i in range(n)], [-c[n + i] for i in range(n)])
    p = [sum(c[i - j] * q[j] for j in range(i + 1)) for i in range(n)]
    # z*P(1/x)/Q(1/x) times x^n/x^n: N_x = sum p_i x^(n-1-i), D_x = sum q_j x^(n-j).
    assert all(v.denominator == 1 for v in p + q)
    return [int(v) for v in p], [int(v) for v in q]


def at(coefficients, x):
    value = mpf(0)
    for c in coefficients:
        value = value * x + c
    return value


scaled = {x: x * exp(mpf(x)) * expint(2, mpf(x)) for x in points}
degrees = []
for n in range(1, 9):
    N, D = pade(n)
    degrees.append({'degree': n, 'numerator': N, 'denominator': D,
                    'relativeError': [nstr(x * at(N, x) / at(D, x) / scaled[x] - 1, 8) for x in points]})
content = {'origin': 'mpmath, 50 digits, and exact fractions; generate_senum_yang.py', 'x': points,
           'scaled': [nstr(scaled[x], 35) for x in points], 'degrees': degrees}
(Path(__file__).parent / 'senum-yang.json').write_text(json.dumps(content, indent=1) + '\n')
