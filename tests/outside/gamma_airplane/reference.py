"""A gamma response by mean and sd: shape (mean / sd)^2, rate mean / sd^2."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import special

from quadrature import Posterior, graded, named, numbers, read, twice, write

data = read(__file__)
y = numbers(data["hours"])


def build(refine):
    def log_density(typical, spread):
        shape, rate = (typical / spread) ** 2, typical / spread**2
        result = np.log(typical) - 0.02 * typical - 0.5 * (spread / 100) ** 2
        return result + len(y) * (shape * np.log(rate) - special.gammaln(shape)) + (shape - 1) * np.log(y).sum() - rate * y.sum()

    post = Posterior(log_density, [graded(10, 1500, 50, refine), graded(10, 900, 50, refine)])
    return [named("typical", post.marginal(0)), named("spread", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Proschan, F. (1963), Theoretical explanation of observed decreasing failure rate, Technometrics 5, 375-383; "
    "read from pydataset 0.2.0, table aircondit7",
    "two-dimensional quadrature",
    entries,
    agreement,
)
