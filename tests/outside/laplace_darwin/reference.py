"""A Laplace response: the density has a kink at each reading, so that each reading is a panel boundary."""

import pathlib
import sys

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parents[1]))

import numpy as np

from quadrature import Axis, Posterior, log_normal_density, named, numbers, panels, read, twice, write

y = numbers(read(__file__)["difference"])


def build(refine):
    def log_density(centre, spread):
        distance = sum(np.abs(v - centre) for v in y)
        return log_normal_density(centre, 20, 30) - len(y) * np.log(spread) - distance / spread

    centre = Axis(np.unique(np.concatenate([panels(-240, 280, 60, refine).edges, y])))
    spread = Axis(panels(5, 40, 20, refine).edges, closed=True)
    post = Posterior(log_density, [centre, spread])
    return [named("centre", post.marginal(0)), named("spread", post.marginal(1))]


entries, agreement = twice(build)
write(
    __file__,
    "Darwin, C. (1876), The Effects of Cross and Self Fertilisation, as in Fisher, R. A. (1935), The Design of Experiments; "
    "read from pydataset 0.2.0, table darwin",
    "two-dimensional quadrature",
    entries,
    agreement,
)
