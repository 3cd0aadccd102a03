"""Recomputes lambert-w.json and rate-peaks.json with mpmath (40 digits), independently of the program: python3 generate_peaks.py

lambert-w.json   w of w e^w = e^z by mpmath's own Lambert function
rate-peaks.json  where the rate of a one-step reaction peaks under a constant heating rate from T = 0, and what each peak method makes of these peaks.
                 Peak: f'(alpha) g(alpha) = -pi(x), pi(x) = x^2 e^x p(x), which follows from d2alpha/dt2 = 0 and g(alpha) = (A E/(R beta)) p(x).
                 Lines are fitted by the closed-form sums in 40 digits; the refined E of ASTM E698 is the root of E h(E/RT) = R S, h = -d ln p/dx = 1/pi, S the
                 slope of ln beta against 1/Tp with its sign turned, T the peak temperature of the heating rate nearest the geometric middle.
"""
import json
from pathlib import Path
from mpmath import e, exp, expint, findroot, lambertw, log, mp, mpf, nstr

mp.dps = 40
here = Path(__file__).parent
R = mpf('8.31446261815324')


def write(name, content):
    (here / name).write_text(json.dumps(content, indent=1, ensure_ascii=False) + '\n')


def lambert_w():
    points = ['-600', '-40', '-3', '-1', '-0.5', '0', '0.5', '0.99', '1', '1.01', '2', '5', '14.9', '31', '100', '1000', '100000']
    write('lambert-w.json', {'origin': 'mpmath, 40 digits; generate_peaks.py',
                             'rows': [{'z': float(z), 'w': nstr(lambertw(exp(mpf(z))).real, 20)} for z in points]})


def scaled(x):
    """x^2 e^x p(x) = x e^x E_2(x)."""
    return x * exp(x) * expint(2, x)


def peak_conversion(model, parameter, x):
    """alpha and g(alpha) at the peak: the closed solutions of f'(alpha) g(alpha) = -pi(x)."""
    k = mpf(parameter)
    if model == 'nth-order':
        if k == 1:
            return 1 - exp(-scaled(x)), scaled(x)
        rest = 1 - (k - 1) / k * scaled(x)  # (1 - alpha)^(n - 1)
        return 1 - rest ** (1 / (k - 1)), (1 / rest - 1) / (k - 1)
    L = scaled(x) / k + 1 - 1 / k  # -ln(1 - alpha)
    return 1 - exp(-L), L ** (1 / k)


def line(x, y):
    n = len(x)
    mx, my = sum(x) / n, sum(y) / n
    slope = sum((a - mx) * (b - my) for a, b in zip(x, y)) / sum((a - mx) ** 2 for a in x)
    return slope, my - slope * mx


def rate_peaks():
    rates = [1, 2, 5, 10, 20]  # K/min
    start = mpf(300)  # T0 of Augis and Bennett
    sets = []
    for model, parameter, E_kJ, A_per_min in [('nth-order', '1', 100, '1e10'), ('nth-order', '1', 200, '1e18'), ('nth-order', '2', 150, '1e14'),
                                              ('nth-order', '0.5', 150, '1e14'), ('accelerating', '2', 150, '1e14'),
                                              ('accelerating', '3', 250, '1e20'), ('accelerating', '4', 40, '1e5')]:
        E, A = mpf(E_kJ) * 1000, mpf(A_per_min) / 60
        T, alpha = [], []
        for rate in rates:
            beta = mpf(rate) / 60
            def off(x):
                return log(A * E / (beta * R)) + log(expint(2, x) / x) - log(peak_conversion(model, parameter, x)[1])
            low, high = mpf('0.5'), mpf(300)
            assert off(low) > 0 > off(high)
            for _ in range(60):
                middle = (low + high) / 2
                low, high = (middle, high) if off(middle) > 0 else (low, middle)
            x = findroot(off, (low, high))
            T.append(E / (R * x))
            alpha.append(peak_conversion(model, parameter, x)[0])
        inverse = [1 / t for t in T]
        ln_beta = [log(mpf(rate) / 60) for rate in rates]
        kissinger = line(inverse, [b - 2 * log(t) for b, t in zip(ln_beta, T)])
        S = -line(inverse, ln_beta)[0]
        def energy_at(t):
            # E = R t x with x/pi(x) = S/t
            return R * t * findroot(lambda x: x / scaled(x) - S / t, S / t - 2)
        refined = energy_at(T[2])
        ln_Z = ln_beta[2] + log(refined / R) - 2 * log(T[2]) + refined / (R * T[2])
        augis = line(inverse, [b - log(t - start) for b, t in zip(ln_beta, T)])
        augis_without = line(inverse, [b - log(t) for b, t in zip(ln_beta, T)])
        sets.append({
            'model': model, 'parameter': float(parameter), 'Ea_kJ_per_mol': E_kJ, 'lnA_per_s': nstr(log(A), 20),
            'peak_K': [nstr(t, 20) for t in T], 'conversionAtPeak': [nstr(a, 20) for a in alpha],
            'kissinger': {'Ea_J_per_mol': nstr(-R * kissinger[0], 20), 'lnA_per_s': nstr(kissinger[1] + log(-kissinger[0]), 20)},
            'e698': {'firstEstimate_J_per_mol': nstr(mpf('2.19') * R * S / log(mpf(10)), 20), 'Ea_J_per_mol': nstr(refined, 20), 'lnZ_per_s': nstr(ln_Z, 20)},
            'ozawa_Ea_J_per_mol': nstr(R * S / mpf('1.052'), 20),
            'ozawaCorrected_Ea_J_per_mol': nstr(energy_at(1 / (sum(inverse) / len(inverse))), 20),
            'augisBennett': {'start_K': float(start), 'Ea_J_per_mol': nstr(-R * augis[0], 20), 'lnA_per_s': nstr(augis[1], 20)},
            'augisBennettWithoutStart': {'Ea_J_per_mol': nstr(-R * augis_without[0], 20), 'lnA_per_s': nstr(augis_without[1], 20)},
        })
    # Where the first-order peak stands for a round x: beta of A exp(-x) R T^2/E, and conversion.
    first_order = [{'x': x, 'conversionAtPeak': nstr(1 - exp(-scaled(mpf(x))), 20)} for x in [10, 15, 20, 25, 30, 40, 60]]
    write('rate-peaks.json', {'origin': 'mpmath, 40 digits; generate_peaks.py', 'heatingRate_K_per_min': rates, 'sets': sets,
                              'firstOrderConversionAtPeak': first_order, 'limit': nstr(1 - 1 / e, 20)})


lambert_w()
rate_peaks()
