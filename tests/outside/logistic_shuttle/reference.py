"""Logistic regression with two coefficients on 23 flights."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np

from quadrature import Posterior, log_normal_density, named, numbers, panels, read, twice, write

data = read(__file__)
x, y = (numbers(data["temperature"]) - 70) / 10, numbers(data["damaged"])


def build(refine):
    def log_density(level, slope):
        result = log_normal_density(level, 0, 5) + log_normal_density(slope, 0, 5)
        for u, v in zip(x, y):
            result = result - np.logaddexp(0, -(2 * v - 1) * (level + slope * u))
        return result

    post = Posterior(log_density, [panels(-12, 10, 40, refine), panels(-22, 10, 60, refine)])
    return [named("level", post.marginal(0)), named("slope", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Dalal, S. R., Fowlkes, E. B. and Hoadley, B. (1989), Risk analysis of the space shuttle, J. Amer. Statist. Assoc. 84, 945-957; "
    "read from pydataset 0.2.0, table SpaceShuttle (flights with a record, any primary joint damaged)",
    "two-dimensional quadrature",
    entries,
    agreement,
)
