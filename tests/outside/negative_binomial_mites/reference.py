"""A negative binomial response, variance mean + mean^2 / size."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import special

from quadrature import Posterior, graded, named, numbers, panels, read, twice, write

data = read(__file__)
y = numbers(data["mites"])
# Bliss and Fisher's mean and maximum-likelihood size (from memory: 1.1467 and 1.0246), as a check of the recalled counts.
assert round(y.mean(), 4) == 1.1467


def build(refine):
    def log_density(typical, size):
        result = np.log(typical) - typical + np.log(size) - size
        result = result + sum(special.gammaln(size + v) for v in y) - len(y) * special.gammaln(size)
        return result + len(y) * size * np.log(size / (size + typical)) + y.sum() * np.log(typical / (size + typical))

    post = Posterior(log_density, [panels(0.3, 4, 40, refine), graded(0.2, 30, 30, refine)])
    return [named("typical", post.marginal(0)), named("clumping", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Bliss, C. I. and Fisher, R. A. (1953), Fitting the negative binomial distribution to biological data, Biometrics 9, 176-200: "
    "European red mites on apple leaves; from memory",
    "two-dimensional quadrature",
    entries,
    agreement,
)
