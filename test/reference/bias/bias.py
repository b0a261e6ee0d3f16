"""Writes lambert-w.csv and temperature.csv. Needs mpmath."""
import csv

import mpmath as mp

mp.mp.dps = 40
k = mp.mpf("1.380649e-23")
q = mp.mpf("1.602176634e-19")
room = mp.mpf("298.15")


def text(x):
    return mp.nstr(x, 17)


def bias_current(volts, ohms, saturation, drops, kelvin):
    """Kirchhoff at a pin of `drops` junctions: volts = I·ohms + drops·(kT/q)·ln(1 + I/saturation)."""
    v = drops * k * kelvin / q
    w = mp.lambertw(saturation * ohms / v * mp.exp((volts + saturation * ohms) / v)).real
    current = v / ohms * w - saturation
    residual = volts - current * ohms - v * mp.log(1 + current / saturation)
    assert abs(residual) < mp.mpf("1e-30")
    return current


def write(name, header, rows):
    with open(name, "w", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(header)
        out.writerows(rows)


write(
    "lambert-w.csv",
    ["drops", "saturation_A", "volts", "ohms", "amperes"],
    [
        [drops, saturation, volts, ohms, text(bias_current(*map(mp.mpf, [volts, ohms, saturation, drops]), room))]
        for drops, saturation in [("1", "1e-14"), ("1", "1e-16"), ("2", "1e-14"), ("2", "2.5e-9")]
        for volts in ["0.04", "0.3", "0.5", "0.6", "0.7", "1", "2", "5", "12", "17", "23.3", "24"]
        for ohms in ["120000", "27000"]
    ],
)


def saturation_at(kelvin):
    """Silicon junction, 10 fA at 25 °C, proportional to T³·exp(−1.12 eV/kT)."""
    gap = mp.mpf("1.12") * q / k
    return mp.mpf("1e-14") * (kelvin / room) ** 3 * mp.exp(gap * (1 / room - 1 / kelvin))


def drop_at(kelvin, amperes):
    return k * kelvin / q * mp.log(1 + amperes / saturation_at(kelvin))


def drift(amperes):
    """Slope of the drop in temperature at 25 °C, from its closed form."""
    drop = drop_at(room, amperes)
    return (drop - mp.mpf("1.12") - 3 * k * room / q) / room


write(
    "temperature.csv",
    ["celsius", "amperes_24V_120k", "peak_V_50mV_10k"],
    [
        [celsius, text(current), text(current * 10000 * mp.tanh(mp.mpf("0.05") * q / (2 * k * kelvin)))]
        for celsius in ["-20", "15", "25", "40", "70"]
        for kelvin in [mp.mpf("273.15") + mp.mpf(celsius)]
        for current in [bias_current(mp.mpf(24), mp.mpf(120000), saturation_at(kelvin), 1, kelvin)]
    ],
)
write(
    "drift.csv",
    ["amperes", "volts_per_kelvin"],
    [[amperes, text(drift(mp.mpf(amperes)))] for amperes in ["1e-6", "1e-4", "1e-3"]],
)
