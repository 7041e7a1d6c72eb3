"""Press circuit: the bottle p V^1.4, a pump with two pressures, the stroke's valve and the relief valve; the cushion's oil,
a thousand times stiffer, follows the bottle down through its check valve at once, and while the die pushes it has an equation of its own. Dormand and Prince;
where the pump switches is found by halving the step."""
import math

from figures import figure, write
from integrate import explicit, peak

ATM, RHO = 1.013e5, 853.688                # oil VG 46 at 45 °C, as the handbook of the case has it
V0 = 32e-3 * 101.013 / 151.013
K = 151.013e5 * V0 ** 1.4
PUMP = 18e-6 * 1450 / 60 * 0.97
CUSHION = 1.5e-3 / 1.45e9                  # m³/Pa
LIFT = 2.5 / 3600 * math.sqrt(1000 / RHO / 1e5)
CRACKING = 0.5e5
STROKE = 1.4 / 3600 * math.sqrt(1000 / RHO / 1e5)


def pressure(v):
    return K / v ** 1.4 - ATM


def opening(t):
    t %= 15.0
    for (a, u), (b, w) in zip([(4, 0), (4.2, 1), (4.7, 1), (4.9, 0)], [(4.2, 1), (4.7, 1), (4.9, 0), (15, 0)]):
        if a <= t <= b:
            return u + (w - u) * (t - a) / (b - a)
    return 0.0


def relief(p):
    if p <= 180e5:
        return 0.0
    return 1e-3 * (p - 180e5) / 15e5 if p <= 195e5 else 1e-3 * math.sqrt(p / 195e5)


def liquid(t, v, on, cushion):
    p = pressure(v)
    return (PUMP if on else 0.0) + cushion - 2.5e-5 * p / 150e5 - opening(t) * STROKE * math.sqrt(p - 60e5) - relief(p)


def rates(s, w, on, push, lowest):
    """Of the gas and, while the die pushes, of the cushion's pressure; else that follows the bottle down from its lowest so far."""
    p = pressure(w[0])
    if push:
        q = LIFT * math.sqrt(max(0.0, w[1] - p - CRACKING))
        return [-liquid(s, w[0], on, q), (push - q) / CUSHION]
    net = liquid(s, w[0], on, 0.0)
    if net < 0 and p + CRACKING <= lowest:
        net /= 1 + CUSHION * 1.4 * (p + ATM) / w[0]
    return [-net, 0.0]


edges = sorted({15.0 * k + d for k in range(5) for d in (4, 4.2, 4.7, 4.9, 15)} | {4.5, 5, 10, 20, 30, 35, 45, 50, 52, 54, 56, 58, 60, 65, 75})
edges = [e for e in edges if e <= 75]
t, v, held, on, ts, vs, switched = 0.0, V0, 150e5, False, [0.0], [V0], []
for edge in edges:
    push = 55 / 6e4 if 50 <= t < 58 else 0.0
    n = max(1, math.ceil((edge - t) / 0.02))
    steps = [t + (edge - t) * (k + 1) / n for k in range(n)]
    for to in steps:
        while t < to:
            go, y = to, None

            def after(end):
                out = []
                explicit(lambda s, w: rates(s, w, on, push, held), [v, held], t, [end], lambda s, w: out.append(w), tol=1e-10, size=[1e-3, 1e6])
                return out[-1]

            def past(w):
                return pressure(w) > 165e5 if on else pressure(w) < 130e5
            y = after(go)
            if past(y[0]):
                a, b = t, go
                while b - a > 1e-9:
                    mid = (a + b) / 2
                    a, b = (a, mid) if past(after(mid)[0]) else (mid, b)
                go, y = b, after(b)
                on = not on
                switched.append(go)
            t, (v, held) = go, y
            if not push:
                held = min(held, pressure(v) + CRACKING)
            ts.append(t)
            vs.append(v)
rows = dict(zip(ts, vs))
for s in (4.0, 4.5, 5.0, 10.0, 15.0, 20.0, 35.0, 45.0, 54.0, 58.0, 60.0, 75.0):
    figure("table", f"tables[0].rows[t={s:g} s].header", pressure(rows[s]), tol_rel=1e-4, why="gauge Pa")
for s in (35.0, 75.0):
    figure("table", f"tables[0].rows[t={s:g} s].stored of header", 32e-3 - rows[s], tol_rel=1e-4, why="what the gas leaves")
for k, s in enumerate(switched):
    figure("table", f"events[part=gear][{k}].at", s, 5e-3, "halving")
figure("limits", "limits[name=press_holds].value", -peak(ts, [-pressure(v) for v in vs])[1], tol_rel=1e-4, why="parabola through steps of 0.02 s")
figure("limits", "limits[name=bottle].value", peak(ts, [pressure(v) for v in vs])[1], tol_rel=3e-4, why="at the end of the push; the few millilitres that the cushion keeps are left out")
write()
