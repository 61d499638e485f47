"""Integrals of noise shapes through closed loops for tests/outside/fixtures/clock-integrals.json.

Written from the published open-loop gain of the third-order loop with the largest phase margin (F. M. Gardner,
Phaselock Techniques, 3rd ed., 2005; C. S. Vaucher, Architectures for RF Frequency Synthesizers, 2002), not from the
TypeScript: adaptive quadrature in the logarithm of the offset, decade by decade.

Made with Python 3.11, SciPy 1.17.1. Run: python3 clock_integrals.py > ../fixtures/clock-integrals.json
"""
import cmath
import json
from math import cos, exp, log, pi, radians, sin

from scipy.integrate import quad

# Invented loops: bandwidth, phase margin, reference, whether sampling delays, corner of tracking, band, modulator.
LOOPS = [
    dict(f_c=1e6, phi=60, f_ref=100e6, delayed=False, f_CDR=4e6, f_1=1e3, f_2=1e9, order=3),
    dict(f_c=4e6, phi=50, f_ref=80e6, delayed=True, f_CDR=10e6, f_1=1e4, f_2=2e9, order=2),
    dict(f_c=200e3, phi=68, f_ref=26e6, delayed=True, f_CDR=4e6, f_1=1e3, f_2=1e8, order=3),
    dict(f_c=9e6, phi=62, f_ref=100e6, delayed=True, f_CDR=1e6, f_1=100.0, f_2=1e9, order=4),
]


def transfers(loop):
    phi = radians(loop["phi"])
    r = (1 + sin(phi)) / cos(phi)

    def both(f):
        u = f / loop["f_c"]
        T = -(1 + 1j * u * r) / (r * u * u * (1 + 1j * u / r))
        if loop["delayed"]:
            T *= cmath.exp(-1j * pi * f / loop["f_ref"])
        return abs(T / (1 + T)) ** 2, 1 / abs(1 + T) ** 2

    return r, both


def integral(g, a, b):
    """Adaptive quadrature in ln f, split at every third of a decade."""
    edges = [a]
    while edges[-1] * 10 ** (1 / 3) < b * 0.999:
        edges.append(edges[-1] * 10 ** (1 / 3))
    edges.append(b)
    total = 0.0
    for lo, hi in zip(edges, edges[1:]):
        total += quad(lambda x: g(exp(x)) * exp(x), log(lo), log(hi), epsrel=1e-11, epsabs=0, limit=400)[0]
    return total


def of(loop):
    r, both = transfers(loop)
    low, high = (lambda f: both(f)[0]), (lambda f: both(f)[1])
    seen = lambda f: f * f / (f * f + loop["f_CDR"] ** 2)
    shapes = {
        "low0": low,
        "low1": lambda f: low(f) / f,
        "high0": high,
        "high1": lambda f: high(f) / f,
        "high2": lambda f: high(f) / f**2,
        "high3": lambda f: high(f) / f**3,
        "highFilter": lambda f: high(f) / (f * f * (1 + (f / (loop["f_c"] * r)) ** 2)),
    }
    modulator = lambda f: low(f) * (2 * sin(pi * f / loop["f_ref"])) ** (2 * (loop["order"] - 1))
    out = {"r": r}
    for name, weight in (("plain", lambda f: 1.0), ("tracked", seen)):
        out[name] = {k: integral(lambda f, g=g: g(f) * weight(f), loop["f_1"], loop["f_2"]) for k, g in shapes.items()}
        top = min(loop["f_2"], loop["f_ref"] / 2)
        out[name]["lowModulator"] = integral(lambda f: modulator(f) * weight(f), loop["f_1"], top)
    return {**loop, **out}


print(json.dumps([of(loop) for loop in LOOPS], indent=1))
