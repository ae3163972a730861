"""Exponential times with a gamma prior of the rate: the posterior is gamma (any textbook)."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import stats

from quadrature import Posterior, disagreement, named, numbers, panels, read, summary_of_law, write

y = numbers(read(__file__)["hours"])
closed = [named("hazard", summary_of_law(stats.gamma(2 + len(y), scale=1 / (100 + y.sum()))))]
grid = Posterior(lambda h: (1 + len(y)) * np.log(h) - (100 + y.sum()) * h, [panels(0, 0.06, 60)])
write(
    __file__,
    "Proschan, F. (1963), Theoretical explanation of observed decreasing failure rate, Technometrics 5, 375-383; "
    "read from pydataset 0.2.0, table aircondit",
    "closed form; checked by quadrature",
    closed,
    disagreement(closed, [named("hazard", grid.marginal(0))]),
)
