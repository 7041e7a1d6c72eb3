"""Plant main: fifteen columns of 60 m between the pond and the valve, which closes evenly; Dormand and Prince. Levels are p + ρ·g·z inside."""
import math

from figures import figure, write
from integrate import explicit, peak
from pipe import Pipe

RHO, G = 1000.0, 9.80665
UPPER = Pipe(300.0, 0.2, 1e-4, RHO, 1e-3, 1200.0, 5, 1.5)
LOWER = Pipe(600.0, 0.2, 1e-4, RHO, 1e-3, 1200.0, 10, 2.5)
N = 15
POND, WASH = RHO * G * 52.0, 1.5e5 + RHO * G * 12.0
KV = 126 / 3600 * math.sqrt(1000 / RHO / 1e5)
PIPES = [UPPER] * 5 + [LOWER] * 10
CAPS = [UPPER.compliance] * 4 + [(UPPER.compliance + LOWER.compliance) / 2] + [LOWER.compliance] * 9 + [LOWER.compliance / 2]


def stroke(t):
    return min(1.0, max(0.0, 1 - (t - 1) / 9))


def valve(t, x):
    return stroke(t) * KV * math.copysign(math.sqrt(abs(x - WASH)), x - WASH)


def rates(t, x):
    q, p = x[:N], [POND] + x[N:]
    out = [(p[k] - p[k + 1] - PIPES[k].drop(q[k])) / PIPES[k].inertance for k in range(N)]
    leaving = q[1:] + [valve(t, p[N])]
    return out + [(q[k] - leaving[k]) / CAPS[k] for k in range(N)]


low, high = 0.0, 0.2
for _ in range(200):
    q = (low + high) / 2
    end = POND - sum(p.drop(q) for p in PIPES) - WASH
    low, high = (q, high) if end > 0 and KV * math.sqrt(end) > q else (low, q)
levels, x = [], POND
for p in PIPES:
    x -= p.drop(q)
    levels.append(x)
ts, platform, ridge, flow = [], [], [], []


def seen(t, x):
    ts.append(t)
    platform.append(x[2 * N - 1] - RHO * G * 12)
    ridge.append(x[N + 4] - RHO * G * 36)
    flow.append(valve(t, x[2 * N - 1]))


stops = [1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0, 7.5, 8.0, 9.0, 10.0, 11.0, 12.0, 15.0, 20.0, 30.0, 60.0]
explicit(rates, [q] * N + levels, 0.0, stops, seen, tol=1e-9, size=[1e-4] * N + [1e4] * N, every=True)
for t in (0.0, 2.0, 5.0, 8.0, 9.0, 11.0, 15.0, 30.0, 60.0):
    k = max(i for i in range(len(ts)) if ts[i] == t)
    figure("table", f"tables[0].rows[t={t:g} s].platform", platform[k], 200.0 if t < 10 else 2000.0, "gauge Pa; after the valve is shut the waves of fifteen columns keep every error")
    if t < 10:
        figure("table", f"tables[0].rows[t={t:g} s].flow of valve", flow[k], tol_rel=1e-4, why="linear stroke, square root of the drop")
        figure("table", f"tables[0].rows[t={t:g} s].ridge", ridge[k], 200.0, "gauge Pa")
figure("limits", "limits[name=pipe].value", peak(ts, platform)[1], 500.0, "about the closing")
figure("limits", "limits[name=no_suction].value", -peak(ts, [-r for r in ridge])[1], 2000.0, "parabola through the steps about the lowest")
write()
