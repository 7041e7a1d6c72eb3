"""Cold plate with three modules: three chains junction, case, plate above water that passes them in turn; Radau IIA."""
from figures import figure, write
from integrate import crossing, peak, stiff
import math

AT = 303.15


def model(flow, current):
    w = flow / 60000 * 4.15e6
    keep = math.exp(-180.0 / w)
    grease = [0.03, 0.03, 0.06]

    def rates(t, x):
        i = current(t)
        p, water, out = 0.9 * i + 1.1e-3 * i * i, AT, []
        for k in range(3):
            j, c, b = x[3 * k:3 * k + 3]
            q1, q2 = (j - c) / 0.022, (c - b) / (0.01 + grease[k])
            leaving = b + (water - b) * keep
            out += [(p - q1) / 14.0, (q1 - q2) / 320.0, (q2 - w * (leaving - water)) / 900.0]
            water = leaving
        return out + [(x[7] - x[8]) / (0.01 + grease[2])]

    def outlet(x):
        water = AT
        for k in range(3):
            water = x[3 * k + 2] + (water - x[3 * k + 2]) * keep
        return water
    return rates, outlet


def ramp(t):
    pts = [(0, 0), (20, 400), (120, 400), (160, 0)]
    for (a, u), (b, v) in zip(pts, pts[1:]):
        if a <= t <= b:
            return u + (v - u) * (t - a) / (b - a)
    return 0.0


def run(flow, pieces):
    ts, xs, x, t = [], [], [AT] * 9 + [0.0], 0.0
    outlet = None
    for end, current in pieces:
        rates, outlet = model(flow, current)

        def seen(t, x):
            ts.append(t)
            xs.append(x)
        x = stiff(rates, x, t, [s for s in range(20, 300, 20) if t < s < end] + [end], seen, tol=1e-10, size=[1.0] * 9 + [10.0], every=True, most=0.5, first=1e-3)
        t = end
    return ts, xs, outlet


jogs = []
for k in range(7):
    jogs += [(24.0 * k + 8, lambda t: 480.0), (24.0 * k + 24, lambda t: 0.0)]
stroke = run(8.0, [(e, ramp) for e in (20.0, 120.0, 160.0, 300.0)])
jog = run(6.0, jogs + [(300.0, lambda t: 0.0)])


def at(case, t):
    return next(x for s, x in zip(reversed(case[0]), reversed(case[1])) if s == t)


for name, case, rows in (("stroke", stroke, (20, 60, 120, 180)), ("jog", jog, (80, 200))):
    for t in rows:
        figure("table", f"tables[0, scenario={name}].rows[t={t} s].third.junction", at(case, t)[6], 1e-5, "Radau IIA")
x = at(stroke, 120)
figure("table", "tables[0, scenario=stroke].rows[t=120 s].first.junction", x[0], 1e-5, "Radau IIA")
figure("table", "tables[0, scenario=stroke].rows[t=120 s].plate 3", x[8], 1e-5, "Radau IIA")
figure("table", "tables[0, scenario=stroke].rows[t=120 s].outlet", stroke[2](x), 1e-5, "three passages in turn")
figure("table", "tables[0, scenario=stroke].rows[t=120 s].mean", 0.25 * x[0] + 0.25 * x[3] + 0.5 * x[6], 1e-5, "weighted mean")
figure("table", "tables[0, scenario=stroke].rows[t=300 s].heat", at(stroke, 300)[9], 0.01, "integral carried along, J")
figure("table", "tables[0, scenario=jog].rows[t=300 s].heat", at(jog, 300)[9], 0.01, "integral carried along, J")
for name, case in (("stroke", stroke), ("jog", jog)):
    ts, xs, outlet = case
    figure("limits", f"limits[name=junctions, scenario={name}].value", peak(ts, [x[6] for x in xs])[1], 2e-4, "parabola through steps of 0.5 s")
    figure("limits", f"limits[name=water, scenario={name}].value", peak(ts, [outlet(x) - AT for x in xs])[1], 1e-4, "parabola through steps of 0.5 s")
    figure("limits", f"limits[name=alike, scenario={name}].value", peak(ts, [x[6] - x[0] for x in xs])[1], 1e-4, "parabola through steps of 0.5 s")
figure("limits", "finds[name=third_at_80, scenario=stroke].at", crossing(stroke[0], [x[6] for x in stroke[1]], 353.15), 5e-3, "straight between steps of 0.5 s")
write()
