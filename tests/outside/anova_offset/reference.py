"""A certified one-way analysis of variance with seven constant leading digits: sums of squares on raw values would
lose them.
"""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

from fractions import Fraction

import numpy as np
from scipy import stats

from quadrature import Posterior, graded, named, read, shifted, twice, write

LABEL, READING, OFFSET, PRIOR_SD = "treatment", "reading", 1000000, 10.0
RESIDUAL, WITHIN, BETWEEN = 0.1, 1.8, 1.68
data = read(__file__)
groups = sorted(set(data[LABEL]))
exact = [[Fraction(v) - OFFSET for g, v in zip(data[LABEL], data[READING]) if g == group] for group in groups]
a, n = len(exact), len(exact[0])
centre = [sum(v) / n for v in exact]
ssw = float(sum((v - m) ** 2 for m, row in zip(centre, exact) for v in row))
grand = sum(centre) / a
ssb = float(n * sum((m - grand) ** 2 for m in centre))
assert abs(ssw / WITHIN - 1) < 1e-13 and abs(ssb / BETWEEN - 1) < 1e-13
assert abs((ssw / (a * (n - 1))) ** 0.5 / RESIDUAL - 1) < 1e-13
means = np.array([float(m) for m in centre])


def build(refine):
    def log_density(sd):
        total = PRIOR_SD**2 + sd**2 / n
        result = -a * (n - 1) * np.log(sd) - ssw / (2 * sd**2) + -0.5 * sd**2
        return result + sum(-0.5 * np.log(total) - m**2 / (2 * total) for m in means)

    post = Posterior(log_density, [graded(0.03, 4, 40, refine)])
    sd = post.mesh[0]
    keep = PRIOR_SD**2 / (PRIOR_SD**2 + sd**2 / n)
    entries = [named("residual", post.marginal(0))]
    for i in (0, a - 1):
        law = post.mixture(stats.norm, keep * means[i], np.sqrt(keep * sd**2 / n))
        entries.append(named("level", shifted(law, float(OFFSET)), groups[i]))
    return entries


entries, agreement = twice(build, 2e-9)
df = a * (n - 1)
certified = {
    "residual_sd": RESIDUAL,
    "within_sum_of_squares": WITHIN,
    "between_sum_of_squares": BETWEEN,
    "residual_df": df,
    "residual_mean_over_certified": entries[0]["mean"] / RESIDUAL,
    "residual_median_over_certified": entries[0]["quantiles"][2]["value"] / RESIDUAL,
    "first_level_less_its_mean_in_sds": (entries[1]["mean"] - float(OFFSET) - means[0]) / entries[1]["sd"],
}
write(
    __file__,
    "Simon, S. D. and Lesage, J. P. (1989), Assessing the accuracy of ANOVA calculations in statistical software, Comput. Statist. Data "
    "Anal. 8, 325-332: data set SmLs04 of the Statistical Reference Datasets of NIST; read from scipy "
    "(stats/tests/data/nist_anova/SmLs04.dat)",
    "one-dimensional quadrature over the residual sd, the levels in closed form, sums of squares in exact fractions",
    entries,
    agreement,
    certified=certified,
)
