"""Friction and waves of a round pipe.

friction   Churchill, Chem. Eng. 84 (1977) no. 24, p. 91, with the turbulent factor of Colebrook and White, which is solved by repeated substitution
sections   a pipe cut into n columns, each with half of its compliance at either end: L = ρ·l/(n·A), C = A·l/(n·ρ·a²)
"""
import math


def factor(re, rough):
    if re < 500:
        return 64 / re
    f = 0.02
    for _ in range(60):
        f, before = (-2 * math.log10(rough / 3.7 + 2.51 / (re * math.sqrt(f)))) ** -2, f
        if abs(f - before) < 1e-14:
            break
    a, b = (8 / f) ** 8, (37530 / re) ** 16
    return 8 * ((8 / re) ** 12 + (a + b) ** -1.5) ** (1 / 12)


class Pipe:
    def __init__(self, length, bore, rough, density, viscosity, speed, sections, losses=0.0):
        self.area = math.pi / 4 * bore ** 2
        self.length, self.bore, self.rough, self.density, self.viscosity = length, bore, rough / bore, density, viscosity
        self.losses, self.n = losses, sections
        self.inertance = density * length / sections / self.area
        self.compliance = self.area * length / sections / (density * speed ** 2)

    def drop(self, q):
        """Pressure lost in one section."""
        v = abs(q) / self.area
        re = self.density * v * self.bore / self.viscosity
        if re < 1e-9:
            return 0.0
        return math.copysign((factor(re, self.rough) * self.length / self.bore + self.losses) * self.density * v * v / 2 / self.n, q)
