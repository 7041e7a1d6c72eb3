"""Inverter module: the Foster pairs turned into a ladder by a continued fraction in exact fractions, then the linear network by Radau IIA."""
from fractions import Fraction as F

from figures import figure, write
from integrate import crossing, jacobian, newton, peak, stiff

PAIRS = [(F("0.012"), F("0.002")), (F("0.035"), F("0.03")), (F("0.038"), F("0.15")), (F("0.015"), F("1.2"))]


def times(a, b):
    out = [F(0)] * (len(a) + len(b) - 1)
    for i, x in enumerate(a):
        for j, y in enumerate(b):
            out[i + j] += x * y
    return out


def ladder():
    """C at the junction first: 1/Z = s C1 + 1/(R1 + 1/(s C2 + ...)); polynomials ascending in s."""
    num, den = [F(0)], [F(1)]
    for r, tau in PAIRS:
        num, den = [a + b for a, b in zip(times(num, [1, tau]) + [F(0)] * 9, times([r], den) + [F(0)] * 9)], times(den, [1, tau])
        while num[-1] == 0:
            num.pop()
    cs, rs = [], []
    while True:
        c = den[-1] / num[-1]
        cs.append(c)
        den = [d - c * n for d, n in zip(den, [F(0)] + num)][:len(num)]
        while len(den) > len(num):
            den.pop()
        r = num[-1] / den[-1]
        rs.append(r)
        num = [n - r * d for n, d in zip(num, den)]
        while num and num[-1] == 0:
            num.pop()
        if not num:
            return [float(c) for c in cs], [float(r) for r in rs]


CS, RS = ladder()
CAP = CS + [90.0, 2600.0]
R = RS + [0.04]
AIR = 313.15


def rates(load, x):
    q = [load] + [(x[i] - x[i + 1]) / R[i] for i in range(len(R))]
    flow = [q[i] - q[i + 1] for i in range(len(R))] + [q[-1] + 30.0 - (x[-1] - AIR) / 0.10]
    return [f / c for f, c in zip(flow, CAP)]


def run(overloads, to, extra):
    begin = newton(lambda x: rates(150.0, x), [330.0] * len(CAP))
    ts, xs = [], []

    def seen(t, x):
        ts.append(t)
        xs.append(x)
    edges = sorted({t for a in overloads for t in (a, a + 60.0)} | {to})
    t, x = 0.0, begin
    for edge in edges:
        if edge <= t:
            continue
        load = 320.0 if any(a <= t < a + 60 for a in overloads) else 150.0
        x = stiff(lambda _, y: rates(load, y), x, t, [s for s in extra if t < s < edge] + [edge], seen, tol=1e-10, size=[1.0] * len(CAP), every=True, most=5.0)
        t = edge
    return ts, xs


def at(ts, xs, t, k):
    return next(x[k] for s, x in zip(reversed(ts), reversed(xs)) if s == t)


once = run([0.0], 7200.0, [0.01, 0.1, 1.0, 10.0, 61.0, 600.0, 1200.0])
again = run([600.0 * k for k in range(13) if 600 * k < 7200], 7200.0, [0.01, 1200.0, 6000.0])
for t, text in [(0.01, "10 ms"), (0.1, "0.1 s"), (1.0, "1 s"), (10.0, "10 s"), (60.0, "60 s"), (61.0, "61 s"), (600.0, "10 min")]:
    figure("table", f"tables[0, scenario=once].rows[t={text}].junction", at(*once, t, 0), 1e-5, "exact ladder, Radau IIA")
figure("table", "tables[0, scenario=once].rows[t=60 s].case", at(*once, 60.0, 4), 1e-5, "node 5 of the chain")
figure("table", "tables[0, scenario=once].rows[t=60 s].sink", at(*once, 60.0, 5), 1e-5, "node 6 of the chain")
figure("table", "tables[0, scenario=once].rows[t=60 s].above_case", at(*once, 60.0, 0) - at(*once, 60.0, 4), 1e-5, "a difference")
figure("table", "tables[1, scenario=again].rows[t=100 min].sink", at(*again, 6000.0, 5), 1e-5, "at the end of nine minutes of rest")
for name, (ts, xs) in (("once", once), ("again", again)):
    figure("limits", f"limits[name=junction, scenario={name}].value", max(x[0] for x in xs), 1e-5, "at the end of an overload")
    t, v = peak(ts, [x[5] for x in xs])
    figure("limits", f"limits[name=sink, scenario={name}].value", v, 1e-4, "parabola through the steps about the highest")
    figure("limits", f"limits[name=stroke, scenario={name}].value", max(x[0] for x in xs) - min(x[0] for x in xs), 1e-4, "highest less lowest")
ts, xs = once
figure("limits", "finds[name=sink_at_61, scenario=once].at", crossing(ts, [x[5] for x in xs], 334.15), 0.2, "straight between steps of at most 5 s")

last = [(t, x) for t, x in zip(*again) if t >= 6600.0]
figure("cycle", "cycles[output=junction, scenario=again].max", max(x[0] for _, x in last), 1e-5, "the twelfth round: 26 of the slowest time constants")
figure("cycle", "cycles[output=junction, scenario=again].min", min(x[0] for _, x in last), 1e-5, "the twelfth round")
figure("cycle", "cycles[output=junction, scenario=again].mean", AIR + 197 * 0.10 + 167 * 0.14, 1e-6, "mean losses through the series resistances")
J, _ = jacobian(lambda _, x: rates(0.0, x), 0.0, [330.0] * 6)
# the slowest pole by inverse iteration
from integrate import solve_linear  # noqa: E402
v, low = [1.0] * 6, 0.0
for _ in range(200):
    w = solve_linear([list(r) for r in J], list(v))
    big = max(w, key=abs)
    v, low = [a / big for a in w], 1 / big
figure("poles", "poles of the network [0, slowest first].re", low, tol_rel=1e-6, why="inverse iteration on the matrix of the chain")
write()
