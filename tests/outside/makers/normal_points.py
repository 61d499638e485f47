"""Normal tail and quantile for tests/outside/fixtures/normal-points.json.

Made with Python 3.11, SciPy 1.17.1 (scipy.stats.norm.sf and isf).
Run: python3 normal_points.py > ../fixtures/normal-points.json
"""
import json

from scipy.stats import norm

XS = [-8, -4, -2.5, -1, -0.1, 0, 1e-6, 0.1, 0.5, 1, 1.5, 2, 2.4, 2.5, 2.6, 3, 3.5, 4, 5, 5.9, 6.1, 7, 8, 10, 15, 20, 30, 37]
PS = [1e-300, 1e-200, 1e-100, 1e-50, 1e-30, 1e-20, 1e-15, 1e-12, 1e-9, 1e-6, 1e-4, 6e-3, 1e-2, 0.1, 0.3, 0.45, 0.5, 0.7, 0.99]
print(json.dumps({
    "made": "tests/outside/makers/normal_points.py, Python 3.11, SciPy 1.17.1",
    "evidence": "independent",
    "tail": [{"x": x, "Q": float(norm.sf(x))} for x in XS],
    "quantile": [{"p": p, "x": float(norm.isf(p))} for p in PS],
}, indent=1))
