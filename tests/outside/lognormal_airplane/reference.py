"""A lognormal response; the derived median is worked out over its own axis."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np

from quadrature import Axis, Posterior, graded, log_normal_density, named, numbers, panels, read, twice, write

data = read(__file__)
z = np.log(numbers(data["hours"]))


def log_posterior(level, spread):
    squares = ((z - z.mean()) ** 2).sum() + len(z) * (z.mean() - level) ** 2
    return log_normal_density(level, 4, 2) - 0.5 * (spread / 2) ** 2 - len(z) * np.log(spread) - squares / (2 * spread**2)


def build(refine):
    spread = graded(0.3, 18, 30, refine)
    post = Posterior(log_posterior, [panels(-8, 16, 80, refine), spread])
    # The median exp(level) as a parameter of its own: the density gains the factor 1 / median.
    edges = np.exp(panels(-8, 16, 160, refine).edges)
    median = Posterior(lambda m, s: log_posterior(np.log(m), s) - np.log(m), [Axis(edges), spread])
    return [named("level", post.marginal(0)), named("spread", post.marginal(1)), named("median_hours", median.marginal(0))]


entries, agreement = twice(build)
write(
    __file__,
    "Proschan, F. (1963), Theoretical explanation of observed decreasing failure rate, Technometrics 5, 375-383; "
    "read from pydataset 0.2.0, table aircondit7",
    "two-dimensional quadrature",
    entries,
    agreement,
)
