"""A beta response by mean and size: a = mean * size, b = (1 - mean) * size."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import special

from quadrature import Axis, Posterior, graded, named, numbers, panels, read, twice, write

y = numbers(read(__file__)["capped"])


def build(refine):
    def log_density(typical, size):
        a, b = typical * size, (1 - typical) * size
        prior = np.log(typical) + np.log1p(-typical) - 0.5 * (np.log(size) - 2) ** 2 - np.log(size)
        return prior + (a - 1) * np.log(y).sum() + (b - 1) * np.log1p(-y).sum() - len(y) * special.betaln(a, b)

    post = Posterior(log_density, [Axis(panels(0, 1, 40, refine).edges, closed=True), graded(0.5, 300, 40, refine)])
    return [named("typical", post.marginal(0)), named("tightness", post.marginal(1))]


entries, agreement = twice(build)
write(__file__, "16 shares invented for this check", "two-dimensional quadrature", entries, agreement)
