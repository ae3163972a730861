"""Two crossed random factors, one reading in each cell: three variances."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import stats

from quadrature import Posterior, graded, named, panels, read, shifted, twice, write

data = read(__file__)
plates, lots = sorted(set(data["plate"])), sorted(set(data["lot"]))
cell = {(p, s): float(d) - 20.0 for p, s, d in zip(data["plate"], data["lot"], data["diameter"])}
y = np.array([[cell[p, s] for s in lots] for p in plates])
I, J = y.shape
mean = y.mean()
row, column = y.mean(axis=1), y.mean(axis=0)
ssp, ssl = J * ((row - mean) ** 2).sum(), I * ((column - mean) ** 2).sum()
sse = ((y - row[:, None] - column + mean) ** 2).sum()


def build(refine):
    def log_density(p, s, e):
        # Four independent strata: error, plates, lots, mean (Searle, Casella, McCulloch 1992, section 4.3).
        by_plate, by_lot = e**2 + J * p**2, e**2 + I * s**2
        total = 100.0 + p**2 / I + s**2 / J + e**2 / (I * J)
        result = -(I - 1) * (J - 1) * np.log(e) - sse / (2 * e**2) - 0.5 * (e / 2) ** 2
        result = result - 0.5 * (I - 1) * np.log(by_plate) - ssp / (2 * by_plate) - 0.5 * (p / 2) ** 2
        result = result - 0.5 * (J - 1) * np.log(by_lot) - ssl / (2 * by_lot) - 0.5 * (s / 2) ** 2
        return result - 0.5 * np.log(total) - mean**2 / (2 * total)

    post = Posterior(log_density, [graded(0.4, 5, 9, refine), graded(0.4, 18, 10, refine), panels(0.3, 1.1, 8, refine)])
    p, s, e = post.mesh
    noise = p**2 / I + s**2 / J + e**2 / (I * J)
    variance = 1 / (1 / 100.0 + 1 / noise)
    # One lot's effect: its deviation from the mean of the lots' effects, and that mean, are independent given the sds.
    total = 100.0 + noise
    shrink = I * s**2 / (e**2 + I * s**2)
    centre = shrink * (column[5] - mean) + s**2 / J / total * mean
    spread = (1 - 1 / J) * (1 - shrink) * s**2 + s**2 / J * (1 - s**2 / J / total)
    return [
        named("grand", shifted(post.mixture(stats.norm, variance * mean / noise, np.sqrt(variance)), 20.0)),
        named("plate_sd", post.marginal(0)),
        named("lot_sd", post.marginal(1)),
        named("residual", post.marginal(2)),
        named("lot_effect", post.mixture(stats.norm, centre, np.sqrt(spread)), lots[5]),
    ]


entries, agreement = twice(build)
write(
    __file__,
    "Davies, O. L. and Goldsmith, P. L., eds. (1972), Statistical Methods in Research and Production, 4th ed., section 6.6; "
    "read from pydataset 0.2.0, table Penicillin",
    "three-dimensional quadrature over the sds, the rest in closed form",
    entries,
    agreement,
)
