"""A meta-analysis with known standard errors. data.csv holds, to six decimals, the log risk ratio log((a/n) / (c/m))
and its standard error sqrt(1/a - 1/n + 1/c - 1/m) of each trial's counts (a of n vaccinated and c of m others fell
ill).
"""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np
from scipy import stats

from quadrature import Posterior, graded, named, numbers, read, twice, write

data = read(__file__)
y, se = numbers(data["log_ratio"]), numbers(data["se"])


def given_tau(tau):
    """Precision and mean of mu, and the log evidence, all with mu integrated out."""
    variance = se**2 + tau[..., None] ** 2
    precision = 1 + (1 / variance).sum(axis=-1)
    mean = (y / variance).sum(axis=-1) / precision
    log = -0.5 * np.log(variance).sum(axis=-1) - 0.5 * np.log(precision) - 0.5 * ((y**2 / variance).sum(axis=-1) - precision * mean**2)
    return precision, mean, log


def build(refine):
    post = Posterior(lambda tau: given_tau(tau)[2] - 0.5 * tau**2, [graded(0.05, 9, 30, refine)])
    tau = post.mesh[0]
    precision, mean, _ = given_tau(tau)
    entries = [named("mu", post.mixture(stats.norm, mean, precision**-0.5)), named("tau", post.marginal(0))]
    for i in (3, 11):
        keep = tau**2 / (tau**2 + se[i] ** 2)
        sd = np.sqrt(keep * se[i] ** 2 + keep**2 / precision)
        entries.append(named("study_effect", post.mixture(stats.norm, keep * (y[i] - mean), sd), data["study"][i]))
    return entries


entries, agreement = twice(build)
write(
    __file__,
    "Colditz, G. A. et al. (1994), Efficacy of BCG vaccine in the prevention of tuberculosis, JAMA 271, 698-702; counts read from "
    "pydataset 0.2.0, table BCG",
    "one-dimensional quadrature over tau, the rest in closed form",
    entries,
    agreement,
)
