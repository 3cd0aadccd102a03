"""Reaction models near both ends of the range and with free exponents, independently of the program: python3 generate_reaction_models.py (mpmath, 80 digits)

reaction-models-precise.json   f and g by their printed formulas, where g has one, and by direct quadrature of 1/f, where it has not; alpha as double precision holds it
"""
import json
from pathlib import Path
from mpmath import log, mp, mpf, nstr, quad, sqrt

mp.dps = 80
alphas = [1e-12, 1e-6, 0.01, 0.2, 0.2499999, 0.25, 0.4999999, 0.5000001, 0.7, 0.99, 1 - 1e-6, 1 - 2.0 ** -40]
L = lambda a: -log(1 - a)
third = mpf(1) / 3
models = {
    'P2/3': (lambda a: 2 * third / sqrt(a), lambda a: a ** mpf('1.5')),
    'F0': (lambda a: mpf(1), lambda a: a),
    'P2': (lambda a: 2 * sqrt(a), sqrt),
    'P3': (lambda a: 3 * a ** (2 * third), lambda a: a ** third),
    'P4': (lambda a: 4 * a ** mpf('0.75'), lambda a: a ** mpf('0.25')),
    'D1': (lambda a: 1 / (2 * a), lambda a: a * a),
    'D2': (lambda a: 1 / L(a), lambda a: (1 - a) * log(1 - a) + a),
    'D3': (lambda a: mpf('1.5') * (1 - a) ** (2 * third) / (1 - (1 - a) ** third), lambda a: (1 - (1 - a) ** third) ** 2),
    'D4': (lambda a: mpf('1.5') / ((1 - a) ** -third - 1), lambda a: 1 - 2 * a / 3 - (1 - a) ** (2 * third)),
    'F1': (lambda a: 1 - a, L),
    'F3/2': (lambda a: (1 - a) ** mpf('1.5'), lambda a: 2 * ((1 - a) ** mpf('-0.5') - 1)),
    'F2': (lambda a: (1 - a) ** 2, lambda a: 1 / (1 - a) - 1),
    'F3': (lambda a: (1 - a) ** 3, lambda a: ((1 - a) ** -2 - 1) / 2),
    'A3/2': (lambda a: mpf('1.5') * (1 - a) * L(a) ** third, lambda a: L(a) ** (2 * third)),
    'A2': (lambda a: 2 * (1 - a) * sqrt(L(a)), lambda a: sqrt(L(a))),
    'A3': (lambda a: 3 * (1 - a) * L(a) ** (2 * third), lambda a: L(a) ** third),
    'A4': (lambda a: 4 * (1 - a) * L(a) ** mpf('0.75'), lambda a: L(a) ** mpf('0.25')),
    'R2': (lambda a: 2 * sqrt(1 - a), lambda a: 1 - sqrt(1 - a)),
    'R3': (lambda a: 3 * (1 - a) ** (2 * third), lambda a: 1 - (1 - a) ** third),
    'B1': (lambda a: a * (1 - a), lambda a: log(a / (1 - a))),
    'L2': (lambda a: 2 * (sqrt(a) - a), lambda a: -log(1 - sqrt(a))),
}
rows = [{'code': code, 'f': [nstr(f(mpf(a)), 20) for a in alphas], 'g': [nstr(g(mpf(a)), 20) for a in alphas]}
        for code, (f, g) in models.items()]

mp.dps = 40
free = [0.001, 0.1, 0.4, 0.5, 0.8, 0.99]


def from_zero(f, a, m):
    """∫ da/f from 0, with a = u^p, p = 1/(1 - m), that takes the end at 0 away."""
    p = 1 / (1 - mpf(m)) if m > 0 else mpf(1)
    return quad(lambda u: p * u ** (p - 1) / f(u ** p) if u > 0 else mpf(0), [0, (a / 2) ** (1 / p), a ** (1 / p)])


sb = []
for m, n in [(0.5, 1), (0.3, 1.7), (0.8, 2.5), (-0.5, 0.5), (0, 1.5), (0.25, 0), (0.6, -1.2)]:
    f = lambda a, m=m, n=n: a ** mpf(m) * (1 - a) ** mpf(n)
    sb.append({'m': m, 'n': n, 'gZeroAt': 0, 'g': [nstr(from_zero(f, mpf(a), m), 17) for a in free]})
for m, n in [(1, 1), (1, 2), (1.5, 0.5), (2, 1.3)]:
    f = lambda a, m=m, n=n: a ** mpf(m) * (1 - a) ** mpf(n)
    sb.append({'m': m, 'n': n, 'gZeroAt': 0.5, 'g': [nstr(quad(lambda a: 1 / f(a), [mpf('0.5'), (mpf('0.5') + mpf(a)) / 2, mpf(a)]), 17) for a in free]})
ept = []
for n, m, q in [(1, 1, 0.99), (1.5, 0.7, 0.999), (0.8, 0, 0.99), (2, 0.5, 0.9), (1, 1.3, 0.3), (0.5, 2, 0.99)]:
    f = lambda a, m=m, n=n, q=q: (1 - a) ** mpf(n) * (1 - mpf(q) * (1 - a)) ** mpf(m)
    ends = lambda a: [mpf(0)] + [mpf(a) * mpf(s) for s in ('0.003', '0.01', '0.03', '0.1', '0.3', '0.7')] + [mpf(a)]
    ept.append({'n': n, 'm': m, 'q': q, 'g': [nstr(quad(lambda a: 1 / f(a), ends(a)), 17) for a in free]})
content = {'origin': 'mpmath, 80 and 40 digits; generate_reaction_models.py', 'alpha': alphas, 'rows': rows, 'freeAlpha': free, 'sestakBerggren': sb, 'extendedProutTompkins': ept}
(Path(__file__).parent / 'reaction-models-precise.json').write_text(json.dumps(content, indent=1) + '\n')
