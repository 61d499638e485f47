"""Tails of interference plus noise for tests/outside/fixtures/eye-points.json.

Written from the definition, not from the TypeScript: the discrete distribution of a sum of cursors, each times one of M
equally likely levels, by direct convolution on a grid that holds every value exactly; the Gaussian part by SciPy's
survival function over every point of it.

Made with Python 3.11, SciPy 1.17.1. Run: python3 eye_points.py > ../fixtures/eye-points.json
"""
import json

import numpy as np
from scipy.stats import norm

GRID = 20e-6  # volts; every cursor divided by M - 1 is a multiple of it


def cursors_of(count, first, fall, seed):
    """Invented cursors that die away, rounded to the grid, signs and sizes shaken."""
    rng = np.random.default_rng(seed)
    sizes = first * np.exp(-np.arange(count) / fall) * rng.uniform(0.3, 1.0, count)
    return np.rint(sizes * rng.choice([-1, 1], count)).astype(int)


def tail(units, levels, sigma, xs):
    pmf = np.array([1.0])
    for u in units:
        kernel = np.zeros(2 * abs(u) * (levels - 1) + 1)
        for level in range(levels):
            kernel[level * 2 * abs(u)] += 1 / levels
        pmf = np.convolve(pmf, kernel)
    at = (np.arange(len(pmf)) - (len(pmf) - 1) / 2) * GRID
    return [float(np.sum(pmf * norm.sf((x - at) / sigma))) for x in xs]


CASES = [
    dict(levels=2, sigma=2e-3, units=cursors_of(12, 400, 4, 1)),
    dict(levels=4, sigma=1e-3, units=cursors_of(20, 90, 5, 2)),
    dict(levels=4, sigma=0.4e-3, units=cursors_of(30, 60, 8, 3)),
    dict(levels=8, sigma=0.5e-3, units=cursors_of(10, 30, 4, 4)),
]

out = []
for case in CASES:
    units, levels, sigma = case["units"], case["levels"], case["sigma"]
    peak = (levels - 1) * float(np.sum(np.abs(units))) * GRID
    xs = [share * (peak + 4 * sigma) for share in (0.02, 0.1, 0.25, 0.4, 0.6, 0.8, 0.95)]
    out.append(
        dict(
            levels=levels,
            sigma=sigma,
            cursors=[float(u * (levels - 1) * GRID) for u in units],
            points=[dict(x=x, p=p) for x, p in zip(xs, tail(units, levels, sigma, xs))],
        )
    )
print(json.dumps(out, indent=1))
