"""Air and its films, as textbooks print them.

air            ideal gas; viscosity and conductivity of U.S. Standard Atmosphere, 1976, eqs. 51 and 53; specific heat of Irvine and Liley, 1984
plate, cylinder  Churchill and Chu, Int. J. Heat Mass Transfer 18 (1975) 1323 and 1049
roof           McAdams 1954, 0.54 Ra^(1/4) and 0.15 Ra^(1/3) up, 0.27 Ra^(1/4) down, the first two eased into each other over a decade about 1e7
blown          Pohlhausen, 0.664 Re^(1/2) Pr^(1/3), up to Re = 5e5
Properties at the mean of surface and air.
"""
import math

G = 9.80665
SIGMA = 5.670374419e-8


def air(T, p=101325.0):
    mu = 1.458e-6 * T ** 1.5 / (T + 110.4)
    k = 2.64638e-3 * T ** 1.5 / (T + 245.4 * 10 ** (-12 / T))
    c = sum(a * T ** i for i, a in enumerate([1034.09, -0.2848870, 0.7816818e-3, -0.4970786e-6, 0.1077024e-9]))
    rho = p / (287.05287 * T)
    return mu / rho, k, mu * c / k


def pressure(altitude):
    h = altitude * 6356766.0 / (6356766.0 + altitude)
    return 101325.0 * ((288.15 - 0.0065 * h) / 288.15) ** (G / (287.05287 * 0.0065))


def rayleigh(a, b, length, p):
    T = (a + b) / 2
    nu, k, pr = air(T, p)
    return G / T * abs(a - b) * length ** 3 * pr / nu ** 2, k, pr


def plate(a, b, height, p=101325.0):
    ra, k, pr = rayleigh(a, b, height, p)
    return (0.825 + 0.387 * ra ** (1 / 6) / (1 + (0.492 / pr) ** (9 / 16)) ** (8 / 27)) ** 2 * k / height


def cylinder(a, b, diameter, p=101325.0):
    ra, k, pr = rayleigh(a, b, diameter, p)
    return (0.60 + 0.387 * ra ** (1 / 6) / (1 + (0.559 / pr) ** (9 / 16)) ** (8 / 27)) ** 2 * k / diameter


def roof(a, b, length, p=101325.0):
    ra, k, _ = rayleigh(a, b, length, p)
    if a > b:
        low, high = 0.54 * ra ** 0.25, 0.15 * ra ** (1 / 3)
        w = min(max((math.log10(max(ra, 1)) - 6.5), 0), 1)
        nu = low + (high - low) * w * w * (3 - 2 * w)
    else:
        nu = 0.27 * ra ** 0.25
    nu = (nu ** 10 + (2 / math.pi) ** 10) ** 0.1
    return nu * k / length


def blown(a, b, length, speed, p=101325.0):
    nu, k, pr = air((a + b) / 2, p)
    return 0.664 * math.sqrt(speed * length / nu) * pr ** (1 / 3) * k / length


def grey(e1, e2, a1, a2, f):
    return 1 / ((1 - e1) / (e1 * a1) + 1 / (a1 * f) + (1 - e2) / (e2 * a2))
