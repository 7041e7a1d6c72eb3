"""Gearbox warm-up: two capacities, Dormand and Prince, and the log read here by itself."""
import csv
import math
import os

from figures import figure, write
from integrate import explicit

ts, xs, t, x = [], [], 0.0, [295.15, 295.15]


def seen(t, x):
    ts.append(t)
    xs.append(x)


def rates(load, air):
    def f(_, x):
        q = 50.0 * (x[0] - x[1])
        return [(load - q) / 18e3, (q - air * (x[1] - 295.15)) / 26e3]
    return f


for end, load, air in ((6000.0, 1200.0, 30.0), (9000.0, 700.0, 30.0), (10800.0, 700.0, 12.0)):
    x = explicit(rates(load, air), x, t, [s for s in range(600, 10800, 600) if t < s < end] + [end], seen, tol=1e-12, every=True, most=5.0)
    t = end
at = {s: y for s, y in zip(ts, xs)}
for m in (20, 60, 100, 120, 160, 180):
    figure("table", f"tables[0].rows[t={m} min].oil", at[60.0 * m][0], 1e-6, "Dormand and Prince")
    figure("table", f"tables[0].rows[t={m} min].housing", at[60.0 * m][1], 1e-6, "Dormand and Prince")
figure("table", "tables[0].rows[t=100 min].oil_over_housing", at[6000.0][0] - at[6000.0][1], 1e-6, "a difference")
with open(os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "warm-up-test.csv"), encoding="utf-8") as f:
    rows = [r for r in csv.reader(f) if len(r) == 3 and r[0][0].isdigit()]
for name, k in (("oil_sump", 0), ("housing_top", 1)):
    gap = [(at[60.0 * float(r[0])][k] - (float(r[k + 1]) + 273.15), 60 * float(r[0])) for r in rows]
    worst = max(gap, key=lambda g: abs(g[0]))
    figure("table", f"measured[name={name}].rms", math.sqrt(sum(g * g for g, _ in gap) / len(gap)), 1e-6, "predicted less measured, each row once")
    figure("table", f"measured[name={name}].offset", sum(g for g, _ in gap) / len(gap), 1e-6, "their mean")
    figure("table", f"measured[name={name}].worst", worst[0], 1e-6, "the largest in size")
    figure("table", f"measured[name={name}].at", worst[1], 1e-9, "its time")
figure("limits", "limits[name=oil].value", max(x[0] for x in xs), 1e-6, "at the change of load")
steep = max(rates(1200.0, 30.0)(0, x)[1] for s, x in zip(ts, xs) if s <= 6000)
figure("limits", "limits[name=warming].value", steep, tol_rel=1e-5, why="greatest rise among steps of 5 s")
b, c = 50 / 18e3 + 80 / 26e3, 50 * 30 / (18e3 * 26e3)
figure("poles", "poles of the network [0, slowest first].re", -(b - math.sqrt(b * b - 4 * c)) / 2, tol_rel=1e-9, why="root of the quadratic, fan on")
figure("poles", "poles of the network [1, slowest first].re", -(b + math.sqrt(b * b - 4 * c)) / 2, tol_rel=1e-9, why="root of the quadratic, fan on")
write()
