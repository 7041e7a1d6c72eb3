"""Batch oven: elements, air, sensor, load, nine lumps of wall, the integral of the controller and the energy; the two faces of the wall store nothing and are
equations. Radau IIA. The output of the controller stays between its limits all the way, as is checked."""
import films
from figures import figure, write
from integrate import crossing, newton, peak, stiff

HALL, HOLD = 295.15, 453.15
LAYERS = [(7900.0, 477.0, 14.9, 1e-3), (60.0, 840.0, 0.045, 0.1), (7832.0, 434.0, 63.9, 0.8e-3)]
AREA = 7.0
HALF = [d / (6 * k * AREA) for _, _, k, d in LAYERS for _ in range(3)]
LUMP = [rho * c * d * AREA / 3 for rho, c, _, d in LAYERS for _ in range(3)]
GLOW = films.SIGMA * films.grey(0.85, 0.7, 0.9, 2.4, 0.35)
WALL = films.SIGMA * films.grey(0.7, 0.3, 2.4, 7.0, 0.8)
# elements, air, sensor, load, nine lumps, inside, outside, integral, energy
MASS = [6 * 477.0, 2500.0, 60.0, 85 * 434.0] + LUMP + [0.0, 0.0, 1.0, 1.0]
heats = []


def rates(t, x):
    el, air, sensor, load = x[:4]
    lumps, inside, outside, integral = x[4:13], x[13], x[14], x[15]
    target = HALL + (HOLD - HALL) * min(t / 3600, 1)
    heat = min(max(250.0 * (target - sensor) + integral, 0.0), 9000.0)
    q_el, g_el = 35 * 0.9 * (el - air), GLOW * (el ** 4 - load ** 4)
    q_load, q_in, g_in = 20 * 2.4 * (air - load), 12 * 7 * (air - inside), WALL * (load ** 4 - inside ** 4)
    q_sensor = (air - sensor) / 0.5
    chain = [(inside - lumps[0]) / HALF[0]] + [(lumps[k] - lumps[k + 1]) / (HALF[k] + HALF[k + 1]) for k in range(8)] + [(lumps[8] - outside) / HALF[8]]
    out = films.plate(outside, HALL, 1.4) * 7 * (outside - HALL) + films.SIGMA * 0.9 * 7 * (outside ** 4 - HALL ** 4)
    return ([heat - q_el - g_el, q_el - q_load - q_in - q_sensor + 6 * (HALL - air), q_sensor, q_load + g_el - g_in]
            + [chain[k] - chain[k + 1] for k in range(9)]
            + [q_in + g_in - chain[0], chain[9] - out, 250.0 * (target - sensor) / 1200, heat])


def heat(t, x):
    return 250.0 * (HALL + (HOLD - HALL) * min(t / 3600, 1) - x[2]) + x[15]


ts, xs, x = [], [], [HALL] * 15 + [0.0, 0.0]


def seen(t, x):
    ts.append(t)
    xs.append(x)


stops = [1200.0 * k for k in range(1, 13)]
x = stiff(rates, x, 0.0, [s for s in stops if s <= 3600], seen, mass=MASS, tol=1e-7, size=[1.0] * 15 + [10.0, 1e4], every=True, most=60.0, first=1e-3)
x = stiff(rates, x, 3600.0, [s for s in stops if s > 3600], seen, mass=MASS, tol=1e-7, size=[1.0] * 15 + [10.0, 1e4], every=True, most=60.0, first=1e-3)
assert all(-1e-3 < heat(t, x) < 9000 for t, x in zip(ts, xs))
for m in (20, 60, 80, 120, 180, 240):
    x = next(x for s, x in zip(ts, xs) if s == 60.0 * m)
    figure("table", f"tables[0].rows[t={m} min].air", x[1], 2e-3, "Radau IIA")
    figure("table", f"tables[0].rows[t={m} min].load", x[3], 2e-3, "Radau IIA")
    if m in (60, 120, 240):
        figure("table", f"tables[0].rows[t={m} min].elements", x[0], 5e-3, "Radau IIA")
        figure("table", f"tables[0].rows[t={m} min].outside", x[14], 2e-3, "an equation: what arrives leaves")
        figure("table", f"tables[0].rows[t={m} min].heat of control", heat(60.0 * m, x), 1.0, "W")
        figure("table", f"tables[0].rows[t={m} min].energy of control", x[16], tol_rel=1e-4, why="integral carried along, J")
when, v = peak(ts, [x[1] for x in xs])
figure("limits", "limits[name=over].value", v, 1e-2, "parabola through steps of at most 60 s")
figure("limits", "limits[name=warm].at", crossing(ts, [x[3] for x in xs], 443.15), 3.0, "straight between steps of at most 60 s")
write()
