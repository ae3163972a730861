"""A balanced one-way layout with random leaves."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))


import numpy as np
from scipy import stats

from quadrature import Posterior, graded, log_normal_density, named, read, shifted, twice, write

data = read(__file__)
LABEL, READING = "leaf", "calcium"
PRIOR_MEAN, PRIOR_SD, BETWEEN, WITHIN = 3.0, 1.0, 0.5, 0.2

labels = data[LABEL]
groups = sorted(set(labels))
y = np.array([[float(v) for g, v in zip(labels, data[READING]) if g == group] for group in groups]) - PRIOR_MEAN
a, n = y.shape
means = y.mean(axis=1)
ssw = ((y - means[:, None]) ** 2).sum()
ssb = n * ((means - means.mean()) ** 2).sum()
# The book's mean squares, as a check of the recalled figures.
assert round(ssb / (a - 1), 4) == 0.2961 and round(ssw / (a * (n - 1)), 4) == 0.0066


def build(refine):
    def log_density(between, within):
        # The readings fall into three independent parts: within groups, between groups, grand mean (Searle, Casella,
        # McCulloch 1992, Variance Components, section 3.3).
        stratum = within**2 + n * between**2
        grand = np.sqrt(PRIOR_SD**2 + stratum / (a * n))
        likelihood = -a * (n - 1) * np.log(within) - ssw / (2 * within**2)
        likelihood = likelihood - 0.5 * (a - 1) * np.log(stratum) - ssb / (2 * stratum)
        likelihood = likelihood + log_normal_density(means.mean(), 0, grand)
        return likelihood - 0.5 * (between / BETWEEN) ** 2 - 0.5 * (within / WITHIN) ** 2

    axes = [graded(0.02, 9 * BETWEEN, 30, refine), graded(0.02, 9 * WITHIN, 30, refine)]
    post = Posterior(log_density, axes)
    between, within = post.mesh
    stratum = within**2 + n * between**2
    variance = 1 / (1 / PRIOR_SD**2 + a * n / stratum)
    centre = variance * a * n / stratum * means.mean()
    shrink = n * between**2 / stratum
    effect = shrink * (means[1] - centre)
    effect_sd = np.sqrt((1 - shrink) * between**2 + shrink**2 * variance)
    return [
        named("grand", shifted(post.mixture(stats.norm, centre, np.sqrt(variance)), PRIOR_MEAN)),
        named("between_sd", post.marginal(0)),
        named("within_sd", post.marginal(1)),
        named("effect", post.mixture(stats.norm, effect, effect_sd), groups[1]),
    ]


entries, agreement = twice(build)
write(
    __file__,
    "Snedecor, G. W. and Cochran, W. G. (1967), Statistical Methods, 6th ed., chapter 10: calcium in turnip greens; from memory, and the "
    "book's mean squares 0.2961 and 0.0066 (from memory too) come out of the recalled figures",
    "two-dimensional quadrature over the sds, the rest in closed form",
    entries,
    agreement,
)
