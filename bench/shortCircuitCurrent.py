"""Short-circuit currents of many scans with numpy: the exact integral of two piecewise linear curves, in two ways.

`union` writes the formula on the union of the two grids, one scan after the other. `nodes` takes all scans at once: the
first and second antiderivative of the photon current at every point of every scan, and integration by parts.
Reads JSON from standard input, writes JSON.
"""

import json
import sys
import time

import numpy as np

job = json.load(sys.stdin)
sun_nm = np.array(job["sunNm"])
sun = np.array(job["sun"])
scans_nm = np.array(job["scansNm"])
scans = np.array(job["scans"])


def union():
    out = np.empty(len(scans))
    for k, (nm, eqe) in enumerate(zip(scans_nm, scans)):
        low = max(nm[0], sun_nm[0])
        high = min(nm[-1], sun_nm[-1])
        inside = sun_nm[(sun_nm > low) & (sun_nm < high)]
        grid = np.unique(np.concatenate((nm[(nm >= low) & (nm <= high)], inside, [low, high])))
        f = np.interp(grid, nm, eqe)
        g = np.interp(grid, sun_nm, sun)
        f0, f1, g0, g1 = f[:-1], f[1:], g[:-1], g[1:]
        out[k] = np.sum(np.diff(grid) / 6 * (2 * f0 * g0 + f0 * g1 + f1 * g0 + 2 * f1 * g1))
    return out


width = np.diff(sun_nm)
slope = np.diff(sun) / width
first = np.concatenate(([0], np.cumsum(width * (sun[:-1] + sun[1:]) / 2)))
second = np.concatenate(([0], np.cumsum(width * (first[:-1] + width * (sun[:-1] / 2 + slope * width / 6)))))


def nodes():
    j = np.clip(np.searchsorted(sun_nm, scans_nm, side="right") - 1, 0, width.size - 1)
    t = scans_nm - sun_nm[j]
    g, m = sun[j], slope[j]
    once = first[j] + t * (g + m * t / 2)
    twice = second[j] + t * (first[j] + t * (g / 2 + m * t / 6))
    rise = np.diff(scans, axis=1) / np.diff(scans_nm, axis=1)
    ends = scans[:, -1] * once[:, -1] - scans[:, 0] * once[:, 0]
    return ends - np.sum(rise * np.diff(twice, axis=1), axis=1)


def fastest(function, times):
    function()
    best = np.inf
    for _ in range(times):
        start = time.perf_counter()
        result = function()
        best = min(best, time.perf_counter() - start)
    return best * 1000, result


union_ms, by_union = fastest(union, 3)
nodes_ms, by_nodes = fastest(nodes, 9)
json.dump(
    {
        "ms": {"union": union_ms, "nodes": nodes_ms},
        "arrays": {"union": [by_union.tolist()], "nodes": [by_nodes.tolist()]},
    },
    sys.stdout,
)
