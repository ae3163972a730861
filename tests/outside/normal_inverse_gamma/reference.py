"""Normal readings, inverse-gamma variance, and a prior of the mean that scales with it: the variance is inverse-gamma
and the mean Student-t (Raiffa and Schlaifer 1961; any textbook).
"""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import math

import numpy as np
from scipy import stats

from quadrature import Posterior, disagreement, log_normal_density, named, numbers, panels, read, summary_of_law, write

y = numbers(read(__file__)["difference"])
n, shape, scale, m0, k0 = len(y), 3.0, 3000.0, 10.0, 0.5
k = k0 + n
m = (k0 * m0 + y.sum()) / k
shape_n = shape + n / 2
scale_n = scale + 0.5 * ((y - y.mean()) ** 2).sum() + 0.5 * k0 * n * (y.mean() - m0) ** 2 / k
closed = [
    named("centre", summary_of_law(stats.t(2 * shape_n, m, math.sqrt(scale_n / (shape_n * k))))),
    named("spread", summary_of_law(stats.invgamma(shape_n, scale=scale_n))),
]


def log_density(u, c):
    """Over u = log variance, so that the long tail is smooth."""
    v = np.exp(u)
    prior = -shape * u - scale / v + log_normal_density(c, m0, np.sqrt(2 * v))
    return prior + sum(log_normal_density(value, c, np.sqrt(v)) for value in y)


# The quadrature is over the log variance: its quantiles map straight to those of the variance; the centre is compared in full.
grid = Posterior(log_density, [panels(4, 14, 30), panels(m - 600, m + 600, 120)])
centre = named("centre", grid.marginal(1))
for a, b in zip(closed[1]["quantiles"], grid.marginal(0)["quantiles"]):
    assert abs(a["value"] / math.exp(b["value"]) - 1) < 1e-9
write(
    __file__,
    "Darwin, C. (1876), The Effects of Cross and Self Fertilisation, as in Fisher, R. A. (1935), The Design of Experiments; "
    "read from pydataset 0.2.0, table darwin",
    "closed form; checked by quadrature",
    closed,
    disagreement(closed[:1], [centre]),
)
