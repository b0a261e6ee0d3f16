"""Writes attack.csv. Needs mpmath."""
import csv

import mpmath as mp

mp.mp.dps = 30


def text(x):
    return mp.nstr(x, 17)


with open("attack.csv", "w", newline="") as file:
    out = csv.writer(file, lineterminator="\n")
    out.writerow(["aim", "attack_over_tau", "level_at_half_time", "rise_10_90_over_tau"])
    for aim in ["1.01", "1.2", "1.3", "1.5", "2"]:
        a = mp.mpf(aim)
        out.writerow(
            [
                aim,
                text(mp.log(a / (a - 1))),
                text(a * (1 - mp.sqrt((a - 1) / a))),
                text(mp.log((a - mp.mpf("0.1")) / (a - mp.mpf("0.9")))),
            ]
        )
