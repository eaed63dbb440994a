#!/usr/bin/env python3
"""Continuum results of the graphitic pair potential with mpmath, for
tests/published/test_pair_potential.cpp.

Parameters A = 15.2 eV A^6, B = 24.1e3 eV A^12: Girifalco, Hodak & Lee, Phys. Rev. B 62, 13104
(2000). Bond 1.42 A, rigid tubes, surfaces of uniform density. Run: python3 FILE
"""
import mpmath as mp

A, B = mp.mpf("15.2"), mp.mpf("24.1e3")
LATTICE = mp.mpf("1.42") * mp.sqrt(3)
DENSITY = 4 / (mp.sqrt(3) * LATTICE**2)
JOULE = mp.mpf("16.02176634")  # J/m^2 per eV/A^2
GPA = mp.mpf("160.2176634")  # GPa per eV/A^3


def pair(r):
    return B / r**12 - A / r**6


def sheets(d):
    return DENSITY**2 * mp.pi * (B / (5 * d**10) - A / (2 * d**4))


def stack(d):
    return DENSITY**2 * mp.pi * (B * mp.zeta(10) / (5 * d**10) - A * mp.zeta(4) / (2 * d**4))


def cleavage(d):
    return -DENSITY**2 * mp.pi * (B * mp.zeta(9) / (5 * d**10) - A * mp.zeta(3) / (2 * d**4))


def line(rho):
    """The pair function along a straight line at distance rho."""
    return mp.pi * (B * mp.mpf(63) / 256 / rho**11 - A * mp.mpf(3) / 8 / rho**5)


def minimum(f, start):
    return mp.findroot(lambda x: mp.diff(f, x), start)


def check():
    """The closed forms above against direct integration."""
    x = mp.mpf("3.4")
    ring = lambda r: 2 * mp.pi * r * pair(mp.sqrt(r * r + x * x))
    direct = DENSITY**2 * mp.quad(ring, [0, x, 3 * x, 10 * x, mp.inf])
    assert abs(direct / sheets(x) - 1) < 1e-10
    along = 2 * mp.quad(lambda z: pair(mp.sqrt(z * z + x * x)), [0, x, 4 * x, mp.inf])
    assert abs(along / line(x) - 1) < 1e-10


def radius(n, m):
    return LATTICE * mp.sqrt(n * n + n * m + m * m) / (2 * mp.pi)


def coaxial(r1, r2):
    """Energy per length, the angle between two atoms integrated numerically."""
    across = lambda phi: mp.sqrt(r1**2 + r2**2 - 2 * r1 * r2 * mp.cos(phi))
    return DENSITY**2 * r1 * r2 * 4 * mp.pi * mp.quad(
        lambda phi: line(across(phi)), [0, 0.3, 1, mp.pi])


check()
d = minimum(sheets, 3.4)
print("two sheets", mp.nstr(d, 8), "A", mp.nstr(sheets(d), 8), "eV/A^2")
d = minimum(stack, 3.37)
print("stack", mp.nstr(d, 8), "A", mp.nstr(stack(d) / DENSITY * 1000, 8), "meV/atom, C33",
      mp.nstr(d * mp.diff(stack, d, 2) * GPA, 8), "GPa, cleavage",
      mp.nstr(cleavage(d) * JOULE, 8), "J/m^2")
for a, b in (((5, 5), (10, 10)), ((10, 10), (15, 15))):
    print(a, b, mp.nstr(coaxial(radius(*a), radius(*b)), 8), "eV/A")
inner = radius(5, 5)
best = minimum(lambda gap: coaxial(inner, inner + gap), 3.43)
print("best gap of (5,5) inner, per length", mp.nstr(best, 8), "A")
