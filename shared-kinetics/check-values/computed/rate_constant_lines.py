"""Writes rate-constant-lines.json: weighted line, bands, transition-state parameters and quadratic term, by mpmath with 30 digits."""
import json
import pathlib

from mpmath import betainc, exp, findroot, fsum, log, matrix, mp, mpf, nstr, sqrt

mp.dps = 30
here = pathlib.Path(__file__).parent
tables = json.loads((here.parent / "published" / "arrhenius-tables.json").read_text())["lines"]
R = mpf("1.380649e-23") * mpf("6.02214076e23")


def table(name):
    row = next(row for row in tables if row["id"] == name)
    return [mpf(str(t)) for t in row["temperature_K"]], [mpf(repr(k)) for k in row["k"]]


def line(x, y, w):
    W = fsum(w)
    xm = fsum(a * b for a, b in zip(w, x)) / W
    ym = fsum(a * b for a, b in zip(w, y)) / W
    xx = fsum(c * (a - xm) ** 2 for a, c in zip(x, w))
    slope = fsum(c * (a - xm) * (b - ym) for a, b, c in zip(x, y, w)) / xx
    rss = fsum(c * (b - ym - slope * (a - xm)) ** 2 for a, b, c in zip(x, y, w))
    return W, xm, ym, xx, slope, rss


def t975(dof):
    return findroot(lambda t: betainc(mpf(dof) / 2, mpf(1) / 2, 0, dof / (dof + t * t), regularized=True) / 2 - mpf("0.025"), 2.5)


def text(value):
    return nstr(value, 15)


def weighted():
    T, k = table("W1")
    relative = ["0.2", "0.1", "0.05", "0.05", "0.02"]
    W, xm, ym, xx, slope, rss = line([1 / t for t in T], [log(v) for v in k], [1 / mpf(u) ** 2 for u in relative])
    s2 = rss / (len(T) - 2)
    return {
        "table": "W1",
        "relativeUncertainty": relative,
        "Ea_J_per_mol": text(-R * slope),
        "standardError_J_per_mol": text(R * sqrt(s2 / xx)),
        "lnA": text(ym - slope * xm),
        "lnAStandardError": text(sqrt(s2 * (1 / W + xm**2 / xx))),
        "covarianceEaLnA_J_per_mol": text(R * s2 * xm / xx),
        "reducedChiSquare": text(s2),
    }


def bands():
    T, k = table("W8")
    n = len(T)
    _, xm, ym, xx, slope, rss = line([1 / t for t in T], [log(v) for v in k], [mpf(1)] * n)
    s, t = sqrt(rss / (n - 2)), t975(n - 2)
    rows = []
    for at in ("288.15", "400"):
        x = 1 / mpf(at)
        y, v = ym + slope * (x - xm), mpf(1) / n + (x - xm) ** 2 / xx
        ends = [y, y - t * s * sqrt(v), y + t * s * sqrt(v), y - t * s * sqrt(1 + v), y + t * s * sqrt(1 + v)]
        names = ["k", "lineLower95", "lineUpper95", "newLower95", "newUpper95"]
        rows.append({"temperature_K": at, **{name: text(exp(end)) for name, end in zip(names, ends)}})
    return {"table": "W8", "rows": rows}


def eyring():
    T, k = table("W8")
    n = len(T)
    _, xm, ym, xx, slope, rss = line([1 / t for t in T], [log(v / t) for v, t in zip(k, T)], [mpf(1)] * n)
    s = sqrt(rss / (n - 2))
    constant = log(mpf("1.380649e-23") / mpf("6.62607015e-34"))
    at = mpf("298.15")
    x = 1 / at
    return {
        "table": "W8",
        "enthalpy_J_per_mol": text(-R * slope),
        "enthalpyStandardError": text(R * s / sqrt(xx)),
        "entropy_J_per_mol_K": text(R * (ym - slope * xm - constant)),
        "entropyStandardError": text(R * s * sqrt(mpf(1) / n + xm**2 / xx)),
        "gibbsAt_K": "298.15",
        "gibbs_J_per_mol": text(R * at * (constant - (ym + slope * (x - xm)))),
        "gibbsStandardError": text(R * at * s * sqrt(mpf(1) / n + (x - xm) ** 2 / xx)),
    }


def quadratic(name):
    T, k = table(name)
    x = [1 / t for t in T]
    m = fsum(x) / len(x)
    design = matrix([[1, (v - m) * 1000, ((v - m) * 1000) ** 2] for v in x])
    y = matrix([log(v) for v in k])
    inverse = (design.T * design) ** -1
    p = inverse * (design.T * y)
    r = y - design * p
    return {"table": name, "t": text(p[2] / sqrt(fsum(v * v for v in r) / (len(x) - 3) * inverse[2, 2])), "threshold": text(t975(len(x) - 3))}


content = {
    "weighted": weighted(),
    "bands": bands(),
    "eyring": eyring(),
    "quadratic": [quadratic(name) for name in ("W1", "W3", "W4", "W6", "W8")],
}
(here / "rate-constant-lines.json").write_text(json.dumps(content, indent=2) + "\n")
