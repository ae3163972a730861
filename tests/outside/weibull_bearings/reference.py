"""A Weibull response. The data are recalled; the maximum-likelihood shape 2.10 and scale 81.9 that the literature
gives for them come out.
"""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import stats

from quadrature import Posterior, named, numbers, panels, read, twice, write

data = read(__file__)
y = numbers(data["revolutions"])
# Maximum likelihood, as a check of the recalled figures (from memory: shape 2.10, scale 81.9).
fit = stats.weibull_min.fit(y, floc=0)
assert abs(fit[0] - 2.10) < 0.005 and abs(fit[2] - 81.9) < 0.05


def build(refine):
    def log_density(form, life):
        result = np.log(form) - form + np.log(life) - 0.02 * life
        result = result + len(y) * (np.log(form) - form * np.log(life)) + (form - 1) * np.log(y).sum()
        return result - sum((v / life) ** form for v in y)

    post = Posterior(log_density, [panels(0.05, 6, 40, refine), panels(12, 600, 60, refine)])
    return [named("form", post.marginal(0)), named("life", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Lieblein, J. and Zelen, M. (1956), Statistical investigation of the fatigue life of deep-groove ball bearings, J. Res. Nat. Bur. "
    "Standards 57, 273-316; from memory",
    "two-dimensional quadrature",
    entries,
    agreement,
)
