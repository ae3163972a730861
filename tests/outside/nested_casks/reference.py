"""Casks nested in batches, balanced: three variances."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import stats

from quadrature import Posterior, graded, named, read, shifted, twice, write

data = read(__file__)
batches = sorted(set(data["batch"]))
cells = {}
for b, c, v in zip(data["batch"], data["cask"], data["strength"]):
    cells.setdefault((b, c), []).append(float(v) - 60.0)
y = np.array([[cells[b, c] for c in sorted(c for q, c in cells if q == b)] for b in batches])
I, J, K = y.shape
cask, batch, mean = y.mean(axis=2), y.mean(axis=(1, 2)), y.mean()
sse = ((y - cask[:, :, None]) ** 2).sum()
ssc = K * ((cask - batch[:, None]) ** 2).sum()
ssb = J * K * ((batch - mean) ** 2).sum()


def build(refine):
    def strata(b, c, e):
        by_cask = e**2 + K * c**2
        return by_cask, by_cask + J * K * b**2

    def log_density(b, c, e):
        # Four independent strata: error, casks, batches, mean (Searle, Casella, McCulloch 1992, section 5.7).
        by_cask, by_batch = strata(b, c, e)
        total = 100.0 + by_batch / (I * J * K)
        result = -I * J * (K - 1) * np.log(e) - sse / (2 * e**2) - 0.5 * (e / 3) ** 2
        result = result - 0.5 * I * (J - 1) * np.log(by_cask) - ssc / (2 * by_cask) - 0.5 * (c / 3) ** 2
        result = result - 0.5 * (I - 1) * np.log(by_batch) - ssb / (2 * by_batch) - 0.5 * (b / 3) ** 2
        return result - 0.5 * np.log(total) - mean**2 / (2 * total)

    post = Posterior(log_density, [graded(0.3, 27, 11, refine), graded(0.9, 24, 14, refine), graded(0.4, 4.0, 9, refine)])
    b, c, e = post.mesh
    by_cask, by_batch = strata(b, c, e)
    noise = by_batch / (I * J * K)
    variance = 1 / (1 / 100.0 + 1 / noise)
    centre = variance * mean / noise
    shrink = J * K * b**2 / by_batch
    spread = (1 - shrink) * b**2 + shrink**2 * variance
    return [
        named("grand", shifted(post.mixture(stats.norm, centre, np.sqrt(variance)), 60.0)),
        named("batch_sd", post.marginal(0)),
        named("cask_sd", post.marginal(1)),
        named("residual", post.marginal(2)),
        named("batch_effect", post.mixture(stats.norm, shrink * (batch[0] - centre), np.sqrt(spread)), batches[0]),
    ]


entries, agreement = twice(build)
write(
    __file__,
    "Davies, O. L. and Goldsmith, P. L., eds. (1972), Statistical Methods in Research and Production, 4th ed., section 6.5; "
    "read from pydataset 0.2.0, table Pastes",
    "three-dimensional quadrature over the sds, the rest in closed form",
    entries,
    agreement,
)
