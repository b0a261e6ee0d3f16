"""Writes control.csv and modulation.csv. Needs mpmath, numpy and scipy."""
import csv

import mpmath as mp
import numpy as np
from scipy.special import wrightomega

mp.mp.dps = 40
thermal_voltage = mp.mpf("1.380649e-23") * mp.mpf("298.15") / mp.mpf("1.602176634e-19")
ohms = mp.mpf(120000)
saturation = mp.mpf("1e-14")


def write(name, header, rows):
    with open(name, "w", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(header)
        out.writerows(rows)


def bias_current(control):
    volts = mp.mpf(control) + 12
    w = mp.lambertw(saturation * ohms / thermal_voltage * mp.exp((volts + saturation * ohms) / thermal_voltage)).real
    return thermal_voltage / ohms * w - saturation


def peak(control):
    return bias_current(control) * 10000 * mp.tanh(mp.mpf("0.05") / (2 * thermal_voltage))


write(
    "control.csv",
    ["control_V", "peak_V"],
    [[c, mp.nstr(peak(c), 17)] for c in ["-12", "-11.5", "-11", "-10", "-8", "-6", "-4", "0", "4", "8", "10", "12"]],
)


def modulation(mean, swing, points=1 << 18):
    """Lines of the bias current under mean + swing·sin, relative to its mean: sidebands 1 … 4 of every harmonic."""
    v, r, s = float(thermal_voltage), float(ohms), float(saturation)
    volts = mean + 12 + swing * np.sin(2 * np.pi * np.arange(points) / points)
    current = v / r * wrightomega(np.log(s * r / v) + (volts + s * r) / v) - s
    spectrum = np.abs(np.fft.rfft(current)) / points
    return [spectrum[0]] + [spectrum[n] / spectrum[0] for n in range(1, 5)]


write(
    "modulation.csv",
    ["mean_V", "swing_V", "mean_A", "first", "second", "third", "fourth"],
    [[m, s] + modulation(m, s) for m, s in [(0.0, 6.0), (0.0, 11.0), (-0.35, 11.65)]],
)
