"""A Cauchy response with a half-Cauchy prior of its scale."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np

from quadrature import Posterior, graded, log_normal_density, named, numbers, panels, read, twice, write

data = read(__file__)
y = numbers(data["nickel"])


def build(refine):
    def log_density(centre, spread):
        result = log_normal_density(centre, 10, 10) - np.log1p((spread / 5) ** 2) - len(y) * np.log(spread)
        return result - sum(np.log1p(((v - centre) / spread) ** 2) for v in y)

    post = Posterior(log_density, [panels(-20, 50, 120, refine), graded(0.3, 150, 30, refine)])
    return [named("centre", post.marginal(0)), named("spread", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Abbey, S. (1988), Geostandards Newsletter 12, 241, as in Analytical Methods Committee (1989), Analyst 114, 1693-1702; "
    "read from pydataset 0.2.0, table abbey",
    "two-dimensional quadrature",
    entries,
    agreement,
)
