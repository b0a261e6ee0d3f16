"""Writes equal-temperament.csv. Needs mpmath."""
import csv

import mpmath as mp

mp.mp.dps = 30
with open("equal-temperament.csv", "w", newline="") as file:
    out = csv.writer(file, lineterminator="\n")
    out.writerow(["semitones_from_a4", "hertz"])
    for n in [-48, -36, -24, -12, -9, -8, -5, -2, 0, 3, 7, 12, 15, 24, 36, 39]:
        out.writerow([n, mp.nstr(440 * mp.mpf(2) ** (mp.mpf(n) / 12), 20)])
