"""Geared motor in intermittent duty: three capacities, films of air by textbook correlations (films.py), radiation, a winding whose resistance grows; Radau IIA."""
import films
from figures import figure, write
from integrate import peak, stiff

AIR = 308.15
CAP = [1.4 * 385 * 1.15, 6.5 * 434, 2.8 * 903]


def parts(x, works):
    w, s, f = x
    copper = 150.0 * (1 + 0.00393 * (w - 293.15)) if works else 0.0
    blown = films.blown(f, AIR, 0.2, 4.0) * 0.11 * 0.85 * (f - AIR) if works else 0.0
    still = films.cylinder(f, AIR, 0.16) * 0.11 * (f - AIR)
    glow = films.SIGMA * 0.9 * 0.11 * (f ** 4 - AIR ** 4)
    return copper, blown, still, glow


def rates(works):
    def f(_, x):
        copper, blown, still, glow = parts(x, works)
        q1, q2 = (x[0] - x[1]) * 55 * 0.075, (x[1] - x[2]) / 0.04
        iron = 55.0 if works else 0.0
        return [(copper - q1) / CAP[0], (q1 + iron - q2) / CAP[1], (q2 - blown - still - glow) / CAP[2]]
    return f


ts, xs, x = [], [], [AIR] * 3
for k in range(36):
    for t, end, works in ((600.0 * k, 600.0 * k + 240, True), (600.0 * k + 240, 600.0 * k + 600, False)):
        late = t >= 344 * 60 - 241
        stops = [s for s in range(344 * 60, 21600, 120) if t < s < end] + [end]
        x = stiff(rates(works), x, t, stops, lambda t, x: (ts.append(t), xs.append(x)), tol=1e-8, size=[1.0] * 3, every=True, most=5.0 if late else 60.0, first=0.1)


def at(t):
    return next(x for s, x in zip(reversed(ts), reversed(xs)) if s == t)


for m in (344, 350, 354, 356, 360):
    for k, name in enumerate(("winding", "stator", "frame")):
        figure("table", f"tables[0].rows[t={m} min].{name}", at(60.0 * m)[k], 2e-3, "Radau IIA")
for m, works in ((352, True), (356, False)):
    copper, blown, still, glow = parts(at(60.0 * m), works)
    if works:
        figure("table", f"tables[0].rows[t={m} min].flow of copper", copper, tol_rel=1e-5, why="150 W·(1 + α·(T − 20 °C))")
        figure("table", f"tables[0].rows[t={m} min].flow of blown", blown, tol_rel=2e-4, why="Pohlhausen, 85 %")
    figure("table", f"tables[0].rows[t={m} min].flow of still", still, tol_rel=2e-4, why="Churchill and Chu")
    figure("table", f"tables[0].rows[t={m} min].flow of radiant", glow, tol_rel=2e-4, why="σ·ε·A·(T⁴ − T⁴)")
figure("limits", "limits[name=winding].value", max(x[0] for x in xs), 2e-3, "at the end of the last work")
figure("limits", "limits[name=touch].value", peak(ts, [x[2] for x in xs])[1], 2e-3, "parabola through steps of 5 s")
write()
