"""Binomial counts with a beta prior: the posterior is beta (Bayes 1763; any textbook)."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import stats

from quadrature import Posterior, disagreement, named, numbers, panels, read, summary_of_law, write

data = read(__file__)
trials, hits = numbers(data["sown"]).sum(), numbers(data["up"]).sum()
closed = [named("share", summary_of_law(stats.beta(2 + hits, 3 + trials - hits)))]
grid = Posterior(lambda p: (1 + hits) * np.log(p) + (2 + trials - hits) * np.log1p(-p), [panels(0, 1, 60)])
write(
    __file__,
    "eight dishes invented for this check",
    "closed form; checked by quadrature",
    closed,
    disagreement(closed, [named("share", grid.marginal(0))]),
)
