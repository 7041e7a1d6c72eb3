"""Closed cooling loop. Pipework: one column of water between pump curve and losses, its flow at rest by bisection and the run-down by Dormand and Prince.
Heat: two capacities, effectiveness and number of transfer units by the textbook formulas."""
import math

from figures import figure, write
from integrate import explicit, peak

RHO, G = 998.0, 9.80665
FLOW, HEAD, ETA = [0, 40 / 6e4, 70 / 6e4, 90 / 6e4], [15.0, 14.0, 12.0, 9.0], [0, 0.42, 0.5, 0.46]


def straight(xs, ys, x):
    k = max(i for i in range(len(xs) - 1) if x >= xs[i])
    return ys[k] + (ys[k + 1] - ys[k]) * (x - xs[k]) / (xs[k + 1] - xs[k])


def strainer(q, opening):
    return (q * 3600 / (9 * opening)) ** 2 * RHO / 1000 * 1e5


def surplus(q, opening):
    return RHO * G * straight(FLOW, HEAD, q) - 2e6 * q - 1.2e5 * (q / 1e-3) ** 2 - strainer(q, opening)


def at_rest(opening):
    low, high = 0.0, 1.5e-3
    for _ in range(200):
        mid = (low + high) / 2
        low, high = (mid, high) if surplus(mid, opening) > 0 else (low, mid)
    return mid


q0, q1 = at_rest(1.0), at_rest(0.5)
shaft = RHO * G * q0 * straight(FLOW, HEAD, q0) / straight(FLOW, ETA, q0)
figure("table", "tables[0].rows[t=0 s].flow of circulator", q0, tol_rel=1e-5, why="bisection")
figure("table", "tables[0].rows[t=0 s].head of circulator", straight(FLOW, HEAD, q0), tol_rel=1e-5, why="on the curve")
figure("table", "tables[0].rows[t=0 s].shaft power of circulator", shaft, tol_rel=1e-5, why="ρ·g·Q·H/η")
figure("table", "tables[0].rows[t=0 s].strained", 1.5e5 - strainer(q0, 1.0), 5.0, "gauge Pa")
figure("table", "tables[0].rows[t=60 s].strained", 1.5e5 - strainer(q0, 0.5), 5.0, "gauge Pa, the flow has not changed yet")
figure("table", "tables[0].rows[t=2 min].flow of circulator", q1, tol_rel=1e-5, why="bisection")
figure("table", "tables[0].rows[t=2 min].strained", 1.5e5 - strainer(q1, 0.5), 5.0, "gauge Pa")
got = []
explicit(lambda _, q: [surplus(q[0], 0.5) / (998 * 30 / 6e-4)], [q0], 0.0, [1.0], lambda t, q: got.append(q[0]), size=[1e-6])
figure("table", "tables[0].rows[t=61 s].flow of circulator", got[-1], tol_rel=1e-5, why="a second after the strainer")

HOT, COLD = 57.5 / 6e4 * 4.18e6, 75 / 6e4 * 4.18e6
TANK, BODY = 0.06 * 4.18e6, 180e3


def exchanged(cold):
    if cold == 0:
        return 0.0
    least, ratio = min(HOT, cold), min(HOT, cold) / max(HOT, cold)
    e = math.exp(-3500.0 / least * (1 - ratio))
    return (1 - e) / (1 - ratio * e) * least


def rates(cold):
    ex = exchanged(cold)

    def f(_, x):
        body, tank = x
        jacket = HOT * (1 - math.exp(-2400.0 / HOT)) * (body - tank)
        hot = tank + jacket / HOT
        return [(24e3 - jacket) / BODY, (jacket - ex * (hot - 295.15)) / TANK]
    return f, ex


_, ex = rates(COLD)
hot = 295.15 + 24e3 / ex
tank = hot - 24e3 / HOT
body = tank + 24e3 / (HOT * (1 - math.exp(-2400.0 / HOT)))
for name, v in (("body", body), ("hot", hot), ("tank", tank), ("works return", 295.15 + 24e3 / COLD)):
    figure("table", f"tables[1].rows[t=0 min].{name}", v, 1e-4, "steady, closed form")
ts, xs, x, t = [], [], [body, tank], 300.0
for end, cold in ((480.0, 0.0), (1200.0, COLD)):
    f, _ = rates(cold)
    x = explicit(f, x, t, [s for s in (360.0, 480.0, 600.0, 900.0, 1200.0) if t < s <= end], lambda t, x: (ts.append(t), xs.append(x)), tol=1e-12, every=True, most=2.0)
    t = end
for m in (6, 8, 10, 15, 20):
    x = next(x for s, x in zip(reversed(ts), reversed(xs)) if s == 60.0 * m)
    figure("table", f"tables[1].rows[t={m} min].body", x[0], 1e-4, "Dormand and Prince")
    figure("table", f"tables[1].rows[t={m} min].tank", x[1], 1e-4, "Dormand and Prince")
when, v = peak(ts, [x[0] for x in xs])
figure("limits", "limits[name=machine].value", v, 1e-4, "parabola through steps of 2 s")
figure("limits", "limits[name=machine].at", when, 0.5, "parabola through steps of 2 s")
figure("limits", "limits[name=suction].value", 1.5e5 - strainer(q0, 0.5), 5.0, "gauge Pa, as the strainer is blocked")
step = 1e-7
slope = (surplus(q0 + step, 1.0) - surplus(q0 - step, 1.0)) / (2 * step)
opened = (surplus(q0, 1 + 1e-5) - surplus(q0, 1 - 1e-5)) / 2e-5
figure("poles", "poles of the network [2, slowest first].re", slope / (998 * 30 / 6e-4), tol_rel=1e-4, why="slope of curve less losses over the inertance")
figure("poles", "transfers[input=opening of strainer,output=flow of circulator].gain", -opened / slope, tol_rel=1e-4, why="what opening brings over that slope")
gain = 1 / ex - 1 / HOT + 1 / (HOT * (1 - math.exp(-2400.0 / HOT)))
figure("poles", "transfers[input=load,output=body].gain", gain, tol_rel=1e-6, why="what the entry, the exchanger and the jacket add up to")
g, h = HOT * (1 - math.exp(-2400.0 / HOT)), ex
b, c = g / BODY + (g + h - g * h / HOT) / TANK, g * h / (BODY * TANK)
figure("poles", "poles of the network [0, slowest first].re", -(b - math.sqrt(b * b - 4 * c)) / 2, tol_rel=1e-6, why="root of the quadratic of body and tank")
write()
