"""A truncated normal response: the normalising term ties the mean to the sd."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import special

from quadrature import Posterior, graded, log_normal_density, named, numbers, panels, read, twice, write

data = read(__file__)
y = numbers(data["reading"])


def build(refine):
    def log_density(centre, spread):
        result = log_normal_density(centre, 10, 3) - 0.5 * (spread / 3) ** 2
        result = result - len(y) * special.log_ndtr((centre - 10) / spread)
        # The sum of squares around the mean, and the mean's distance: the same as the sum over the readings.
        squares = ((y - y.mean()) ** 2).sum() + len(y) * (y.mean() - centre) ** 2
        return result - len(y) * np.log(spread) - squares / (2 * spread**2)

    post = Posterior(log_density, [panels(-17, 37, 60, refine), graded(0.3, 27, 40, refine)])
    return [named("centre", post.marginal(0)), named("spread", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "24 readings invented for this check",
    "two-dimensional quadrature",
    entries,
    agreement,
)
