"""A negative binomial response with known size and one unknown log mean."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np

from quadrature import Posterior, log_normal_density, named, numbers, panels, read, twice, write

data = read(__file__)
y = numbers(data["mites"])
# Bliss and Fisher's mean and maximum-likelihood size (from memory: 1.1467 and 1.0246), as a check of the recalled counts.
assert round(y.mean(), 4) == 1.1467


def build(refine):
    def log_density(level):
        result = log_normal_density(level, 0, 2)
        return result + y.sum() * level - (len(y) * 1.2 + y.sum()) * np.log(1.2 + np.exp(level))

    post = Posterior(log_density, [panels(-2, 2.5, 60, refine)])
    return [named("level", post.marginal(0))]


entries, agreement = twice(build)
write(
    __file__,
    "Bliss, C. I. and Fisher, R. A. (1953), Fitting the negative binomial distribution to biological data, Biometrics 9, 176-200: "
    "European red mites on apple leaves; from memory",
    "one-dimensional quadrature",
    entries,
    agreement,
)
