"""A Student-t response with 4 degrees of freedom."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np

from quadrature import Posterior, graded, log_normal_density, named, numbers, panels, read, twice, write

data = read(__file__)
y = numbers(data["difference"])


def build(refine):
    def log_density(centre, spread):
        result = log_normal_density(centre, 20, 30) - 0.5 * (spread / 30) ** 2 - len(y) * np.log(spread)
        return result - 2.5 * sum(np.log1p((v - centre) ** 2 / (4 * spread**2)) for v in y)

    post = Posterior(log_density, [panels(-250, 290, 180, refine), graded(2, 270, 40, refine)])
    return [named("centre", post.marginal(0)), named("spread", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Darwin, C. (1876), The Effects of Cross and Self Fertilisation, as in Fisher, R. A. (1935), The Design of Experiments; "
    "read from pydataset 0.2.0, table darwin",
    "two-dimensional quadrature",
    entries,
    agreement,
)
