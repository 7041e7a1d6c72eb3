"""Impulse line: eight columns of water-glycol, the bubble p V^1.4 and the diaphragm at the end; Dormand and Prince."""
from figures import figure, write
from integrate import crossing, explicit, peak
from pipe import Pipe

ATM = 1.013e5
# 50 % glycol at 20 °C, straight between the tabled 4.444 and 21.111 °C
RHO = 1080.76572 + (1074.03797 - 1080.76572) * (20 - 4.444) / (21.111 - 4.444)
PIPE = Pipe(20.0, 6e-3, 1.5e-6, RHO, 3.94e-3, 1500.0, 8)
BUBBLE = 5e-6 * ATM / (9e5 + ATM)          # filled slowly to 9 bar(g)
K = (9e5 + ATM) * BUBBLE ** 1.4
HEAD = 1.5e-6 / 100e5 + PIPE.compliance / 2


def volume(p):
    return (K / (p + ATM)) ** (1 / 1.4)


def rates(_, x):
    q, p = x[:8], x[8:]
    before = [11e5] + p
    out = [(before[k] - before[k + 1] - PIPE.drop(q[k])) / PIPE.inertance for k in range(8)]
    out += [(q[k] - q[k + 1]) / PIPE.compliance for k in range(7)]
    return out + [q[7] / (HEAD + volume(p[7]) / (1.4 * (p[7] + ATM)))]


ts, xs = [], []
stops = [0.02, 0.04, 0.06, 0.08, 0.1, 0.15, 0.2, 0.3, 0.5, 1.0, 2.0, 3.0]
explicit(rates, [0.0] * 8 + [9e5] * 8, 0.0, stops, lambda t, x: (ts.append(t), xs.append(x[15])), tol=1e-9, size=[1e-7] * 8 + [1e3] * 8, every=True)
at = dict(zip(ts, xs))
for t in stops:
    figure("table", f"tables[0].rows[t={t:g} s].transmitter", at[t], 30.0, "gauge Pa; steps of the 2 bar, tolerance 1e-9")
for t in (0.06, 0.1, 3.0):
    figure("table", f"tables[0].rows[t={t:g} s].gas volume of transmitter", volume(at[t]), tol_rel=2e-5, why="p·V^1.4")
figure("limits", "limits[name=in_time].at", crossing(ts, xs, 10.8e5), 1e-5, "straight between steps")
when, v = peak(ts, xs)
figure("limits", "limits[name=overpressure].value", v, 300.0, "parabola through the steps about the first peak")
figure("limits", "limits[name=overpressure].at", when, 5e-5, "parabola through the steps about the first peak")


def seen_from_vessel(s):
    """Impedance of the line about the start; it is 0 at a pole of the transmitter's pressure."""
    laminar = 128 * PIPE.viscosity * PIPE.length / 8 / (3.141592653589793 * PIPE.bore ** 4)
    z = 1 / (s * (HEAD + BUBBLE / (1.4 * (9e5 + ATM))))
    for k in range(8):
        z += laminar + s * PIPE.inertance
        if k < 7:
            z = 1 / (1 / z + s * PIPE.compliance)
    return z


a, b = complex(-1.7, 45), complex(-1.7, 47)
for _ in range(60):
    fa, fb = seen_from_vessel(a), seen_from_vessel(b)
    if fa == fb:
        break
    a, b = b, b - fb * (b - a) / (fb - fa)
figure("poles", "poles of the network [0, slowest first].re", b.real, tol_rel=1e-6, why="zero of the impedance seen from the vessel, by secants")
figure("poles", "poles of the network [0, slowest first].im", -abs(b.imag), tol_rel=1e-6, why="zero of the impedance seen from the vessel, by secants")
write()
