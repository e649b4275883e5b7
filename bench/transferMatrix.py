"""Transfer matrix with numpy at normal incidence: R, T and every layer's absorptance over a map of two thicknesses.

Two ways, each vectorised over all wavelengths and one row of the map: the textbook product of characteristic matrices
with the flux at every interface, and the recursion of reflection amplitudes. Reads JSON, writes JSON.
"""

import json
import sys
import time

import numpy as np

job = json.load(sys.stdin)
wavelength = np.array(job["wavelength"])
index = np.array(job["n"]) + 1j * np.array(job["k"])
thickness = np.array(job["thickness"], dtype=float)
exit_index = complex(*job["exit"])
first, second = job["varied"]
absorber = job["absorber"]
x = np.array(job["x"])
y = np.array(job["y"])
layers = len(index)
wave_number = 2 * np.pi / wavelength


def row_thickness(d_second):
    d = [np.full((1, 1), t) for t in thickness]
    d[first] = x[:, None]
    d[second] = np.full((1, 1), d_second)
    return d


def matrix_row(d_second):
    """Fields from the rear: (E, H) at each interface; the flux is Re(E H*)."""
    d = row_thickness(d_second)
    shape = (x.size, wavelength.size)
    e = np.ones(shape, complex)
    h = np.full(shape, exit_index)
    fluxes = [np.real(e * np.conj(h))]
    for layer in range(layers - 1, -1, -1):
        delta = wave_number * index[layer] * d[layer]
        c, s = np.cos(delta), np.sin(delta)
        e, h = c * e - 1j * s / index[layer] * h, -1j * index[layer] * s * e + c * h
        fluxes.append(np.real(e * np.conj(h)))
    incident = np.abs(e + h) ** 2 / 4
    reflectance = np.abs(e - h) ** 2 / 4 / incident
    fluxes = [flux / incident for flux in reversed(fluxes)]
    absorptance = [fluxes[i] - fluxes[i + 1] for i in range(layers)]
    return reflectance, fluxes[-1], absorptance


media = np.vstack([np.ones(wavelength.size), index, np.full(wavelength.size, exit_index)])
fresnel = (media[:-1] - media[1:]) / (media[:-1] + media[1:])


def recursion_row(d_second):
    d = row_thickness(d_second)
    gamma = np.broadcast_to(fresnel[layers], (x.size, wavelength.size))
    front, through, passes = [0] * (layers + 1), [0] * (layers + 1), [1] * (layers + 1)
    below = 0
    for j in range(layers, -1, -1):
        r = fresnel[j]
        if j < layers:
            phase = np.exp(2j * wave_number * index[j] * d[j])
            below = gamma * phase
            passes[j] = np.abs(phase)
            front[j] = below
        bottom = 1 + r * below
        through[j] = np.abs(1 + r) ** 2 / np.abs(bottom) ** 2
        gamma = (r + below) / bottom
    fluxes = []
    intensity = 1
    for j in range(layers + 1):
        intensity = intensity * through[j]
        eta, f = media[j + 1], front[j]
        fluxes.append(intensity * (eta.real * (1 - np.abs(f) ** 2) + 2 * eta.imag * np.imag(f)))
        intensity = intensity * passes[j]
    absorptance = [fluxes[i] - fluxes[i + 1] for i in range(layers)]
    return np.abs(gamma) ** 2, fluxes[-1], absorptance


def map_of(row):
    mean = np.empty((y.size, x.size))
    worst = 0.0
    for i, d_second in enumerate(y):
        reflectance, transmittance, absorptance = row(d_second)
        total = reflectance + transmittance + sum(absorptance)
        worst = max(worst, np.abs(total - 1).max())
        mean[i] = absorptance[absorber].mean(axis=1)
    return mean


def fastest(function, times):
    best = np.inf
    for _ in range(times):
        start = time.perf_counter()
        result = function()
        best = min(best, time.perf_counter() - start)
    return best * 1000, result


matrix_ms, matrix_map = fastest(lambda: map_of(matrix_row), 3)
recursion_ms, recursion_map = fastest(lambda: map_of(recursion_row), 3)
json.dump(
    {
        "ms": {"matrix": matrix_ms, "recursion": recursion_ms},
        "arrays": {"matrix": [matrix_map.ravel().tolist()], "recursion": [recursion_map.ravel().tolist()]},
    },
    sys.stdout,
)
