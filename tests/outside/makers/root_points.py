"""Roots for tests/outside/fixtures/root-points.json.

Made with Python 3.11, SciPy 1.17.1 (scipy.optimize.brentq, xtol 1e-15, rtol 8.9e-16).
Run: python3 root_points.py > ../fixtures/root-points.json
The names are those of the functions in tests/numeric/root.test.ts.
"""
import json
import math

from scipy.optimize import brentq

FUNCTIONS = {
    "cubic": (lambda x: x**3 - 2 * x - 5, 2, 3),
    "quintic": (lambda x: x**5 - x - 1, 1, 2),
    "triple": (lambda x: (x - 0.7) ** 3, 0, 2),
    "cosine": (lambda x: math.cos(x) - x, 0, 1),
    "logarithm": (lambda x: 2 * math.exp(x) + x - 3, -20, 5),
    "steep": (lambda x: math.atan(1e6 * (x - 0.3)), 0, 1),
    "flat": (lambda x: math.exp(-x) - 1e-9, 0, 100),
    "wide": (lambda x: math.log(x) - 5, 1e-6, 1e9),
}
roots = {name: {"from": a, "to": b, "root": brentq(f, a, b, xtol=1e-15, rtol=8.9e-16, maxiter=500)}
         for name, (f, a, b) in FUNCTIONS.items()}
print(json.dumps({
    "made": "tests/outside/makers/root_points.py, Python 3.11, SciPy 1.17.1 brentq",
    "evidence": "independent",
    "roots": roots,
}, indent=1))
