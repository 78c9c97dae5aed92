"""The same sums in a general numerical library: reference values and the time they take.

Needs numpy and scipy; nothing of the project is used. Prints the races that
tests/integration/published/race.rs checks against, then the time for 4,096 cases of the bench's
oak: commit, splitting there, and the race to the hinge, each case one after the other.
"""

import time

import numpy as np
from scipy.integrate import solve_ivp
from scipy.optimize import brentq


def segment(p, r):
    c = np.clip(p / r, -1, 1)
    f, s = np.arccos(c), np.sqrt(1 - c * c)
    return np.array([r * r * (f - s * c), 2 / 3 * r**3 * s**3, r**4 / 4 * (f - np.sin(4 * f) / 4)])


def ligament(d, face, h):
    apex = d / 2 - face
    rear = apex - h
    a, q, j = segment(rear, d / 2) - segment(apex, d / 2)
    x = q / a
    return a, x, (j - a * x * x) / max(x - rear, apex - x), 2 * np.sqrt(max(d * d / 4 - rear**2, 0))


def split(d, face, h, e, g1, g2):
    r = d / 2
    rear = r - face - h
    a, q, j = segment(rear, r)
    a0, j0 = np.pi * r * r, np.pi * r**4 / 4
    front = j - q * q / a
    back = j0 - j - q * q / (a0 - a)
    b = 2 * np.sqrt(r * r - rear * rear)
    both = 1 / (front + back)
    return np.sqrt(2 * e * b / ((1 / front - both) / g1 + (both - 1 / j0) / g2))


def commit(d, face, mor, w, x, extra=0.0):
    def spare(h):
        _, c, s, _ = ligament(d, face, h)
        return mor * s - w * (x - c) - extra

    top = (d - face) * (1 - 1e-9)
    if spare(1e-4 * top) >= 0:
        return 0.0
    return top if spare(top) <= 0 else brentq(spare, 1e-4 * top, top, xtol=1e-14)


def race(d, face, mor, w, x, z, inertia, rate, start, hinge, tol=1e-11):
    def change(t, y):
        _, c, s, b = ligament(d, face, y[2])
        m = w * ((x - c) * np.cos(y[0]) + z * np.sin(y[0])) - mor * s
        return [y[1], m / inertia, -rate / b]

    def done(t, y):
        return y[2] - hinge

    def flat(t, y):
        return y[0] - np.pi / 2

    done.terminal = flat.terminal = True
    out = solve_ivp(change, [0, 1e3], [0, 0, start], method="DOP853", rtol=tol, atol=tol,
                    events=[done, flat])
    return out.t[-1], out.y[0][-1], out.y[2][-1]


if __name__ == "__main__":
    print("races: d, face, mor MPa, weight, forward, height, inertia, rate cm2/s, hinge:")
    print("       commit m, seconds, tilt rad, ligament left m")
    for case in [
        (0.45, 0.15, 57, 15000, 1.0, 8.0, 140000, 40, 0.045),
        (0.45, 0.15, 57, 15000, 1.4, 8.0, 140000, 20, 0.045),
        (0.40, 0.13, 66, 14000, 1.1, 7.5, 110000, 30, 0.040),
        (0.60, 0.20, 41, 30000, 1.9, 10.5, 520000, 25, 0.060),
    ]:
        d, face, mor, w, x, z, inertia, rate, hinge = case
        h = commit(d, face, mor * 1e6, w, x)
        t, tilt, left = race(d, face, mor * 1e6, w, x, z, inertia, rate * 1e-4, h, hinge)
        print(f"    ({case}, [{h:.10f}, {t:.8f}, {tilt:.8f}, {left:.8f}]),")

    rng = np.random.default_rng(1)
    n = 4096
    begun = time.perf_counter()
    ratios = []
    for _ in range(n):
        mor = 57e6 * 1.15 * np.exp(0.159 * rng.standard_normal())
        e = 9.3e9 * np.exp(0.217 * rng.standard_normal())
        g = 350 * 0.8 * np.exp(0.294 * rng.standard_normal())
        w, x = 21000 * np.exp(0.12 * rng.standard_normal()), 1.4 + 0.14 * rng.standard_normal()
        d = 0.48 + 0.01 * rng.standard_normal()
        h = commit(d, 0.16, mor, w, x)
        at = max(h, 0.048)
        _, c, s, _ = ligament(d, 0.16, at)
        ratios.append(split(d, 0.16, at, e, g, 3 * g) / min(w * (x - c), mor * s))
        if h > 0.048:
            race(d, 0.16, mor, w, x, 8.3, 210000, 40e-4, h, 0.048, 1e-4)
    print(f"{n} cases in {time.perf_counter() - begun:.1f} s; median ratio {np.median(ratios):.2f}")
