"""Hot-water tank: one capacity and one switch, closed form: between its edges the tank goes by an exponential."""
import math

from figures import figure, write

RHO, C = 998.2065, 4184.19
W, D = 1e-4 * RHO * C, 1.5e-4 * RHO * C
COIL = W * (1 - math.exp(-220.0 / W))
STORE = 0.3 * RHO * C
DRAWS = [(1800.0, 2400.0), (5400.0, 6000.0), (9000.0, 9600.0)]
edges = sorted({e for d in DRAWS for e in d} | {28800.0} | {1800.0 * k for k in range(1, 17)})
t, x, on, energy = 0.0, 59.0, False, 0.0
rows, switched = {0.0: (59.0, 0.0)}, []


def law(t, on):
    draw = D if any(a <= t < b for a, b in DRAWS) else 0.0
    g = COIL + draw + 4.0
    return (COIL * 62.0 + draw * 12.0 + 4.0 * 18.0 + (3000.0 if on else 0.0)) / g, STORE / g


for edge in edges:
    while t < edge:
        final, tau = law(t, on)
        y = final + (x - final) * math.exp(-(edge - t) / tau)
        level = 60.0 if on else 52.0
        to = edge
        if (y - level) * (x - level) < 0:
            to = t + tau * math.log((x - final) / (level - final))
            y = level
        energy += 3000.0 * (to - t) if on else 0.0
        t, x = to, y
        if to < edge:
            on = not on
            switched.append(to)
    rows[edge] = (x, energy)
for m in (0, 30, 60, 90, 120, 150, 180, 240, 300, 480):
    figure("table", f"tables[0].rows[t={m} min].tank", rows[60.0 * m][0] + 273.15, 1e-5, "piecewise exponential")
figure("table", "tables[0].rows[t=60 min].return", rows[3600.0][0] + (62 - rows[3600.0][0]) * math.exp(-220.0 / W) + 273.15, 1e-5, "what the coil leaves of the entry's excess")
for k, s in enumerate(switched):
    figure("table", f"events[part=electric][{k}].at", s, 5e-3, "logarithm")
figure("table", "tables[0].rows[t=8 h].energy of electric", energy, 10.0, "3 kW for as long as it is on, J")
figure("limits", "limits[name=warm_enough].value", rows[2400.0][0] + 273.15, 1e-5, "end of the first draw")
figure("limits", "limits[name=warm_enough].at", 2400.0, 1e-3, "end of the first draw")
final, tau = law(9700.0, True)
figure("limits", "limits[name=back].at", 9600.0 + tau * math.log((rows[9600.0][0] - final) / (55.0 - final)), 1e-2, "logarithm")
write()
