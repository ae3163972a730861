"""Poisson counts with a gamma prior: the posterior is gamma (any textbook)."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import stats

from quadrature import Posterior, disagreement, named, numbers, panels, read, summary_of_law, write

y = numbers(read(__file__)["deaths"])
closed = [named("yearly", summary_of_law(stats.gamma(2 + y.sum(), scale=1 / (3 + len(y)))))]
grid = Posterior(lambda m: (1 + y.sum()) * np.log(m) - (3 + len(y)) * m, [panels(0, 2, 60)])
write(
    __file__,
    "von Bortkiewicz, L. (1898), Das Gesetz der kleinen Zahlen, Leipzig: Teubner (ten corps, twenty years); "
    "read from pydataset 0.2.0, table HorseKicks",
    "closed form; checked by quadrature",
    closed,
    disagreement(closed, [named("yearly", grid.marginal(0))]),
)
