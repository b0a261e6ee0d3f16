"""Writes thermal-voltage.csv. Needs mpmath."""
import csv

import mpmath as mp

mp.mp.dps = 40
k = mp.mpf("1.380649e-23")
q = mp.mpf("1.602176634e-19")


def text(x, digits=17):
    return mp.nstr(x, digits, min_fixed=-5, max_fixed=12)


with open("thermal-voltage.csv", "w", newline="") as file:
    out = csv.writer(file, lineterminator="\n")
    out.writerow(
        ["celsius", "kelvin", "thermal_voltage_V", "twice_V", "gm_per_bias_current_per_V", "per_octave_V", "per_decade_V"]
    )
    for celsius in ["0", "20", "25", "27", "50"]:
        kelvin = mp.mpf("273.15") + mp.mpf(celsius)
        v = k * kelvin / q
        out.writerow(
            [celsius, text(kelvin, 8), text(v), text(2 * v), text(1 / (2 * v)), text(v * mp.log(2)), text(v * mp.log(10))]
        )
