"""Probit regression with two coefficients on grouped counts, among them 1049 of 1049 at five sds from the middle."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

from scipy import special

from quadrature import Posterior, log_normal_density, named, numbers, panels, read, twice, write

data = read(__file__)
x, n, y = numbers(data["age"]) - 13, numbers(data["asked"]), numbers(data["reached"])


def build(refine):
    def log_density(level, slope):
        result = log_normal_density(level, 0, 2) + log_normal_density(slope, 0, 2)
        for u, m, k in zip(x, n, y):
            eta = level + slope * u
            result = result + k * special.log_ndtr(eta) + (m - k) * special.log_ndtr(-eta)
        return result

    post = Posterior(log_density, [panels(-0.35, 0.35, 40, refine), panels(0.55, 1.25, 40, refine)])
    return [named("level", post.marginal(0)), named("slope", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Milicer, H. and Szczotka, F. (1966), Age at menarche in Warsaw girls in 1965, Human Biology 38, 199-203; "
    "read from pydataset 0.2.0, table menarche",
    "two-dimensional quadrature",
    entries,
    agreement,
)
