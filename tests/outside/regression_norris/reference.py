"""A certified straight-line regression. The exact posterior under the model's proper priors stands in `expected`;
`certified` holds the certified least-squares values and how far the two are apart. With a residual sd that is
nearly flat a priori the coefficients follow a Student-t with n - 3 = 33 degrees of freedom, so that their posterior
sd is the certified standard error times sqrt(34 / 31), not the standard error itself.
"""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

from fractions import Fraction

import numpy as np
from scipy import stats

from quadrature import Posterior, graded, named, read, twice, write

B0, SE0, B1, SE1, RESIDUAL = -0.262323073774029, 0.232818234301152, 1.00211681802045, 0.429796848199937e-03, 0.884796396144373
data = read(__file__)
x, y = [[Fraction(cell) for cell in data[name]] for name in ("x", "y")]
n = len(x)
# Least squares in exact fractions.
sx, sxx, sy, sxy = sum(x), sum(v * v for v in x), sum(y), sum(u * v for u, v in zip(x, y))
det = n * sxx - sx * sx
b0, b1 = (sxx * sy - sx * sxy) / det, (n * sxy - sx * sy) / det
rss = float(sum((v - b0 - b1 * u) ** 2 for u, v in zip(x, y)))
assert abs(float(b0) / B0 - 1) < 1e-13 and abs(float(b1) / B1 - 1) < 1e-14 and abs((rss / (n - 2)) ** 0.5 / RESIDUAL - 1) < 1e-13
estimate = np.array([float(b0), float(b1)])
inverse = np.array([[float(sxx / det), float(-sx / det)], [float(-sx / det), float(n / det)]])
PRIOR = 1000.0**2


def given(sd):
    """Coefficient means and covariances and the log evidence for each residual sd."""
    sampling = inverse * sd[:, None, None] ** 2
    # Prior covariance PRIOR * I against the estimate's: mean = PRIOR (PRIOR + S)^-1 b, covariance = PRIOR (PRIOR + S)^-1 S.
    keep = PRIOR * np.linalg.inv(PRIOR * np.eye(2) + sampling)
    total = PRIOR * np.eye(2) + sampling
    log = -(n - 2) * np.log(sd) - rss / (2 * sd**2) - 0.5 * np.linalg.slogdet(total)[1]
    log = log - 0.5 * (estimate @ np.linalg.inv(total) @ estimate)
    return keep @ estimate, keep @ sampling, log


def build(refine):
    post = Posterior(lambda sd: given(sd)[2] - 0.5 * (sd / 100) ** 2, [graded(0.2, 60, 40, refine)])
    means, covariances, _ = given(post.mesh[0])
    return [
        named("intercept", post.mixture(stats.norm, means[:, 0], np.sqrt(covariances[:, 0, 0]))),
        named("slope", post.mixture(stats.norm, means[:, 1], np.sqrt(covariances[:, 1, 1]))),
        named("residual", post.marginal(0)),
    ]


entries, agreement = twice(build)
factor = (34 / 31) ** 0.5
certified = {
    "intercept": B0,
    "intercept_se": SE0,
    "slope": B1,
    "slope_se": SE1,
    "residual_sd": RESIDUAL,
    "intercept_mean_less_certified_in_se": (entries[0]["mean"] - B0) / SE0,
    "slope_mean_less_certified_in_se": (entries[1]["mean"] - B1) / SE1,
    "intercept_sd_over_certified_se_times_sqrt_34_over_31": entries[0]["sd"] / (SE0 * factor),
    "slope_sd_over_certified_se_times_sqrt_34_over_31": entries[1]["sd"] / (SE1 * factor),
}
write(
    __file__,
    "Norris, J., data set Norris of the Statistical Reference Datasets of NIST (36 readings); read from scipy "
    "(stats/tests/data/nist_linregress/Norris.dat)",
    "one-dimensional quadrature over the residual sd, the coefficients in closed form, least squares in exact fractions",
    entries,
    agreement,
    certified=certified,
)
