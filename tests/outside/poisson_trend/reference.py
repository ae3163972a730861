"""Poisson regression with two coefficients. The counts are recalled; the maximum-likelihood coefficients that the literature
gives for them (from memory: 0.340 and 0.257 a quarter) come out."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np

from quadrature import Posterior, log_normal_density, named, numbers, panels, read, twice, write

data = read(__file__)
x, y = numbers(data["quarter"]) - 7, numbers(data["deaths"])

# Maximum likelihood by Newton's method, as a check of the recalled counts.
design, b = np.column_stack([np.ones(len(x)), x]), np.array([2.0, 0.2])
for _ in range(30):
    m = np.exp(design @ b)
    b = b + np.linalg.solve(design.T @ (m[:, None] * design), design.T @ (y - m))
assert abs(b[0] - 7 * b[1] - 0.340) < 0.0005 and abs(b[1] - 0.257) < 0.0005


def build(refine):
    def log_density(level, trend):
        eta = [level + trend * u for u in x]
        prior = log_normal_density(level, 0, 3) + log_normal_density(trend, 0, 1)
        return prior + sum(k * e - np.exp(e) for k, e in zip(y, eta))

    post = Posterior(log_density, [panels(0.5, 3.2, 40, refine), panels(0.06, 0.5, 40, refine)])
    return [named("level", post.marginal(0)), named("trend", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Whyte, B. M. et al. (1987), deaths from AIDS in Australia by quarter, 1983 to 1986, as in Dobson, A. J. (1990), An Introduction to "
    "Generalized Linear Models, table 3.3; from memory",
    "two-dimensional quadrature",
    entries,
    agreement,
)
