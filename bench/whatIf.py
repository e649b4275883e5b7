"""Beer-Lambert what-if with numpy: one evaluation, and a map of two thicknesses in two ways.

`direct` writes the formula down for a whole row of the map at once. `separable` uses that every factor belongs to one
junction: a table of exponentials for each axis and one matrix product. Both apply the same rule where the measured
absorptance is too small to divide by. Reads JSON from standard input, writes JSON.
"""

import json
import sys
import time

import numpy as np

job = json.load(sys.stdin)
alpha = np.array(job["alpha"]) * 1e-7
depth_per_nm = alpha * np.array(job["pathFactor"])[:, None]
thickness = np.array(job["thickness"], dtype=float)
eqe = np.array(job["eqe"])
weights = np.array(job["weights"])
x = np.array(job["x"])
y = np.array(job["y"])

depth = depth_per_nm * thickness[:, None]
own = -np.expm1(-depth)
arriving = np.vstack([np.ones(depth.shape[1]), np.exp(-depth[0])])
absorbed = own * arriving
weak = (own < job["ownShare"]) | (absorbed < job["absorptance"])


def continued(p):
    """EQE/A, carried on from the last value that means something."""
    good = np.where(weak[p], 0, np.arange(weak.shape[1]))
    index = np.maximum.accumulate(good)
    first = np.argmin(weak[p])
    index = np.where(np.arange(index.size) < first, first, index)
    return np.maximum(0, eqe[p, index] / absorbed[p, index])


collection = np.vstack([continued(0), continued(1)])


def anchored(p, ratio, now):
    """EQE' of junction p for A'/A and A' of any shape (..., wavelengths)."""
    gained = np.where(weak[p], now - absorbed[p], 0)
    return np.where(gained > 0, eqe[p] + collection[p] * gained, eqe[p] * ratio)


def evaluate(top, bottom):
    own_top = -np.expm1(-depth_per_nm[0] * top)
    own_bottom = -np.expm1(-depth_per_nm[1] * bottom)
    passed = np.exp(-depth_per_nm[0] * top)
    with np.errstate(divide="ignore", invalid="ignore"):
        first = anchored(0, own_top / own[0], own_top)
        second = anchored(1, passed / arriving[1] * (own_bottom / own[1]), passed * own_bottom)
    return first @ weights, second @ weights


def direct():
    out = np.empty((2, y.size, x.size))
    top = x[:, None]
    for row, bottom in enumerate(y):
        out[0, row], out[1, row] = evaluate(top, bottom)
    return out


def separable():
    out = np.empty((2, y.size, x.size))
    own_top = -np.expm1(-depth_per_nm[0] * x[:, None])
    passed = np.exp(-depth_per_nm[0] * x[:, None])
    own_bottom = -np.expm1(-depth_per_nm[1] * y[:, None])
    out[0] = anchored(0, own_top / own[0], own_top) @ weights
    clear = ~weak[1]
    left = passed[:, clear] / arriving[1, clear] * (weights[clear] * eqe[1, clear])
    right = own_bottom[:, clear] / own[1, clear]
    out[1] = right @ left.T
    rest = weak[1]
    if rest.any():
        now = own_bottom[:, None, rest] * passed[None, :, rest]
        gained = now - absorbed[1, rest]
        ratio = now / absorbed[1, rest]
        curve = np.where(gained > 0, eqe[1, rest] + collection[1, rest] * gained, eqe[1, rest] * ratio)
        out[1] += curve @ weights[rest]
    return out


def fastest(function, times):
    function()
    best = np.inf
    for _ in range(times):
        start = time.perf_counter()
        result = function()
        best = min(best, time.perf_counter() - start)
    return best * 1000, result


evaluate_ms, one = fastest(lambda: evaluate(*job["change"]), 200)
direct_ms, direct_map = fastest(direct, 3)
separable_ms, separable_map = fastest(separable, 9)
json.dump(
    {
        "ms": {"evaluate": evaluate_ms, "direct": direct_ms, "separable": separable_ms},
        "arrays": {
            "evaluate": [[float(one[0])], [float(one[1])]],
            "direct": [direct_map[p].ravel().tolist() for p in (0, 1)],
            "separable": [separable_map[p].ravel().tolist() for p in (0, 1)],
        },
    },
    sys.stdout,
)
