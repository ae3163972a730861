"""Failure counts with exposure: gamma rates by type of ship, with both parameters of the gamma unknown."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import special, stats

from quadrature import Posterior, graded, named, read, twice, write

data = read(__file__)
hulls = sorted(set(data["hull"]))
rows = list(zip(data["hull"], data["months"], data["incidents"]))
counts = np.array([sum(int(c) for h, _, c in rows if h == hull) for hull in hulls])
exposure = np.array([sum(float(m) / 1000 for h, m, _ in rows if h == hull) for hull in hulls])


def build(refine):
    def log_density(shape, rate):
        # The rates integrated out: a negative binomial for each type's total.
        result = np.log(shape) - shape + np.log(rate) - rate
        for c, e in zip(counts, exposure):
            result = result + shape * np.log(rate) + special.gammaln(shape + c) - special.gammaln(shape) - (shape + c) * np.log(rate + e)
        return result

    post = Posterior(log_density, [graded(0.1, 45, 24, refine), graded(0.05, 45, 24, refine)])
    shape, rate = post.mesh
    entries = [named("shape_of_rates", post.marginal(0)), named("rate_of_rates", post.marginal(1))]
    for i in (0, 1, 3):
        law = (shape + counts[i], 0.0, 1 / (rate + exposure[i]))
        entries.append(named("per_thousand", post.mixture(stats.gamma, *law), hulls[i]))
    return entries


entries, agreement = twice(build)
write(
    __file__,
    "McCullagh, P. and Nelder, J. A. (1983), Generalized Linear Models, section 6.3.2, p. 137; read from pydataset 0.2.0, table ships "
    "(the 34 rows with ships in service)",
    "two-dimensional quadrature over the gamma's parameters, the rates in closed form",
    entries,
    agreement,
)
