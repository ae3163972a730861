"""Normal readings with known sd and a normal prior: the posterior of the mean is normal (any textbook)."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

from scipy import stats

from quadrature import Posterior, disagreement, log_normal_density, named, numbers, panels, read, shifted, summary_of_law, write

y = numbers(read(__file__)["density"])
precision = 1 / 1**2 + len(y) / 0.2**2
mean = (5 / 1**2 + y.sum() / 0.2**2) / precision
law = summary_of_law(stats.norm(mean, precision**-0.5))
entries = [named("earth", law), named("excess", shifted(law, -5))]


def log_density(m):
    return log_normal_density(m, 5, 1) + sum(log_normal_density(v, m, 0.2) for v in y)


grid = Posterior(log_density, [panels(mean - 0.4, mean + 0.4, 30)])
write(
    __file__,
    "Cavendish, H. (1798), Phil. Trans. R. Soc. 88, 469-526, as in Stigler, S. (1977), Ann. Statist. 5, 1055-1098; "
    "read from pydataset 0.2.0, table Cavendish, column density",
    "closed form; checked by quadrature",
    entries,
    disagreement(entries[:1], [named("earth", grid.marginal(0))]),
)
