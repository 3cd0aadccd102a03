"""Recomputes the files of this folder with mpmath (40 digits), independently of the program: python3 generate.py

p-of-x.json       pi(x) = x e^x E_2(x) and ln p(x), p(x) = E_2(x)/x, by mpmath's own exponential integral
student-t.json    quantiles of Student's t by root search on mpmath's hypergeometric function 2F1
ramp-hold-ramp.json  first-order reaction under a ramp, a hold and a second ramp: times at which conversion reaches a level
"""
import json
from pathlib import Path
from mpmath import exp, expint, gamma, hyp2f1, log, mp, mpf, nstr, pi, sqrt

mp.dps = 40
here = Path(__file__).parent
R = mpf('8.31446261815324')


def write(name, content):
    (here / name).write_text(json.dumps(content, indent=1, ensure_ascii=False) + '\n')


def p_of_x():
    # Around 1 the program changes its method; 0.394 is where ln p crosses zero; 700 is where p itself leaves double precision.
    points = ['0.001', '0.01', '0.05', '0.2', '0.394', '0.5', '0.9', '0.999', '0.9999999999', '1', '1.0000000001', '1.001', '1.1', '1.5', '2', '3',
              '5', '8', '13', '20', '30', '45', '60', '100', '200', '400', '690', '700', '745', '1000', '2000', '5000']
    rows = []
    for text in points:
        x = mpf(float(text))
        e2 = expint(2, x)
        rows.append({'x': float(text), 'scaled': nstr(x * exp(x) * e2, 20), 'ln_p': nstr(log(e2 / x), 20)})
    write('p-of-x.json', {'origin': 'mpmath, 40 digits; generate.py', 'rows': rows})


def student_t():
    def quantile(p, dof):
        nu = mpf(dof)
        density = lambda t: gamma((nu + 1) / 2) / (sqrt(nu * pi) * gamma(nu / 2)) * (1 + t * t / nu) ** (-(nu + 1) / 2)
        below = lambda t: mpf(1) / 2 + t * density(0) * hyp2f1(mpf(1) / 2, (nu + 1) / 2, mpf(3) / 2, -t * t / nu)
        low, high = mpf(0), mpf(1)
        while below(high) < p:
            low, high = high, 2 * high
        for _ in range(20):
            middle = (low + high) / 2
            low, high = (middle, high) if below(middle) < p else (low, middle)
        t = (low + high) / 2
        for _ in range(8):
            t -= (below(t) - mpf(p)) / density(t)
        return t

    rows = []
    for dof in [1, 2, 3, 4, 5, 6, 8, 10, 20, 30, 57, 58, 59, 60, 61, 62, 100, 200, 1000, 10000]:
        for p in [0.5009765625, 0.625, 0.74999, 0.75, 0.75001, 0.95, 0.975, 0.995, 0.9999990463256836, 0.9999999]:
            rows.append({'probability': p, 'dof': dof, 't': nstr(quantile(p, dof), 20)})
    write('student-t.json', {'origin': 'mpmath, 40 digits; generate.py', 'rows': rows})


def ramp_hold_ramp():
    """dalpha/dt = A exp(-E/RT) (1 - alpha), T piecewise linear in t; -ln(1 - alpha) = A J(t)."""
    E, A = mpf(120000), mpf(10) ** 11
    programmes = [
        {'start_K': 320, 'rate1_K_per_min': 5, 'hold_K': 440, 'hold_min': 40, 'rate2_K_per_min': 5, 'end_K': 620},
        {'start_K': 320, 'rate1_K_per_min': 10, 'hold_K': 455, 'hold_min': 15, 'rate2_K_per_min': 10, 'end_K': 640},
        {'start_K': 320, 'rate1_K_per_min': 20, 'hold_K': 425, 'hold_min': 90, 'rate2_K_per_min': 15, 'end_K': 640},
        {'start_K': 320, 'rate1_K_per_min': 2, 'hold_K': 430, 'hold_min': 60, 'rate2_K_per_min': 3, 'end_K': 600},
    ]
    levels = [0.05, 0.2, 0.4, 0.6, 0.8, 0.95]
    # Integral of exp(-E/RT) dT from 0 to T, exact.
    ramp = lambda T: E / R * expint(2, E / (R * T)) / (E / (R * T))
    runs = []
    for p in programmes:
        b1, b2 = mpf(p['rate1_K_per_min']) / 60, mpf(p['rate2_K_per_min']) / 60
        t1 = (p['hold_K'] - p['start_K']) / b1
        t2 = t1 + 60 * mpf(p['hold_min'])
        t3 = t2 + (p['end_K'] - p['hold_K']) / b2
        k = exp(-E / (R * p['hold_K']))
        j1 = (ramp(mpf(p['hold_K'])) - ramp(mpf(p['start_K']))) / b1
        j2 = j1 + k * (t2 - t1)

        def J(t):
            if t <= t1:
                return (ramp(p['start_K'] + b1 * t) - ramp(mpf(p['start_K']))) / b1
            if t <= t2:
                return j1 + k * (t - t1)
            return j2 + (ramp(p['hold_K'] + b2 * (t - t2)) - ramp(mpf(p['hold_K']))) / b2

        def temperature(t):
            return p['start_K'] + b1 * t if t <= t1 else mpf(p['hold_K']) if t <= t2 else p['hold_K'] + b2 * (t - t2)

        at = []
        for level in levels:
            alpha = mpf(str(level))
            g = -log(1 - alpha)
            low, high = mpf(0), t3
            assert A * J(high) > g
            for _ in range(160):
                middle = (low + high) / 2
                low, high = (middle, high) if A * J(middle) < g else (low, middle)
            T = temperature(low)
            at.append({'level': level, 'time_s': nstr(low, 20), 'temperature_K': nstr(T, 20),
                       'reactionRate_per_s': nstr(A * exp(-E / (R * T)) * (1 - alpha), 20)})
        runs.append({**p, 'holdStarts_s': nstr(t1, 20), 'holdEnds_s': nstr(t2, 20), 'ends_s': nstr(t3, 20), 'at': at})
    write('ramp-hold-ramp.json', {'origin': 'mpmath, 40 digits, ramps in closed form; generate.py', 'Ea_J_per_mol': 120000, 'A_per_s': 1e11,
                                  'model': 'first order', 'runs': runs})


p_of_x()
student_t()
ramp_hold_ramp()
