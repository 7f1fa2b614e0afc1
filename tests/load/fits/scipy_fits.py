"""Fits the benchmark's systems with SciPy: python3 scipy_fits.py REQUESTS.json
Each request holds epochs, places (north, east) with one standard error, and either a shortest period (blind: the grid of fitting/README.md
in NumPy, its best local minima polished by least_squares 'lm') or a start in (ln P, e, T, A, B, F, G) (refit by least_squares 'lm'). Eccentricity is fitted as atanh e, so that lm, which takes no bounds, stays below 1.
Prints one JSON object: the version of SciPy, and for each request chi-square and milliseconds of processor time.
"""
import json
import sys
import time

import numpy as np
import scipy
from scipy.optimize import least_squares

ECCENTRICITIES = ((0.1, 16), (0.5, 32), (0.8, 32), (0.93, 64))
POLISHED_AT_MOST = 6
MOST_EVALUATIONS = 600


def eccentric_anomaly(mean, e):
    """Newton's method from a start that converges for every e below 1."""
    mean = np.mod(mean + np.pi, 2 * np.pi) - np.pi
    anomaly = mean + e * np.sign(mean) * np.minimum(np.abs(mean) + 0.85, 1.0) * 0.85
    for _ in range(50):
        step = (anomaly - e * np.sin(anomaly) - mean) / (1 - e * np.cos(anomaly))
        step = np.clip(step, -1.0, 1.0)
        anomaly = anomaly - step
        if np.max(np.abs(step)) < 1e-13:
            break
    return anomaly


def unit_orbit(t, period, e, passage):
    anomaly = eccentric_anomaly(2 * np.pi * (t - passage) / period, e)
    return np.cos(anomaly) - e, np.sqrt(1 - e * e) * np.sin(anomaly)


def residuals(values, t, north, east, sigma):
    log_period, stretched, passage, a, b, f, g = values
    e = min(abs(np.tanh(stretched)), 0.9999)
    if abs(log_period) > 20:
        return np.full(2 * t.size, 1e6)
    x, y = unit_orbit(t, np.exp(log_period), e, passage)
    return np.concatenate(((a * x + f * y - north) / sigma, (b * x + g * y - east) / sigma))


def polish(start, data):
    start = np.array(start)
    start[1] = np.arctanh(start[1])
    found = least_squares(residuals, start, args=data, method="lm", x_scale="jac", max_nfev=MOST_EVALUATIONS)
    return 2 * found.cost


def periods_of(span, shortest):
    periods = [span * 1.4 ** k for k in range(1, 8) if 1.4 ** k < 12][::-1]
    count = int((span / shortest - 1) / 0.2) + 1
    return np.array(periods + [span / (1 + 0.2 * k) for k in range(max(1, count))])


def scan(data, shortest):
    """Chi-square (up to a constant) of every (P, e) at its best phase."""
    t, north, east, sigma = data
    middle = 0.5 * (t.min() + t.max())
    periods = periods_of(t.max() - t.min(), max(shortest, (t.max() - t.min()) / 60))
    best = np.full((periods.size, len(ECCENTRICITIES)), np.inf)
    phase = np.zeros_like(best)
    for j, (e, phases) in enumerate(ECCENTRICITIES):
        tries = np.arange(phases) / phases
        table_mean = (np.arange(8192) + 0.5) / 8192 * 2 * np.pi
        table = eccentric_anomaly(table_mean, e)
        table_x, table_y = np.cos(table) - e, np.sqrt(1 - e * e) * np.sin(table)
        for i, period in enumerate(periods):
            turns = (t - middle)[None, :] / period - tries[:, None]
            bins = (np.mod(turns, 1.0) * 8192).astype(np.int64) & 8191
            x, y = table_x[bins], table_y[bins]
            xx, xy, yy = (x * x).sum(1), (x * y).sum(1), (y * y).sum(1)
            determinant = xx * yy - xy * xy
            fall = 0.0
            for place in (north, east):
                bx, by = x @ place, y @ place
                fall = fall + (bx * bx * yy - 2 * bx * by * xy + by * by * xx) / np.maximum(determinant, 1e-12)
            k = int(np.argmax(fall))
            best[i, j], phase[i, j] = -fall[k] / sigma ** 2, tries[k]
    return periods, best, phase, middle


def blind(data, shortest):
    t, north, east, _ = data
    periods, best, phase, middle = scan(data, shortest)
    padded = np.pad(best, 1, constant_values=np.inf)
    around = [padded[1 + di:1 + di + best.shape[0], 1 + dj:1 + dj + best.shape[1]] for di in (-1, 0, 1) for dj in (-1, 0, 1)]
    minima = np.argwhere(best <= np.min(around, axis=0))
    minima = sorted(minima.tolist(), key=lambda at: best[at[0], at[1]])[:POLISHED_AT_MOST]
    least = np.inf
    for i, j in minima:
        e, period = ECCENTRICITIES[j][0], periods[i]
        passage = middle + phase[i, j] * period
        x, y = unit_orbit(t, period, e, passage)
        design = np.stack((x, y), axis=1)
        (a, f), (b, g) = (np.linalg.lstsq(design, place, rcond=None)[0] for place in (north, east))
        chi_square = polish([np.log(period), e, passage, a, b, f, g], data)
        least = min(least, chi_square)
    return least


def main():
    with open(sys.argv[1], encoding="utf-8") as file:
        requests = json.load(file)
    answers = []
    for request in requests:
        data = (np.array(request["t"]), np.array(request["north"]), np.array(request["east"]), request["sigma"])
        before = time.process_time()
        chi_square = polish(request["start"], data) if "start" in request else blind(data, request["shortest"])
        answers.append({"chiSquare": float(chi_square), "ms": 1000 * (time.process_time() - before)})
    json.dump({"scipy": scipy.__version__, "answers": answers}, sys.stdout)


main()
