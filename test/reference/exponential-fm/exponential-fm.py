"""Writes mean.csv and lines.csv. Needs mpmath and numpy."""
import csv

import mpmath as mp
import numpy as np

mp.mp.dps = 30


def write(name, header, rows):
    with open(name, "w", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(header)
        out.writerows(rows)


def mean(octaves):
    return mp.besseli(0, mp.mpf(octaves) * mp.log(2))


write(
    "mean.csv",
    ["octaves_peak", "mean_over_f0", "cents"],
    [
        [d, mp.nstr(mean(d), 17), mp.nstr(1200 * mp.log(mean(d), 2), 15)]
        for d in ["0.1", "0.25", "0.5", "1", "2"]
    ],
)


def lines(octaves, ratio, orders=12, points=4096):
    """Magnitudes of the lines at f0·I0 + n·fm of a carrier of f0 = ratio·fm whose frequency is f0·2^(d·sin)."""
    a = octaves * np.log(2)
    t = 2 * np.pi * np.arange(points) / points
    phase = np.zeros(points)
    # exp(a sin t) = I0 + 2 Σ I_k cos(k(t − π/2)); its integral less the mean part
    for k in range(1, 60):
        phase += ratio * 2 * float(mp.besseli(k, a)) / k * np.sin(k * (t - np.pi / 2))
    spectrum = np.fft.fft(np.exp(1j * phase)) / points
    return [abs(spectrum[n % points]) for n in range(-orders, orders + 1)]


write(
    "lines.csv",
    ["octaves_peak", "f0_over_fm"] + [f"n{n}" for n in range(-12, 13)],
    [[d, r] + lines(d, r) for d, r in [(0.1, 10.0), (0.5, 2.0), (1.0, 1.0), (1.0, 4.0)]],
)
