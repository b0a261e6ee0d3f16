"""Writes the tables of tanh driven by tones. Needs mpmath."""
import csv

import mpmath as mp

mp.mp.dps = 40
thermal_voltage = mp.mpf("1.380649e-23") * mp.mpf("298.15") / mp.mpf("1.602176634e-19")


def text(x, digits=17):
    return mp.nstr(mp.mpf(x), digits, min_fixed=-4, max_fixed=8)


def write(name, header, rows):
    with open(name, "w", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(header)
        out.writerows(rows)


def half_drive(millivolts):
    return mp.mpf(millivolts) / 1000 / (2 * thermal_voltage)


def lines(d, x, orders, points=512):
    """Mean, then amplitude of each order, of tanh(d + x sin t); the periodic trapezoid converges geometrically."""
    angles = [2 * mp.pi * i / points for i in range(points)]
    values = [mp.tanh(d + x * mp.sin(angle)) for angle in angles]
    found = [mp.fsum(values) / points]
    for n in range(1, orders + 1):
        real = mp.fsum(v * mp.cos(n * angle) for v, angle in zip(values, angles))
        imaginary = mp.fsum(v * mp.sin(n * angle) for v, angle in zip(values, angles))
        found.append(2 * mp.hypot(real, imaginary) / points)
    return found


def fundamental(x):
    return lines(mp.mpf(0), x, 1, 256)[1]


def thd(x):
    """All harmonics, from the mean square."""
    points = 256
    square = mp.fsum(mp.tanh(x * mp.sin(2 * mp.pi * i / points)) ** 2 for i in range(points)) / points
    first = fundamental(x)
    return mp.sqrt(2 * square - first**2) / first


orders = 13
write(
    "harmonics.csv",
    ["offset_mV", "peak_mV", "mean"] + [f"a{n}" for n in range(1, orders + 1)],
    [
        [offset, peak] + [text(mp.chop(a, mp.mpf("1e-35"))) for a in lines(half_drive(offset), half_drive(peak), orders)]
        for offset in ["0", "1", "5"]
        for peak in ["1", "5", "10", "18", "20", "50", "100"]
    ],
)
write("thd.csv", ["peak_mV", "thd"], [[p, text(thd(half_drive(p)))] for p in ["1", "5", "10", "18", "20", "50", "100"]])
write(
    "drive-for-thd.csv",
    ["thd", "peak_mV"],
    [
        [ratio, text(2000 * thermal_voltage * mp.findroot(lambda x: thd(x) - mp.mpf(ratio), mp.sqrt(12 * mp.mpf(ratio))), 14)]
        for ratio in ["0.0001", "0.001", "0.003", "0.005", "0.01", "0.02", "0.03", "0.05", "0.1"]
    ],
)
write(
    "compression.csv",
    ["dB", "sine_peak_mV", "slope_mV", "chord_mV"],
    [
        [dB]
        + [
            text(2000 * thermal_voltage * mp.findroot(lambda x: gain(x) - mp.mpf(10) ** (-mp.mpf(dB) / 20), guess), 14)
            for gain, guess in [
                (lambda x: fundamental(x) / x, 0.7),
                (lambda x: mp.sech(x) ** 2, 0.35),
                (lambda x: mp.tanh(x) / x, 0.6),
            ]
        ]
        for dB in ["1", "3"]
    ],
)


def two_tones(x, points=128):
    """Amplitudes of f1, of 2 f1 - f2 and of 3 f1 for tanh(x sin a + x sin b), a and b independent."""
    turns = [2 * mp.pi * i / points for i in range(points)]
    sines = [mp.sin(angle) for angle in turns]
    values = [[mp.tanh(x * (p + q)) for q in sines] for p in sines]

    def line(m, n):
        total = mp.fsum(
            values[i][j] * mp.expj(-(m * turns[i] + n * turns[j])) for i in range(points) for j in range(points)
        )
        return 2 * abs(total) / points**2

    return [line(1, 0), line(2, -1), line(3, 0)]


write(
    "intermodulation.csv",
    ["peak_each_mV", "tone", "third_order_product", "third_harmonic"],
    [[peak] + [text(a, 15) for a in two_tones(half_drive(peak))] for peak in ["1", "10", "25", "50"]],
)
