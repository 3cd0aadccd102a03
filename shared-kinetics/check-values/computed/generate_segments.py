"""Recomputes segment-integrals.json with mpmath (40 digits), independently of the program: python3 generate_segments.py

A temperature programme in straight pieces with slow and fast ramps, a hold, cooling, and a jump of 60 K within a second; times along it, some of them very close
together. For several Ea: ln J from the start, and ln J from each time to the next, J = integral of exp(-Ea/RT) dt, each straight piece by E2 in closed form.
"""
import json
from pathlib import Path
from mpmath import exp, expint, log, mp, mpf, nstr

mp.dps = 60
here = Path(__file__).parent
R = mpf('8.31446261815324')
corners = [(0, 400), (1200, 500), (3000, 500), (3001, 560), (3601, 560), (4201, 540), (4801, 640)]
times = [600, 600.001, 1199, 1200, 1200.5, 2999.9, 3000.5, 3001, 3100, 3601.25, 4201, 4201.0001, 4500, 4800]
energies = [1000, 20000, 100000, 200000, 500000, 1000000]


def primitive(E, T):
    """Integral of exp(-E/RT) from T = 0."""
    return T * expint(2, E / (R * T))


def integral(E, a, b):
    total = mpf(0)
    for (t1, T1), (t2, T2) in zip(corners, corners[1:]):
        lower, upper = max(mpf(t1), a), min(mpf(t2), b)
        if upper <= lower:
            continue
        rate = mpf(T2 - T1) / (t2 - t1)
        at = lambda t: T1 + rate * (t - t1)
        total += exp(-E / (R * T1)) * (upper - lower) if rate == 0 else (primitive(E, at(upper)) - primitive(E, at(lower))) / rate
    return total


rows = []
for Ea in energies:
    E = mpf(Ea)
    stops = [mpf(0)] + [mpf(t) for t in times]
    rows.append({'Ea_J_per_mol': Ea,
                 'lnJFromStart': [nstr(log(integral(E, mpf(0), t)), 20) for t in stops[1:]],
                 'lnJOfSegment': [nstr(log(integral(E, a, b)), 20) for a, b in zip(stops, stops[1:])]})
(here / 'segment-integrals.json').write_text(json.dumps({'origin': 'mpmath, 60 digits, straight pieces in closed form; generate_segments.py', 'cornerTime_s': [t for t, _ in corners], 'cornerTemperature_K': [T for _, T in corners],
                                                         'time_s': times, 'rows': rows}, indent=1) + '\n')
