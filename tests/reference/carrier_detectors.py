#!/usr/bin/python3
"""Reference values of the carrier detectors: S-curves, variances and symbol error rates by quadrature over the plane.

Written from the definitions alone: z = a e^(j phi) + n, E|a|^2 = 1, noise of variance 1/(2 gamma) on each rail; the error
e(z) of each detector on a lattice of points that no decision border meets; the mean over all symbols is the sum of the
density of z times e(z) (two-dimensional Simpson rule of scipy.integrate, or its midpoint rule where e jumps).

Run with Debian 12's python3 3.11.2, numpy 1.24.2, scipy 1.10.1:

    /usr/bin/python3 tests/reference/carrier_detectors.py > tests/reference/carrier-detectors.json
"""
import json
import sys

import numpy as np
import scipy
from scipy import integrate


def ring(count, first, radius):
    return radius * np.exp(1j * (first + 2 * np.pi * np.arange(count) / count))


def points(modulation):
    if modulation == "BPSK":
        a = np.array([1, -1], dtype=complex)
    elif modulation == "QPSK":
        a = ring(4, np.pi / 4, 1)
    elif modulation == "8PSK":
        a = ring(8, 0, 1)
    elif modulation.endswith("QAM"):
        side = int(np.sqrt(int(modulation[:-3])))
        rails = np.arange(-side + 1, side, 2)
        a = (rails[:, None] + 1j * rails[None, :]).ravel()
    elif modulation == "16APSK":
        a = np.concatenate([ring(4, np.pi / 4, 1), ring(12, np.pi / 12, 2.85)])
    else:
        a = np.concatenate([ring(4, np.pi / 4, 1), ring(12, np.pi / 12, 2.84), ring(16, 0, 5.27)])
    return a / np.sqrt(np.mean(np.abs(a) ** 2))


def nearest(z, a):
    best, distance = np.zeros(z.shape, dtype=int), np.full(z.shape, np.inf)
    for i, point in enumerate(a):
        d = np.abs(z - point) ** 2
        closer = d < distance
        best[closer], distance[closer] = i, d[closer]
    return best


def error(detector, modulation, z, a):
    if detector == "costas":
        return z.real * z.imag
    if detector == "sign":
        if modulation == "BPSK":
            return np.where(z.real >= 0, 1, -1) * z.imag
        return np.where(z.real >= 0, 1, -1) * z.imag - np.where(z.imag >= 0, 1, -1) * z.real
    if detector == "decision":
        return (z * np.conj(a[nearest(z, a)])).imag
    power = {"BPSK": 2, "QPSK": 4, "8PSK": 8}[modulation]
    return np.sign(np.mean(a**power).real) * (z**power).imag  # power-law as the integers do it


SHIFTS = [(k * 0.618034 % 1, k * 0.754878 % 1) for k in range(1, 15)]  # of the lattice: their mean meets a border everywhere


def lattice(a, sigma, shift=(0.4142, 0.4142)):
    reach = np.max(np.abs(a)) + 6.5 * sigma
    step = sigma / 11.37
    axis = np.arange(-reach, reach, step)
    return (axis + shift[0] * step)[:, None] + 1j * (axis + shift[1] * step)[None, :], axis


def density(z, a, sigma):
    total = np.zeros(z.shape)
    for point in a:
        total += np.exp(-np.abs(z - point) ** 2 / (2 * sigma**2))
    return total / (len(a) * 2 * np.pi * sigma**2)


def mean(values, axis, smooth):
    if smooth:
        return float(integrate.simpson(integrate.simpson(values, x=axis), x=axis))
    return float(values.sum() * (axis[1] - axis[0]) ** 2)


def curve(modulation, detector, decibels):
    a, sigma = points(modulation), np.sqrt(0.5 * 10 ** (-decibels / 10))
    smooth = detector in ("costas", "power-law")
    symmetry = {"BPSK": 2, "8PSK": 8}.get(modulation, 4)
    phases = [round(2 * np.pi / symmetry * share, 6) for share in (0.04, 0.11, 0.19, 0.31, 0.43)]
    h = 1e-3
    rows = []
    for shift in SHIFTS[:1] if smooth else SHIFTS:
        z, axis = lattice(a, sigma, shift)
        e = error(detector, modulation, z, a)
        at = lambda phi: mean(density(z, a * np.exp(1j * phi), sigma) * e, axis, smooth)
        p0 = density(z, a, sigma)
        rows.append([at(phi) for phi in phases] + [(at(h) - at(-h)) / (2 * h), mean(p0 * e**2, axis, smooth), mean(p0 * e, axis, smooth)])
    *s, slope, square, bias = np.mean(rows, axis=0)
    return {"modulation": modulation, "detector": detector, "esN0Db": decibels, "phases": phases, "s": s, "gain": slope, "variance": square - bias**2}


def error_rate(modulation, decibels, phase):
    a, sigma = points(modulation), np.sqrt(0.5 * 10 ** (-decibels / 10))
    z, axis = lattice(a, sigma)
    best = nearest(z, a)
    right = sum(
        float((np.exp(-np.abs(z - p * np.exp(1j * phase)) ** 2 / (2 * sigma**2)) * (best == i)).sum()) for i, p in enumerate(a)
    )
    rate = 1 - right * (axis[1] - axis[0]) ** 2 / (len(a) * 2 * np.pi * sigma**2)
    return {"modulation": modulation, "esN0Db": decibels, "phase": phase, "rate": rate}


CURVES = [
    *[("BPSK", d, db) for d in ("costas", "sign", "decision", "power-law") for db in (0, 6)],
    *[("QPSK", d, db) for d in ("sign", "decision", "power-law") for db in (3, 10, 15)],
    *[("8PSK", d, db) for d in ("decision", "power-law") for db in (10, 15)],
    *[("16QAM", "decision", db) for db in (10, 15, 20)],
    *[("64QAM", "decision", db) for db in (18, 22)],
    *[("16APSK", "decision", db) for db in (10, 15, 20)],
    *[("32APSK", "decision", db) for db in (15, 20)],
]
RATES = [
    (m, db, phase)
    for m, levels in {"BPSK": (0, 4), "QPSK": (3, 8), "8PSK": (8, 13), "16QAM": (10, 15), "64QAM": (15, 21), "16APSK": (10, 15), "32APSK": (12, 17)}.items()
    for db in levels
    for phase in (0.0, 0.05, 0.12)
]

if __name__ == "__main__":
    made = f"python {sys.version.split()[0]}, numpy {np.__version__}, scipy {scipy.__version__}"
    row = lambda x: json.dumps(x, separators=(",", ":"))
    curves = ",\n".join(row(curve(*c)) for c in CURVES)
    rates = ",\n".join(row(error_rate(*c)) for c in RATES)
    print("{\n" + f'"madeWith": {json.dumps(made)},\n"curves": [\n{curves}\n],\n"errorRates": [\n{rates}\n]\n' + "}")
