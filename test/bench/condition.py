"""Times plain NumPy and SciPy on the conditioning methods that Rimlight has, for bench.ts.

    python3 condition.py CUBE.npy        (128 x 128 x 1024 counts; prints seconds as JSON)

Each is written as one would write it for a map: vectorised over all pixels, arPLS by sparse solves.
"""

import json
import sys
import time

import numpy as np
from scipy import sparse
from scipy.interpolate import PchipInterpolator
from scipy.sparse.linalg import spsolve

counts = np.load(sys.argv[1]).astype(float)
ny, nx, nk = counts.shape


def score(x):
    d = np.diff(x, axis=-1)
    rest = d - np.median(d, axis=-1, keepdims=True)
    return 0.6745 * rest / np.median(np.abs(rest), axis=-1, keepdims=True)


def replaced(x, marks):
    out = x.copy()
    for y, xx in np.argwhere(marks.any(axis=-1)):
        good = ~marks[y, xx]
        k = np.arange(nk)
        out[y, xx, ~good] = np.interp(k[~good], k[good], x[y, xx, good])
    return out


def spikes(z):
    up = z > 6
    marks = np.zeros((ny, nx, nk), bool)
    marks[..., 1:] = up
    return marks


def spectral():
    return replaced(counts, spikes(score(counts)))


def neighbour():
    wide = np.pad(counts, ((1, 1), (1, 1), (0, 0)), mode="edge")
    places = [(dy, dx) for dy in range(3) for dx in range(3) if (dy, dx) != (1, 1)]
    median = np.median(np.stack([wide[dy : dy + ny, dx : dx + nx] for dy, dx in places]), axis=0)
    scaled = median * (counts.sum(-1) / median.sum(-1))[..., None]
    return replaced(counts, spikes(score(counts - scaled)))


def response():
    curve = PchipInterpolator([0, 300, 700, 1023], [0.9, 0.8, 0.5, 0.2])(np.arange(nk))
    return counts / curve, counts / curve**2


def svd():
    x = counts.reshape(-1, nk)
    scale = np.sqrt(np.outer(x.sum(1), x.sum(0)) / x.sum())
    u, s, vt = np.linalg.svd(x / scale, full_matrices=False)
    return (u[:, :8] * s[:8]) @ vt[:8] * scale


d = sparse.diags([1, -2, 1], [0, 1, 2], shape=(nk - 2, nk))
penalty = 1e5 * (d.T @ d).tocsc()


def arpls(y):
    w = np.ones(nk)
    for _ in range(20):
        z = spsolve(sparse.diags(w, format="csc") + penalty, w * y)
        rest = y - z
        below = rest[rest < 0]
        m, s = below.mean(), below.std(ddof=1)
        with np.errstate(over="ignore"):
            new = 1 / (1 + np.exp(2 * (rest - (2 * s - m)) / s))
        done = np.linalg.norm(new - w) < 1e-3 * np.linalg.norm(w)
        w = new
        if done:
            break
    return z


def seconds(work, times):
    taken = []
    for _ in range(times):
        start = time.perf_counter()
        work()
        taken.append(time.perf_counter() - start)
    return sorted(taken)[len(taken) // 2]


some = counts.reshape(-1, nk)[:: ny * nx // 64]
print(
    json.dumps(
        {
            "spectral": seconds(spectral, 3),
            "neighbour": seconds(neighbour, 1),
            "response": seconds(response, 3),
            "svd": seconds(svd, 1),
            "arpls": seconds(lambda: [arpls(y) for y in some], 1) / len(some),
        }
    )
)
