"""DIC (Spiegelhalter, Best, Carlin, van der Linde 2002) and WAIC (Watanabe 2010, the variance form) of a linear model
with known sd, exactly. The posterior is normal(m, V), so that with x a reading's row of the design, s the sd, v = x
V x' and d = y - x m: p_dic = sum(v) / s^2; log pointwise density log normal(y; x m, s^2 + v); variance of the log
density (2 v^2 + 4 d^2 v) / (4 s^4).

`mcse` is the standard deviation of each criterion's estimate from 20,000 independent draws, itself found by 400
simulated posteriors of 20,000 draws.
"""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np

from quadrature import numbers, read, write_criteria

S, DRAWS, REPEATS = 0.2, 20000, 400
data = read(__file__)
y = numbers(data["density"])
designs = {"plain": np.ones((len(y), 1)), "wires": np.column_stack([np.ones(len(y)), numbers(data["first_wire"])])}
PRIOR_MEAN = np.array([5.0, 0.0])


def log_density(y, mean, sd):
    return -0.5 * ((y - mean) / sd) ** 2 - np.log(sd) - 0.5 * np.log(2 * np.pi)


def posterior(x):
    k = x.shape[1]
    covariance = np.linalg.inv(np.eye(k) + x.T @ x / S**2)
    return covariance @ (PRIOR_MEAN[:k] + x.T @ y / S**2), covariance


def exact(x):
    m, covariance = posterior(x)
    v = np.einsum("ij,jk,ik->i", x, covariance, x)
    d = y - x @ m
    p_dic = v.sum() / S**2
    lppd = log_density(y, x @ m, np.sqrt(S**2 + v))
    penalty = (2 * v**2 + 4 * d**2 * v) / (4 * S**4)
    return {
        "dic": -2 * log_density(y, x @ m, S).sum() + 2 * p_dic,
        "p_dic": p_dic,
        "waic": -2 * (lppd - penalty).sum(),
        "p_waic": penalty.sum(),
    }


def estimate(x, random):
    """The criteria as a program works them out from draws."""
    m, covariance = posterior(x)
    draws = random.multivariate_normal(m, covariance, DRAWS)
    log = log_density(y, draws @ x.T, S)
    plug_in = -2 * log_density(y, x @ draws.mean(axis=0), S).sum()
    p_dic = -2 * log.sum(axis=1).mean() - plug_in
    penalty = log.var(axis=0, ddof=1).sum()
    lppd = np.log(np.exp(log).mean(axis=0)).sum()
    return {"dic": plug_in + 2 * p_dic, "p_dic": p_dic, "waic": -2 * (lppd - penalty), "p_waic": penalty}


rungs = []
for name, x in designs.items():
    random = np.random.default_rng(20160501)
    truth = exact(x)
    tries = [estimate(x, random) for _ in range(REPEATS)]
    entry = {"rung": name}
    for key, value in truth.items():
        found = np.array([t[key] for t in tries])
        mcse = float(found.std(ddof=1))
        # The exact value must be what the estimates scatter around.
        assert abs(found.mean() - value) < 4 * mcse / REPEATS**0.5, (name, key, found.mean(), value)
        entry[key] = {"value": float(value), "mcse": mcse}
    rungs.append(entry)
write_criteria(
    __file__,
    "Cavendish, H. (1798), Phil. Trans. R. Soc. 88, 469-526; read from pydataset 0.2.0, table Cavendish, column density; "
    "its column density3 leaves out the six readings with the first wire",
    "closed form; checked by simulation",
    rungs,
)
