"""Prints the section values that tests/integration/published/section.rs checks against.

Needs the shapely library; nothing of the project is used. An oval of 0.55 m along and 0.48 m
across the lay with a round cavity of 0.12 m, 0.03 m forward and 0.08 m left of the centre.
"""

import numpy as np
from shapely.geometry import Polygon, box

N = 400_000


def oval(x, y, a, b):
    t = np.linspace(0.0, 2.0 * np.pi, N, endpoint=False)
    # Blown up so that the polygon has the oval's area exactly.
    k = np.sqrt(2.0 * np.pi / (N * np.sin(2.0 * np.pi / N)))
    return Polygon(np.column_stack([x + k * a * np.cos(t), y + k * b * np.sin(t)]))


def ring_sums(ring):
    x, y = np.asarray(ring.coords.xy)
    c = x[:-1] * y[1:] - x[1:] * y[:-1]
    x0, x1, y0, y1 = x[:-1], x[1:], y[:-1], y[1:]
    sums = np.array([
        c.sum() / 2,
        ((x0 + x1) * c).sum() / 6,
        ((y0 + y1) * c).sum() / 6,
        ((x0 * x0 + x0 * x1 + x1 * x1) * c).sum() / 12,
        ((y0 * y0 + y0 * y1 + y1 * y1) * c).sum() / 12,
    ])
    return sums if sums[0] > 0 else -sums


def sums(shape):
    parts = shape.geoms if hasattr(shape, "geoms") else [shape]
    total = np.zeros(5)
    for part in parts:
        total += ring_sums(part.exterior)
        for hole in part.interiors:
            total -= ring_sums(hole)
    return total


wood = oval(0, 0, 0.275, 0.24).difference(oval(0.03, -0.08, 0.06, 0.06))
for start, end in [(0.05, 0.14), (-0.275, 0.0), (-0.275, 0.275)]:
    a, x, y, xx, yy = sums(wood.intersection(box(start, -1, end, 1)))
    print(f"    ({start}, {end}, [{a:.10e}, {x / a:.10e}, {y / a:.10e}, "
          f"{xx - x * x / a:.10e}, {yy - y * y / a:.10e}]),")

# The relieved stump of tests/integration/virtual_stump.rs: face 0.06 m, left corner 0.07 m wide
# up to 0.03 m behind the apex, right corner 0.08 m wide up to 0.05 m behind it.
wood = oval(0, 0, 0.13, 0.12).difference(oval(-0.02, 0.03, 0.025, 0.025))
wood = wood.intersection(box(-1, -1, 0.07, 1))
wood = wood.difference(box(-1, -1, 0.04, -0.12 + 0.07))
wood = wood.difference(box(-1, 0.12 - 0.08, 0.02, 1))
a, x, y, xx, yy = sums(wood)
print(f"{a:.10e}, {x / a:.10e}, {y / a:.10e}, {xx - x * x / a:.10e}, {yy - y * y / a:.10e}")
