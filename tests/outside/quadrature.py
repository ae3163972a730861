"""Reference posteriors to ten digits and more, for the cases beside this file.

Needs numpy and scipy (any recent version). Each case's `reference.py` builds its posterior on a grid of composite
Gauss-Legendre panels, or from a law of scipy.stats, and writes `expected.json`. Every grid is built twice, the second time with more and
other panels; the two must agree to 1e-9 of a posterior standard deviation, and the worst disagreement is written down with the values.

What is written for each quantity: mean, sd, kurtosis (fourth central moment over the squared variance: for the Monte Carlo error of an
sd), and for five probabilities the quantile with the density there and the density's slope (for the Monte Carlo error of a quantile).
"""

import json
import math
import pathlib

import numpy as np
from numpy.polynomial import legendre
from scipy import optimize

PROBABILITIES = (0.025, 0.25, 0.5, 0.75, 0.975)
ORDER = 20


class Axis:
    """A parameter's range in panels: `edges` are the panel boundaries (a kink of the density belongs on one).

    `closed` says that the range is the whole support, so that the density need not vanish at its ends.
    """

    def __init__(self, edges, closed=False):
        self.closed = closed
        self.edges = np.asarray(edges, dtype=float)
        x, w = legendre.leggauss(ORDER)
        half = np.diff(self.edges) / 2
        middle = (self.edges[1:] + self.edges[:-1]) / 2
        self.nodes = (middle[:, None] + half[:, None] * x).ravel()
        self.weights = (half[:, None] * w).ravel()


def panels(low, high, count, refine=1.0):
    """An axis of equal panels."""
    return Axis(np.linspace(low, high, math.ceil(count * refine) + 1))


def graded(low, high, count, refine=1.0):
    """An axis of panels that widen in equal ratios from `low` > 0 on, with one more from 0 to `low`."""
    inner = np.geomspace(low, high, math.ceil(count * refine) + 1)
    return Axis(np.concatenate([[0.0], inner]))


class Posterior:
    """A posterior over one to three parameters: `log_density` takes one array for each axis, ready to broadcast."""

    def __init__(self, log_density, axes):
        self.axes = axes
        shape = [[-1 if i == j else 1 for i in range(len(axes))] for j in range(len(axes))]
        self.mesh = [axis.nodes.reshape(s) for axis, s in zip(axes, shape)]
        log = log_density(*self.mesh)
        density = np.exp(log - np.max(log))
        self.weights = density
        for axis, s in zip(axes, shape):
            self.weights = self.weights * axis.weights.reshape(s)
        self.weights = self.weights / self.weights.sum()
        for index, axis in enumerate(axes):
            self.check_ends(axis, self.density(index))

    def density(self, index):
        """The marginal density of one parameter at the nodes of its axis."""
        others = tuple(i for i in range(len(self.axes)) if i != index)
        return self.weights.sum(axis=others) / self.axes[index].weights

    @staticmethod
    def check_ends(axis, density):
        """Nothing that counts may lie beyond an end of the axis, except where the end is the support's own."""
        if axis.closed:
            return
        ends = [density[-1]] if axis.edges[0] == 0 else [density[0], density[-1]]
        assert max(ends) < 1e-13 * density.max(), f"the axis {axis.edges[0]} to {axis.edges[-1]} is too short: {ends}"

    def marginal(self, index):
        """The summary of one parameter."""
        return summary_on_panels(self.axes[index], self.density(index))

    def mixture(self, family, *parameters):
        """The summary of a quantity whose law given the parameters is `family` of scipy.stats with arrays that broadcast."""
        # Cells too light to reach the tenth digit are left out.
        heavy = self.weights > 1e-17 * self.weights.max()
        weights = self.weights[heavy]
        parameters = [np.broadcast_to(p, self.weights.shape)[heavy] for p in parameters]
        return summary_of_mixture(weights / weights.sum(), family(*parameters))


def summary_on_panels(axis, density):
    """Moments from the panels; quantiles from the integral of each panel's interpolating polynomial."""
    mass = density * axis.weights
    mean = float((mass * axis.nodes).sum())
    d = axis.nodes - mean
    variance = float((mass * d**2).sum())
    fourth = float((mass * d**4).sum())
    x, w = legendre.leggauss(ORDER)
    k = np.arange(ORDER)
    basis = legendre.legvander(x, ORDER - 1)
    panel_values = density.reshape(-1, ORDER)
    coefficients = panel_values @ (w[:, None] * basis) * (2 * k + 1) / 2
    cumulative = np.concatenate([[0.0], np.cumsum(mass.reshape(-1, ORDER).sum(axis=1))])
    quantiles = []
    for p in PROBABILITIES:
        panel = min(int(np.searchsorted(cumulative, p, side="right")) - 1, len(panel_values) - 1)
        low, high = axis.edges[panel], axis.edges[panel + 1]
        half = (high - low) / 2
        c = coefficients[panel]
        integral = legendre.legint(c, lbnd=-1)
        gap = lambda t: cumulative[panel] + half * legendre.legval(t, integral) - p
        t = optimize.brentq(gap, -1, 1, xtol=1e-15)
        quantiles.append(quantile(p, (low + high) / 2 + half * t, legendre.legval(t, c), legendre.legval(t, legendre.legder(c)) / half))
    return summary(mean, variance, fourth, quantiles)


def summary_of_mixture(weights, law):
    """Moments and quantiles of a mixture with the given weights."""
    m, v, s, k = np.broadcast_arrays(*law.stats("mvsk"))
    m, v, third, fourth = m, v, s * v**1.5, (k + 3) * v**2
    mean = float((weights * m).sum())
    d = m - mean
    variance = float((weights * (v + d**2)).sum())
    fourth = float((weights * (fourth + 4 * third * d + 6 * v * d**2 + d**4)).sum())
    sd = math.sqrt(variance)
    quantiles = []
    for p in PROBABILITIES:
        gap = lambda q: float((weights * law.cdf(q)).sum()) - p
        q = optimize.brentq(gap, mean - 12 * sd, mean + 12 * sd, xtol=1e-14 * sd + 1e-15 * abs(mean), rtol=1e-15)
        h = 1e-4 * sd
        density = [float((weights * law.pdf(q + step)).sum()) for step in (-h, 0.0, h)]
        quantiles.append(quantile(p, q, density[1], (density[2] - density[0]) / (2 * h)))
    return summary(mean, variance, fourth, quantiles)


def summary_of_law(law):
    """Moments and quantiles of a law in closed form."""
    m, v, _, k = (float(value) for value in law.stats("mvsk"))
    h = 1e-4 * math.sqrt(v)
    quantiles = []
    for p in PROBABILITIES:
        q = float(law.ppf(p))
        assert abs(law.cdf(q) - p) < 1e-12
        quantiles.append(quantile(p, q, float(law.pdf(q)), float(law.pdf(q + h) - law.pdf(q - h)) / (2 * h)))
    return summary(m, v, (k + 3) * v**2, quantiles)


def shifted(result, offset):
    """The summary of the quantity plus a constant, for work around a large offset."""
    moved = [quantile(q["p"], q["value"] + offset, q["density"], q["slope"]) for q in result["quantiles"]]
    return {**result, "mean": result["mean"] + offset, "quantiles": moved}


def quantile(p, value, density, slope):
    return {"p": p, "value": float(value), "density": float(density), "slope": float(slope)}


def summary(mean, variance, fourth, quantiles):
    return {"mean": mean, "sd": math.sqrt(variance), "kurtosis": fourth / variance**2, "quantiles": quantiles}


def named(quantity, result, labels=""):
    """One entry of `expected`."""
    return {"quantity": quantity, "labels": labels, **result}


def disagreement(a, b):
    """The largest difference of two lists of entries, in posterior sds."""
    worst = 0.0
    for x, y in zip(a, b, strict=True):
        pairs = [(x["mean"], y["mean"]), (x["sd"], y["sd"])]
        pairs += [(p["value"], q["value"]) for p, q in zip(x["quantiles"], y["quantiles"])]
        worst = max(worst, max(abs(u - v) for u, v in pairs) / x["sd"])
    return worst


def twice(build, limit=1e-9):
    """Builds the entries on two grids, and gives the finer ones and how far the two are apart."""
    coarse, fine = build(1.0), build(1.45)
    worst = disagreement(coarse, fine)
    assert worst < limit, f"the two grids differ by {worst:.2e} sd"
    return fine, worst


def write(script, source, method, entries, agreement, **more):
    """`expected.json` beside the script."""
    path = pathlib.Path(script).resolve().parent / "expected.json"
    content = {"source": source, "method": method, "agreement_in_sds": agreement, **more, "expected": entries}
    path.write_text(json.dumps(content, indent=1) + "\n", encoding="utf-8")
    print(f"{path.parent.name}: two ways agree to {agreement:.1e} sd")
    for e in entries:
        q = e["quantiles"]
        print(f"  {e['quantity']}[{e['labels']}] {e['mean']:.10g} sd {e['sd']:.6g}  ({q[0]['value']:.6g} .. {q[4]['value']:.6g})")


def write_criteria(script, source, method, rungs):
    """`expected.json` of a case about information criteria."""
    path = pathlib.Path(script).resolve().parent / "expected.json"
    path.write_text(json.dumps({"source": source, "method": method, "ladder": rungs}, indent=1) + "\n", encoding="utf-8")
    print(f"{path.parent.name}: {rungs}")


def read(script, name="data.csv"):
    """The columns of a table beside the script, as lists of text."""
    lines = (pathlib.Path(script).resolve().parent / name).read_text(encoding="utf-8").split()
    rows = [line.split(",") for line in lines]
    return {heading: [row[i] for row in rows[1:]] for i, heading in enumerate(rows[0])}


def numbers(column):
    return np.array([float(cell) for cell in column])


def log_normal_density(x, mean, sd):
    """The log density of a normal."""
    return -0.5 * ((x - mean) / sd) ** 2 - np.log(sd) - 0.5 * math.log(2 * math.pi)
