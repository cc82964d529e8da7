#!/usr/bin/env python3
"""Writes values.json: check values of the ratios that round holes and slits need.

Every value is worked out by mpmath with 60 figures at the argument that is
written beside it, a double, and printed to 20 figures; scipy must agree with
mpmath for holes. Run it without arguments.
"""

import json
import pathlib

import mpmath as mp
from scipy import special

mp.mp.dps = 60
DIGITS = 20

# Shear wave numbers s of a round hole or a slit: closer where the flow changes
# from viscous to inertial, some on either side of 25, and those of the widest
# holes at the highest frequencies.
SHEAR = [
    0.001, 0.0015, 0.002, 0.003, 0.005, 0.007,
    0.01, 0.015, 0.02, 0.03, 0.05, 0.07,
    0.1, 0.15, 0.2, 0.3, 0.5, 0.7,
    1.0, 1.5, 2.0, 2.5, 3.0, 4.0, 5.0, 6.0, 8.0,
    10.0, 12.0, 15.0, 20.0, 24.0, 24.9, 25.1, 26.0, 30.0, 40.0, 50.0, 70.0,
    100.0, 150.0, 200.0, 300.0, 400.0, 500.0, 1000.0, 2500.0,
]

# Squares y of the argument all over the plane: as damped frequencies have
# them, on the negative real axis (modified Bessel functions), on the positive
# between the poles, near the poles, and on either side of 625.
PLANE = [
    (0.001, 0.0), (-0.001, 0.0), (1.0, 0.0), (-1.0, 0.0), (0.0, 1.0),
    (3.0, -4.0), (3.0, 4.0), (-3.0, 4.0), (5.0, -0.25), (6.0, -0.5), (10.0, 0.0), (26.0, -3.0),
    (-50.0, 0.0), (40.0, -90.0), (100.0, -10.0), (300.0, -300.0), (600.0, -40.0), (624.0, -20.0), (626.0, -20.0),
    (-624.0, 5.0), (-626.0, 5.0), (-2500.0, 0.0), (900.0, -1030.0), (2000.0, -1500.0),
    (10000.0, -1.0), (10000.0, -3000.0), (10000.0, -4000.0), (-30000.0, -100.0), (40000.0, -8000.0), (250000.0, -20000.0),
]

ABOUT = (
    "Written by values.py. In holes x = s*sqrt(-j): j1_over_j0 is J1(x)/J0(x), ratio J2(x)/(x^2 J0(x)), "
    "and slit 1 - tanh(s sqrt j)/(s sqrt j). In plane ratio is that of y = x^2, condition its relative change "
    "over that of y. In zeros the first 40 of J0, J1, J2. Complex numbers are [real, imaginary]."
)


def number(v):
    """The JSON number of an argument as a double has it, or of a value."""
    return repr(v) if isinstance(v, float) else mp.nstr(v, DIGITS)


def pair(z):
    return "[%s, %s]" % (number(z.real), number(z.imag))


def j1_over_j0(x):
    return mp.besselj(1, x) / mp.besselj(0, x)


def ratio(y):
    """J2(x)/(x² J0(x)) for y = x²."""
    x = mp.sqrt(y)
    return mp.besselj(2, x) / (y * mp.besselj(0, x))


def condition(y):
    """|y r'(y)/r(y)|, from J1' = J0 - J1/x and J0' = -J1:
    with q = J1/(x J0), 2y q' = 1 - 2q + y q² and r = (2q - 1)/y."""
    q = j1_over_j0(mp.sqrt(y)) / mp.sqrt(y)
    return abs((1 - 2 * q + y * q * q) / (2 * q - 1) - 1)


def bracket(y2):
    """1 - tanh(y)/y for y²."""
    y = mp.sqrt(y2)
    return 1 - mp.tanh(y) / y


def hole(s):
    x = mp.mpf(s) * mp.sqrt(mp.mpc(0, -1))
    q = j1_over_j0(x)
    other = special.jve(1, complex(x)) / special.jve(0, complex(x))
    assert abs(other / complex(q) - 1) < 1e-12, s
    return '{"s": %s, "j1_over_j0": %s, "ratio": %s, "slit": %s}' % (
        number(s), pair(q), pair(ratio(x * x)), pair(bracket(-x * x)))


def plane(re, im):
    y = mp.mpc(re, im)
    return '{"y": %s, "ratio": %s, "condition": %s}' % (
        pair(complex(re, im)), pair(mp.mpc(ratio(y))), mp.nstr(condition(y), 4))


def zeros(order):
    return '"%d": [%s]' % (order, ", ".join(number(mp.besseljzero(order, k)) for k in range(1, 41)))


def lines(opening, entries, closing):
    return opening + "\n" + ",\n".join("  " + e for e in entries) + "\n " + closing


def main():
    text = ",\n ".join([
        '"about": %s' % json.dumps(ABOUT),
        lines('"holes": [', [hole(s) for s in SHEAR], "]"),
        lines('"plane": [', [plane(*y) for y in PLANE], "]"),
        lines('"zeros": {', [zeros(n) for n in range(3)], "}"),
    ])
    text = "{\n %s\n}\n" % text
    json.loads(text)
    pathlib.Path(__file__).with_name("values.json").write_text(text)


main()
