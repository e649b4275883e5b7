"""The same Monte Carlo with numpy: reads the prepared device as JSON, writes the fastest times and statistics as JSON.

Same model, same prepared tables, same statistics as the engine; numpy's fastest generator (SFC64), whole arrays at a
time, noise in blocks that stay in the cache and without new allocations.
"""

import json
import sys
import time

import numpy as np

BLOCK = 500


def draw(device, every_point, rng):
    draws = device["draws"]
    junctions = device["junctions"]
    count = len(junctions)
    factor = np.ones((count, draws))
    added = np.zeros((count, draws))
    offset = np.zeros((count, draws))
    for source in device["sources"]:
        effects = source["effects"]
        points = next((e for e in effects if e and e["type"] == "points"), None)
        if points is None or not every_point:
            if source["distribution"] == "normal":
                z = rng.standard_normal(draws)
            else:
                z = np.sqrt(3) * (2 * rng.random(draws) - 1)
        for i, effect in enumerate(effects):
            if effect is None:
                continue
            kind = effect["type"]
            if kind == "scale":
                factor[i] *= 1 + effect["relative"] * z
            elif kind == "shift":
                offset[i] += effect["nm"] * z
            elif kind == "shape":
                added[i] += effect["currentMaCm2"] * z
            elif not every_point:
                added[i] += np.sqrt(np.sum(effect["weighted"] ** 2)) * z
            else:
                weighted = effect["weighted"]
                block = np.empty((BLOCK, weighted.size))
                for start in range(0, draws, BLOCK):
                    rng.standard_normal(out=block)
                    added[i, start : start + BLOCK] += block @ weighted
    currents = np.empty((count, draws))
    for i, junction in enumerate(junctions):
        currents[i] = factor[i] * (cubic(junction, offset[i]) + added[i])
    return currents


def cubic(junction, offset):
    y = junction["table"]
    p = (offset - junction["lowestNm"]) / junction["stepNm"]
    i = np.clip(p.astype(np.int64), 1, y.size - 3)
    t = p - i
    a, b, c, d = y[i - 1], y[i], y[i + 1], y[i + 2]
    slope = c - a / 3 - b / 2 - d / 6
    return b + t * (slope + t * (0.5 * (a - 2 * b + c) + t * (d - a + 3 * (b - c)) / 6))


def summary(sample):
    low, high = np.quantile(sample, [0.025, 0.975])
    return {"mean": float(sample.mean()), "uncertainty": float(sample.std(ddof=1)), "interval95": [float(low), float(high)]}


def evaluate(currents, higher, lower):
    low = currents.min(axis=0)
    return {
        "currents": [summary(row) for row in currents],
        "limitingCurrent": summary(low),
        "correlation": np.corrcoef(currents).tolist(),
        "mismatch": summary(100 * (currents[higher] / currents[lower] - 1)),
        "spread": summary(100 * (currents.max(axis=0) - low) / low),
        "limitingProbability": (np.bincount(currents.argmin(axis=0), minlength=len(currents)) / low.size).tolist(),
    }


def main():
    device = json.load(sys.stdin)
    for junction in device["junctions"]:
        junction["table"] = np.array(junction["table"])
    for source in device["sources"]:
        for effect in source["effects"]:
            if effect and effect["type"] == "points":
                effect["weighted"] = np.array(effect["pointsMaCm2"])
    milliseconds = {}
    arrays = {}
    for name, every_point in (("everyPoint", True), ("exactSum", False)):
        rng = np.random.Generator(np.random.SFC64(2026))
        fastest = np.inf
        for _ in range(device["repeats"] + 2):
            started = time.perf_counter()
            result = evaluate(draw(device, every_point, rng), device["higher"], device["lower"])
            fastest = min(fastest, 1000 * (time.perf_counter() - started))
        milliseconds[name] = fastest
        parts = [*result["currents"], result["limitingCurrent"], result["mismatch"], result["spread"]]
        arrays[name] = [[part["mean"], part["uncertainty"]] for part in parts]
    json.dump({"ms": milliseconds, "arrays": arrays}, sys.stdout)


main()
