"""Other solvers on the spectra of fit-bench.ts: python3 fit-peers.py problem.json WORKLOAD. Prints JSON.

scipy.optimize.curve_fit (MINPACK's lmder below it) with analytic and with numeric derivatives, weighted least squares with
the data's own weights; and the Poisson likelihood to its minimum, by Newton steps from there.
"""
import json
import sys
import time

import numpy as np
from scipy.optimize import curve_fit
from scipy.special import erf, erfcx

problem = json.load(open(sys.argv[1]))
edges = np.array(problem["edges"])
centres = 0.5 * (edges[1:] + edges[:-1])
widths = np.diff(edges)
middle = 0.5 * (edges[0] + edges[-1])
spectra = np.fromfile(problem["spectra"]).reshape(-1, len(centres))
shapes = problem["shapes"]
fixed = np.array(problem["fixed"])
start = np.array(problem["start"])
FWHM = 2.3548200450309493


def normal_integral(x):
    return 0.5 * erf(x / np.sqrt(2))


def gaussian(area, centre, fwhm):
    s = fwhm / FWHM
    z = (edges - centre) / s
    bell = np.exp(-0.5 * z * z) / np.sqrt(2 * np.pi)
    share = np.diff(normal_integral(z))
    return area * share, [share, -area * np.diff(bell) / s, -area * np.diff(z * bell) / s / FWHM]


def lorentzian(area, centre, fwhm):
    g = fwhm / 2
    x = edges - centre
    share = np.diff(np.arctan(x / g)) / np.pi
    density = g / np.pi / (x * x + g * g)
    return area * share, [share, -area * np.diff(density), -0.5 * area * np.diff(x * density) / g]


def tailed(area, centre, fwhm, tail):
    s = fwhm / FWHM
    x = edges - centre
    u = x / s
    bell = np.exp(-0.5 * u * u)
    f = 0.5 / tail * bell * erfcx((s / tail + u) / np.sqrt(2))
    g = bell / np.sqrt(2 * np.pi) / s
    slope = (f - g) / tail
    by_tail = -(x * f + s * s * slope) / tail
    share = np.diff(normal_integral(u)) + tail * np.diff(f)
    columns = [share, -area * np.diff(f), area * s * np.diff(slope) / FWHM, area * np.diff(by_tail)]
    return area * share, columns


def model(parameters):
    counts = np.zeros(len(centres))
    columns = []
    at = 0
    for shape in shapes:
        if shape in ("flat", "line"):
            x = centres - middle
            own = [np.ones_like(x), x][: 1 if shape == "flat" else 2]
            value = sum(p * c for p, c in zip(parameters[at:], own))
        elif shape == "gaussian":
            value, own = gaussian(*parameters[at : at + 3])
        elif shape == "lorentzian":
            value, own = lorentzian(*parameters[at : at + 3])
        elif shape == "tailed":
            value, own = tailed(*parameters[at : at + 4])
        else:
            area, centre, fwhm, eta = parameters[at : at + 4]
            g, dg = gaussian(area, centre, fwhm)
            l, dl = lorentzian(area, centre, fwhm)
            value = g + eta * (l - g)
            own = [a + eta * (b - a) for a, b in zip(dg, dl)] + [l - g]
        counts += value
        columns += own
        at += len(own)
    return counts, np.array(columns)[~fixed]


def whole(free):
    parameters = start.copy()
    parameters[~fixed] = free
    return parameters


def deviance(n, mu):
    return 2 * np.sum(mu - n + np.where(n > 0, n * np.log(np.maximum(n, 1) / mu), 0))


def poisson(n, free):
    mu, j = model(whole(free))
    d = deviance(n, mu)
    damping = 0.0
    for _ in range(200):
        w = 1 / mu
        h = (j * w) @ j.T
        g = j @ (n * w - 1)
        scale = 1 / np.sqrt(np.diag(h))
        a = h * np.outer(scale, scale) + damping * np.eye(len(g))
        step = scale * np.linalg.solve(a, scale * g)
        trial, tj = model(whole(free + step))
        td = deviance(n, trial) if trial.min() > 0 else np.inf
        if td <= d:
            gain = d - td
            free, mu, j, d = free + step, trial, tj, td
            damping *= 0.1
            if gain < 1e-9 and damping < 1e-6:
                break
        else:
            damping = max(1e-3, damping * 10)
            if damping > 1e9:
                break
    return d


def timed(name, runs, jac):
    free = start[~fixed]
    begun = time.perf_counter()
    for n in spectra[:runs]:
        curve_fit(
            lambda _, *p: model(whole(np.array(p)))[0],
            centres,
            n,
            p0=free,
            sigma=np.sqrt(np.maximum(n, 1)),
            jac=(lambda _, *p: model(whole(np.array(p)))[1].T) if jac else None,
            ftol=1e-6,
            maxfev=2000,
        )
    return {"name": name, "microseconds": 1e6 * (time.perf_counter() - begun) / runs, "deviances": []}


runs = 24
results = [timed("scipy curve_fit, analytic derivatives", runs, True), timed("scipy curve_fit, numeric derivatives", 8, False)]
begun = time.perf_counter()
best = [poisson(n, start[~fixed]) for n in spectra[:runs]]
results.append(
    {
        "name": "numpy, Poisson likelihood to the end",
        "microseconds": 1e6 * (time.perf_counter() - begun) / runs,
        "deviances": best,
    }
)
print(json.dumps(results))
