#!/usr/bin/env python3
"""Modified Bessel functions to 25 digits by mpmath, for tests/unit/test_bessel.cpp.

mpmath's own besseli and besselk up to an argument of 100. Above, where they fail to converge at
high order, its orders 0 and 1 and the recurrences in 80 digits.
Run: python3 bessel_reference.py > bessel_reference.hpp
"""
import mpmath as mp

mp.mp.dps = 80
ARGUMENTS = ["1e-12", "1e-6", "1e-3", "0.1", "0.999", "1.001", "2", "5.5", "12", "19.99", "20.01",
             "31.9", "32.1", "75", "300", "2000", "1e5", "1e6"]
ORDERS = [0, 1, 2, 3, 7, 20, 33, 90, 400, 1500, 3999]


def all_orders(x):
    """ln I_m, ln K_m for m = 0 ... 4000."""
    top = 4001
    ratio = mp.mpf(1)
    ratios = [None] * top
    for m in range(top + int(20 * mp.sqrt(x)) + 400, 0, -1):
        ratio = 1 / (2 * m / x + ratio)
        if m <= top:
            ratios[m - 1] = ratio
    log_i = [mp.log(mp.besseli(0, x))]
    for m in range(top - 1):
        log_i.append(log_i[-1] + mp.log(ratios[m]))
    k = [mp.besselk(0, x), mp.besselk(1, x)]
    for m in range(1, top - 1):
        k.append(2 * m / x * k[m] + k[m - 1])
    return log_i, [mp.log(value) for value in k]


def rows(text):
    x = mp.mpf(float(text))  # the double nearest to the decimal
    if x <= 100:
        log_i = {m: mp.log(mp.besseli(m, x)) for o in ORDERS for m in (o, o + 1)}
        log_k = {m: mp.log(mp.besselk(m, x)) for o in ORDERS for m in (o, o + 1)}
    else:
        log_i, log_k = all_orders(x)
    for m in ORDERS:
        slope_i = mp.exp(log_i[m + 1] - log_i[m]) + m / x
        slope_k = m / x - mp.exp(log_k[m + 1] - log_k[m])
        values = [log_i[m], log_k[m], slope_i, slope_k]
        print("    {%s, %d, %s}," % (text, m, ", ".join(mp.nstr(v, 25) for v in values)))


print("// Made by bessel_reference.py with mpmath %s; do not edit." % mp.__version__)
print("#pragma once\n")
print("struct BesselReference {")
print("  double x;\n  int order;\n  double log_i, log_k, slope_i, slope_k;\n};\n")
print("// clang-format off")
print("inline constexpr BesselReference bessel_reference[] = {")
for argument in ARGUMENTS:
    rows(argument)
print("};\n// clang-format on")
