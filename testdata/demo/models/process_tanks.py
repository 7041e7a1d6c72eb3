"""Two process tanks: two levels, square-root laws without a core, Dormand and Prince."""
import math

from figures import figure, write
from integrate import crossing, explicit, peak

RHO, G = 1040.0, 9.80665
ORIFICE = 0.62 * math.pi / 4 * 0.04 ** 2 * math.sqrt(2 * G)
VALVE = 6 / 3600 * math.sqrt(1000 / RHO / 1e5)


def flows(x):
    d = x[0] - x[1]
    return math.copysign(ORIFICE * math.sqrt(abs(d)), d), VALVE * math.sqrt(RHO * G * (x[1] + 0.5))


def run(batch, ends):
    trickle = 1.5 / 3600
    second = (trickle / VALVE) ** 2 / (RHO * G) - 0.5
    x, t, ts, xs = [second + (trickle / ORIFICE) ** 2, second, 0.0], 0.0, [], []

    def seen(t, x):
        ts.append(t)
        xs.append(x)
    for end, inflow in ((ends, trickle + batch / 3600), (14400.0, trickle)):
        def rates(_, y):
            o, v = flows(y)
            return [(inflow - o) / 3.0, (o - v) / 4.0, v]
        x = explicit(rates, x, t, [60.0 * m for m in (2, 5, 10, 15, 30, 60, 120) if t < 60 * m < end] + [end], seen, tol=1e-11, every=True, most=10.0)
        t = end
    return ts, xs


cases = {"planned": run(36.0, 600.0), "hurried": run(72.0, 300.0)}
for name, (ts, xs) in cases.items():
    for m in (0, 5, 10, 15, 30, 60, 240):
        x = next(x for s, x in zip(reversed(ts), reversed(xs)) if s == 60.0 * m)
        figure("table", f"tables[0, scenario={name}].rows[t={m} min].level of first", x[0], 2e-5, "m")
        if m in (10, 60, 240):
            figure("table", f"tables[0, scenario={name}].rows[t={m} min].level of second", x[1], 2e-5, "m")
            figure("table", f"tables[0, scenario={name}].rows[t={m} min].filtered", x[2], 2e-5, "integral carried along, m³")
    figure("limits", f"limits[name=brim, scenario={name}].value", max(x[0] for x in xs), 2e-5, "of the first tank, at the end of the batch")
    figure("limits", f"limits[name=second_brim, scenario={name}].value", peak(ts, [x[1] for x in xs])[1], 2e-5, "parabola through steps of 10 s")
    second = [x[1] for x in xs]
    up = crossing(ts, second, 0.9)
    k = next(i for i, t in enumerate(ts) if t > up + 60)
    down = crossing(ts[k:], second[k:], 0.9)
    figure("limits", f"limits[name=second_high, scenario={name}].value", down - up, 1.0, "s above 0.9 m, straight between steps of 10 s; 0.02 mm of level are 0.7 s")
    figure("limits", f"finds[name=first_at_1_5, scenario={name}].at", crossing(ts, [x[0] for x in xs], 1.5), 0.1, "straight between steps of 10 s")
write()
