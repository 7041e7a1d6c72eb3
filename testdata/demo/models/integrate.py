"""Integrators of the models beside: nothing but the standard library.

explicit   Runge-Kutta pair of Dormand and Prince (J. Comp. Appl. Math. 6, 1980, 19), order 5(4), for what is not stiff
stiff      Radau IIA of order 5 (Hairer and Wanner, Solving Ordinary Differential Equations II, IV.8) with a numerical
           Jacobian, for mass * x' = f(t, x); where mass is 0 the row is an equation
Both stop exactly at each time of `stops` and hand the state to `seen(t, x)` at the stops and, with every = True, after each step.
"""
import math


def solve_linear(a, b):
    """Solves a x = b by Gauss's elimination with row exchanges; a and b are overwritten."""
    lu, order = factors(a)
    return substitute(lu, order, b)


def factors(a):
    n, order = len(a), list(range(len(a)))
    for k in range(n):
        p = max(range(k, n), key=lambda i: abs(a[i][k]))
        if p != k:
            a[k], a[p] = a[p], a[k]
            order[k], order[p] = order[p], order[k]
        pivot, row = a[k][k], a[k]
        for i in range(k + 1, n):
            below = a[i]
            if below[k] != 0.0:
                m = below[k] / pivot
                below[k] = m
                for j in range(k + 1, n):
                    if row[j] != 0.0:
                        below[j] -= m * row[j]
    return a, order


def substitute(lu, order, b):
    n = len(lu)
    x = [b[i] for i in order]
    for i in range(n):
        row = lu[i]
        x[i] -= sum(row[j] * x[j] for j in range(i))
    for i in range(n - 1, -1, -1):
        row = lu[i]
        x[i] = (x[i] - sum(row[j] * x[j] for j in range(i + 1, n))) / row[i]
    return x


def jacobian(f, t, x):
    n, base = len(x), f(t, x)
    columns = []
    for j in range(n):
        step = 1e-7 * max(abs(x[j]), 1e-3)
        y = list(x)
        y[j] += step
        up = f(t, y)
        y[j] -= 2 * step
        down = f(t, y)
        columns.append([(u - d) / (2 * step) for u, d in zip(up, down)])
    return [[columns[j][i] for j in range(n)] for i in range(n)], base


def newton(f, x, steps=60):
    """Finds f(x) = 0."""
    for _ in range(steps):
        jac, r = jacobian(lambda _, y: f(y), 0.0, x)
        d = solve_linear(jac, r)
        x = [a - b for a, b in zip(x, d)]
        if max(abs(b) / (1e-14 + abs(a)) for a, b in zip(x, d)) < 1e-13:
            break
    return x


_A = [[1 / 5], [3 / 40, 9 / 40], [44 / 45, -56 / 15, 32 / 9], [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
      [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656], [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84]]
_C = [1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1]
_E = [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40]


def _norm(err, x, y, tol, size):
    return math.sqrt(sum((e / (tol * (s + max(abs(a), abs(b))))) ** 2 for e, a, b, s in zip(err, x, y, size)) / len(x))


def explicit(f, x, t, stops, seen, tol=1e-11, size=None, every=False, most=math.inf):
    """size: of each unknown, below which its errors do not count in proportion to it."""
    size = size or [1e-3] * len(x)
    h = None
    seen(t, x)
    for stop in stops:
        while t < stop * (1 - 1e-15):
            h = min(most, stop - t, h or (stop - t) * 1e-4)
            while True:
                k = [f(t, x)]
                for a, c in zip(_A, _C):
                    y = [xi + h * sum(ai * ki[i] for ai, ki in zip(a, k)) for i, xi in enumerate(x)]
                    k.append(f(t + c * h, y))
                err = [h * sum(e * ki[i] for e, ki in zip(_E, k)) for i in range(len(x))]
                r = _norm(err, x, y, tol, size)
                if r <= 1:
                    break
                h *= max(0.2, 0.9 * r ** -0.2)
            last = t + h >= stop * (1 - 1e-15)
            t, x = (stop if last else t + h), y
            if every or last:
                seen(t, x)
            h *= min(4, 0.9 * max(r, 1e-10) ** -0.2)
    return x


_S6 = math.sqrt(6)
_RA = [[(88 - 7 * _S6) / 360, (296 - 169 * _S6) / 1800, (-2 + 3 * _S6) / 225],
       [(296 + 169 * _S6) / 1800, (88 + 7 * _S6) / 360, (-2 - 3 * _S6) / 225],
       [(16 - _S6) / 36, (16 + _S6) / 36, 1 / 9]]
_RC = [(4 - _S6) / 10, (4 + _S6) / 10, 1]
_RE = [(-13 - 7 * _S6) / 3, (-13 + 7 * _S6) / 3, -1 / 3]
_REAL = 3 + 3 ** (2 / 3) - 3 ** (1 / 3)


def stiff(f, x, t, stops, seen, mass=None, tol=1e-9, size=None, every=False, most=math.inf, first=1e-6):
    n = len(x)
    mass = mass or [1.0] * n
    size = size or [1e-3] * n
    seen(t, x)
    for stop in stops:
        h, made = min(first, stop - t), None
        while t < stop * (1 - 1e-15):
            h = min(most, h)
            if t + h > stop or stop - t - h < 1e-9 * h:
                h = stop - t
            jac, f0 = jacobian(f, t, x)
            while True:
                if made is None or made[0] != h or made[1] is not jac:
                    big = [[(mass[i] if r == s and i == j else 0.0) - h * _RA[r][s] * jac[i][j] for s in range(3) for j in range(n)]
                           for r in range(3) for i in range(n)]
                    small = [[(_REAL / h * mass[i] if i == j else 0.0) - jac[i][j] for j in range(n)] for i in range(n)]
                    made = (h, jac, factors(big), factors(small))
                z, ok, before = [[0.0] * n for _ in range(3)], False, None
                for _ in range(12):
                    g = [f(t + c * h, [a + b for a, b in zip(x, zi)]) for c, zi in zip(_RC, z)]
                    rest = [h * sum(_RA[r][s] * g[s][i] for s in range(3)) - mass[i] * z[r][i] for r in range(3) for i in range(n)]
                    d = substitute(*made[2], rest)
                    z = [[z[r][i] + d[r * n + i] for i in range(n)] for r in range(3)]
                    move = max(_norm(d[r * n:r * n + n], x, x, tol, size) for r in range(3))
                    if move < 1e-3:
                        ok = True
                        break
                    if before is not None and move > 2 * before:
                        break
                    before = move
                if not ok:
                    h /= 4
                    continue
                err = substitute(*made[3], [f0[i] + mass[i] * sum(e * zi[i] for e, zi in zip(_RE, z)) / h for i in range(n)])
                y = [a + b for a, b in zip(x, z[2])]
                r = _norm(err, x, y, tol, size)
                if r <= 1:
                    break
                h *= max(0.1, 0.8 * r ** -0.25)
            last = t + h >= stop * (1 - 1e-15)
            t, x = (stop if last else t + h), y
            if every or last:
                seen(t, x)
            h *= min(5, 0.8 * max(r, 1e-8) ** -0.25)
    return x


def peak(times, values):
    """The greatest value of a fine series, with the parabola through it and its neighbours; (t, value)."""
    k = max(range(len(values)), key=lambda i: values[i])
    if k in (0, len(values) - 1):
        return times[k], values[k]
    (t0, t1, t2), (a, b, c) = times[k - 1:k + 2], values[k - 1:k + 2]
    if t0 == t1 or t1 == t2:  # at a jump of a drive
        return t1, b
    p, q = (b - a) / (t1 - t0), (c - b) / (t2 - t1)
    w = (q - p) / (t2 - t0)
    if w >= 0:
        return t1, b
    at = (t0 + t1) / 2 - p / (2 * w)
    return at, a + p * (at - t0) + w * (at - t0) * (at - t1)


def crossing(times, values, level):
    """The first time at which a fine series crosses a level, straight between its points."""
    for k in range(1, len(values)):
        if (values[k - 1] < level) != (values[k] < level):
            return times[k - 1] + (level - values[k - 1]) / (values[k] - values[k - 1]) * (times[k] - times[k - 1])
    return None
