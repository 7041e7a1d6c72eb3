"""Sealed cabinet in the sun: shell, air, racks and the wax by its heat content, films of air by textbook correlations (films.py) at 450 m above the sea,
radiation to sky and air; three days by Radau IIA."""
import math

import films
from figures import figure, write
from integrate import peak, stiff

P = films.pressure(450.0)
H = 3600.0
SENSIBLE, LATENT = 7 * 2100 * 1.1, 7 * 200e3
LOW, HIGH = 308.15, 310.15
ROOF = [(0, 0), (5, 0), (9, 600), (13, 900), (17, 550), (21, 0), (24, 0)]
WEST = [(0, 0), (5, 0), (12, 110), (17, 650), (20, 150), (21, 0), (24, 0)]


def straight(points, h):
    h %= 24
    for (a, u), (b, v) in zip(points, points[1:]):
        if a <= h <= b:
            return u + (v - u) * (h - a) / (b - a)


def day(mean, swing, t):
    return 273.15 + mean + swing * math.cos(2 * math.pi * (t / H - 15) / 24)


def wax(heat):
    """Temperature and share molten from the heat above 273.15 K, solid."""
    low = SENSIBLE * (LOW - 273.15)
    high = SENSIBLE * (HIGH - 273.15) + LATENT
    if heat <= low:
        return 273.15 + heat / SENSIBLE, 0.0
    if heat >= high:
        return HIGH + (heat - high) / SENSIBLE, 1.0
    share = (heat - low) / (high - low)
    return LOW + (HIGH - LOW) * share, share


def pack_film(pack, inside):
    return films.plate(pack, inside, 0.4, P) * 4.0 * (pack - inside)


def rates(equipment):
    def f(t, x):
        shell, inside, racks = x[:3]
        pack, _ = wax(x[3] * 1e4)
        out, sky = day(25, 7, t), day(8, 6, t)
        sun = 0.45 * (0.5 * straight(ROOF, t / H) + 0.9 * straight(WEST, t / H))
        lost = films.roof(shell, out, 0.5 / 3, P) * 0.5 * (shell - out)
        lost += films.blown(shell, out, 0.75, 1.2, P) * 0.9 * (shell - out)
        lost += films.plate(shell, out, 1.2, P) * 1.5 * (shell - out)
        lost += films.SIGMA * 0.9 * (1.4 * (shell ** 4 - sky ** 4) + 1.5 * (shell ** 4 - out ** 4))
        inner = films.plate(shell, inside, 1.2, P) * 2.4 * (shell - inside)
        racked = films.plate(racks, inside, 0.4, P) * 1.6 * (racks - inside)
        glow = films.SIGMA * 0.8 * 1.0 * (racks ** 4 - shell ** 4)
        packed = pack_film(pack, inside)
        return [(sun - lost - inner + glow) / (46 * 434.0), (inner + racked + packed) / 1500.0, (equipment - racked - glow) / 22e3, -packed / 1e4]
    return f


ts, xs, x = [], [], [298.15] * 3 + [SENSIBLE * 25 / 1e4]
edges = sorted({24 * d + h for d in range(3) for h in (5, 6, 9, 12, 13, 17, 20, 21, 24)} | set(range(48, 73, 2)))
t = 0.0
for e in edges:
    h = t / H % 24
    x = stiff(rates(120.0 if 6 <= h < 20 else 70.0), x, t, [e * H], lambda t, x: (ts.append(t), xs.append(x)), tol=1e-7, size=[1.0] * 4, every=True, most=600.0, first=1.0)
    t = e * H
at = dict(zip(ts, xs))
for h in (48, 54, 58, 62, 66, 70):
    x = at[h * H]
    figure("table", f"tables[0].rows[t={h} h].shell", x[0], 5e-3, "Radau IIA")
    figure("table", f"tables[0].rows[t={h} h].inside", x[1], 5e-3, "Radau IIA")
    figure("table", f"tables[0].rows[t={h} h].pack", wax(x[3] * 1e4)[0], 5e-3, "by its heat content")
for h in (60, 64, 66, 72):
    figure("table", f"tables[0].rows[t={h} h].liquid fraction of pack", wax(at[h * H][3] * 1e4)[1], 2e-4, "by its heat content")
figure("table", "tables[0].rows[t=62 h].flow of pack_film", pack_film(wax(at[62 * H][3] * 1e4)[0], at[62 * H][1]), 0.05, "W, Churchill and Chu")
figure("limits", "limits[name=air].value", peak(ts, [x[1] for x in xs])[1], 1e-2, "parabola through steps of at most 10 min")
figure("limits", "limits[name=racks].value", peak(ts, [x[2] for x in xs])[1], 1e-2, "parabola through steps of at most 10 min")
write()
