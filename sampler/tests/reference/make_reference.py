"""Writes laws.csv and special.csv: densities and tails of the laws and special functions, by mpmath 1.4.1, 50 digits.

Run in this folder with mpmath installed: python make_reference.py
Every input is taken as the double that Rust reads, so that the constants belong to exactly these inputs.
"""
from mpmath import mp, mpf, log, exp, pi, sqrt, erfc, loggamma, atan, log1p, expm1

mp.dps = 50


def lg(x):
    return loggamma(x)


def gammainc(a, low, high=None, regularized=True):
    """The incomplete gamma function by its series, whose terms are all positive; 250 digits where the tail is far."""
    x = low if high is None else high
    if a < 0 or x > 500 * (a + 1):
        return mp.gammainc(a, x, regularized=True) if high is None else mp.gammainc(a, 0, x, regularized=True)
    with mp.workdps(50 if x < 50 + 2 * a else 350):
        least = mpf(10) ** (-mp.dps)
        total = term = 1 / mpf(a)
        n = mpf(a)
        while term > total * least:
            n += 1
            term *= x / n
            total += term
        p = total * exp(a * log(x) - x - lg(a))
        return 1 - p if high is None else p


def betainc(a, b, low, high, regularized=True):
    """The incomplete beta function by its power series, whose terms are all positive; 350 digits for complements."""
    with mp.workdps(350):
        if low != 0:
            return betainc(b, a, 0, 1 - mpf(low))
        a, b, x = mpf(a), mpf(b), mpf(high)
        if x > 0.5:
            return 1 - betainc(b, a, 0, 1 - x)
        # x^a (1 - x)^b / (a B) times the sum of (a + b)_n / (a + 1)_n x^n.
        least = mpf(10) ** (-mp.dps)
        total = term = mpf(1)
        n = 0
        while term > total * least:
            term *= (a + b + n) / (a + 1 + n) * x
            total += term
            n += 1
        return total * exp(a * log(x) + b * log1p(-x) - lg(a) - lg(b) + lg(a + b)) / a


def normal(x, m, s):
    z = (x - m) / s
    return -z * z / 2 - log(s) - log(2 * pi) / 2, erfc(-z / sqrt(2)) / 2, erfc(z / sqrt(2)) / 2


def student(x, df, c, s):
    z = (x - c) / s
    d = lg((df + 1) / 2) - lg(df / 2) - log(df * pi) / 2 - log(s) - (df + 1) / 2 * log1p(z * z / df)
    outer = betainc(df / 2, mpf(1) / 2, 0, df / (df + z * z), regularized=True) / 2
    return (d, outer, 1 - outer) if z < 0 else (d, 1 - outer, outer)


def laplace(x, c, s):
    z = (x - c) / s
    outer = exp(-abs(z)) / 2
    return (-log(2 * s) - abs(z),) + ((outer, 1 - outer) if z < 0 else (1 - outer, outer))


def cauchy(x, c, s):
    z = (x - c) / s
    return -log(pi * s * (1 + z * z)), mpf(1) / 2 + atan(z) / pi, mpf(1) / 2 - atan(z) / pi


def lognormal(x, m, s):
    d, a, b = normal(log(x), m, s)
    return d - log(x), a, b


def gamma(x, a, r):
    return (a * log(r) - lg(a) + (a - 1) * log(x) - r * x, gammainc(a, 0, r * x, regularized=True), gammainc(a, r * x, regularized=True))


def inverse_gamma(x, a, s):
    return (a * log(s) - lg(a) - (a + 1) * log(x) - s / x, gammainc(a, s / x, regularized=True), gammainc(a, 0, s / x, regularized=True))


def weibull(x, k, s):
    t = (x / s) ** k
    return log(k / s) + (k - 1) * log(x / s) - t, -expm1(-t), exp(-t)


def beta_law(x, a, b):
    d = (a - 1) * log(x) + (b - 1) * log1p(-x) - lg(a) - lg(b) + lg(a + b)
    return d, betainc(a, b, 0, x, regularized=True), betainc(a, b, x, 1, regularized=True)


def uniform(x, a, b):
    return -log(b - a), (x - a) / (b - a), (b - x) / (b - a)


def half(law, *before):
    def of(x, *p):
        d, _, upper = law(x, *before_args(p))
        return d + log(2), 1 - 2 * upper, 2 * upper
    before_args = before[0]
    return of


def binomial_pq(x, n, p, q):
    d = lg(n + 1) - lg(x + 1) - lg(n - x + 1) + (x * log(p) if x else 0) + ((n - x) * log(q) if n - x else 0)
    low = betainc(n - x, x + 1, 0, q, regularized=True) if x < n else mpf(1)
    high = betainc(x + 1, n - x, 0, p, regularized=True) if x < n else mpf(0)
    return d, low, high


def logistic(t):
    return 1 / (1 + exp(-t)), 1 / (1 + exp(t))


def phi(t):
    return erfc(-t / sqrt(2)) / 2, erfc(t / sqrt(2)) / 2


def poisson(x, m):
    return x * log(m) - m - lg(x + 1), gammainc(x + 1, m, regularized=True), gammainc(x + 1, 0, m, regularized=True)


def negative_binomial(x, m, s):
    d = lg(x + s) - lg(s) - lg(x + 1) + s * log(s / (s + m)) + (x * log(m / (s + m)) if x else 0)
    return (d, betainc(s, x + 1, 0, s / (s + m), regularized=True), betainc(x + 1, s, 0, m / (s + m), regularized=True))


LAWS = {
    "Normal": (normal, [(0, 1), (-3.5, 0.2), (1e6, 30)], lambda p: [p[0] + k * p[1] for k in (-30, -8.25, -1, 0, 1e-9, 0.3, 6.5, 20)]),
    "StudentT": (student, [(1, 0, 1), (0.5, 2, 3), (4, -1, 0.25), (30, 0, 1), (1e7, 0, 2)], lambda p: [p[1] + k * p[2] for k in (-50, -8, -1, 1e-6, 0.3, 4, 20)]),
    "Laplace": (laplace, [(0, 1), (3, 0.1)], lambda p: [p[0] + k * p[1] for k in (-300, -2, -0.1, 0.1, 5, 100)]),
    "Cauchy": (cauchy, [(0, 1), (-2, 7)], lambda p: [p[0] + k * p[1] for k in (-1e9, -20, -1, 0.125, 3, 1e12)]),
    "Lognormal": (lognormal, [(0, 1), (2, 0.1), (-5, 3)], lambda p: [float(exp(p[0] + k * p[1])) for k in (-20, -3, -0.5, 0.2, 2, 15)]),
    "Gamma": (gamma, [(1, 1), (0.05, 2), (3.5, 0.1), (300, 20), (1e6, 3)], lambda p: [p[0] / p[1] * k for k in ((0.01, 0.3, 0.9, 1, 1.2, 2.5) if p[0] < 1e3 else (0.996, 0.9995, 1, 1.001, 1.004))]),
    "InverseGamma": (inverse_gamma, [(1, 1), (0.05, 2), (3.5, 0.1), (300, 20), (1e6, 3)], lambda p: [p[1] / p[0] * k for k in ((0.05, 0.4, 0.9, 1, 1.2, 2.5, 50) if p[0] < 1e3 else (0.996, 0.9995, 1, 1.001, 1.004))]),
    "Exponential": (lambda x, r: (log(r) - r * x, -expm1(-r * x), exp(-r * x)), [(1,), (250,)], lambda p: [k / p[0] for k in (1e-12, 0.1, 1, 30, 600)]),
    "Weibull": (weibull, [(1, 1), (0.4, 3), (7.5, 0.2)], lambda p: [p[1] * k for k in (1e-3, 0.5, 1, 1.5, 2)]),
    "Beta": (beta_law, [(1, 1), (0.1, 0.2), (2.5, 70), (500, 400), (2e6, 3e6), (0.3, 1e5)], lambda p: [0.3999, 0.4003, 0.401] if p[0] > 1e6 else [0.001, 0.03, 0.2, 0.55, 0.9]),
    "Uniform": (uniform, [(0, 1), (-3, 11)], lambda p: [p[0] + (p[1] - p[0]) * k for k in (0.125, 0.5, 0.75)]),
    "HalfNormal": (half(normal, lambda p: (0, p[0])), [(1,), (0.03,)], lambda p: [p[0] * k for k in (1e-12, 0.1, 1, 4, 25)]),
    "HalfCauchy": (half(cauchy, lambda p: (0, p[0])), [(1,), (25,)], lambda p: [p[0] * k for k in (1e-12, 0.1, 1, 40, 1e10)]),
    "HalfStudentT": (half(student, lambda p: (p[0], 0, p[1])), [(1, 1), (3, 2.5), (40, 0.1)], lambda p: [p[1] * k for k in (1e-9, 0.1, 1, 6, 30)]),
    "Bernoulli": (lambda x, p: binomial_pq(x, mpf(1), p, 1 - p), [(0.3,), (1e-9,), (0.999,)], lambda p: [0, 1]),
    "BernoulliLogOdds": (lambda x, t: binomial_pq(x, mpf(1), *logistic(t)), [(0,), (-3,), (40,), (-700,)], lambda p: [0, 1]),
    "BernoulliProbit": (lambda x, t: binomial_pq(x, mpf(1), *phi(t)), [(0,), (-3,), (9,), (-30,)], lambda p: [0, 1]),
    "Binomial": (lambda x, n, p: binomial_pq(x, n, p, 1 - p), [(7, 0.3), (500, 0.01), (1e6, 0.4)], lambda p: [0, 3, 7] if p[0] < 100 else [0, 5, 40, 500] if p[0] < 1e3 else [398000, 400000, 400500, 403000]),
    "BinomialLogOdds": (lambda x, n, t: binomial_pq(x, n, *logistic(t)), [(7, -2), (500, 3), (1e6, 0.5), (300, 38)], lambda p: [0, 3, 7] if p[0] < 100 else [299, 300] if p[0] == 300 else [400, 475, 500] if p[0] < 1e3 else [620000, 622500, 624000]),
    "BinomialProbit": (lambda x, n, t: binomial_pq(x, n, *phi(t)), [(7, -2), (500, 1.5), (1e6, 0.5)], lambda p: [0, 3, 7] if p[0] < 100 else [400, 470, 500] if p[0] < 1e3 else [689000, 691500, 693000]),
    "Poisson": (poisson, [(0.3,), (12.5,), (900,), (1e6,)], lambda p: [0, 1, 5, 30] if p[0] < 100 else [p[0] - 90, p[0], p[0] + 200]),
    "PoissonLog": (lambda x, t: poisson(x, exp(t)), [(-1.5,), (2.5,), (7,), (14,)], lambda p: [0, 1, 5, 30] if p[0] < 5 else [1000, 1100, 1300] if p[0] < 10 else [1200000, 1202604, 1206000]),
    "NegativeBinomial": (negative_binomial, [(3, 0.5), (12, 40), (5, 1e9), (1e5, 0.2), (1e5, 1e5)], lambda p: [0, 1, 9, 64, 100] if p[0] < 100 else [1000, 99000, 101000]),
    "NegativeBinomialLog": (lambda x, t, s: negative_binomial(x, exp(t), s), [(1, 0.5), (2.5, 40), (-20, 3)], lambda p: [0, 1, 9, 64]),
}


def text(value):
    return mp.nstr(value, 20, min_fixed=1, max_fixed=0)


with open("laws.csv", "w") as out:
    out.write("law,x,p0,p1,p2,ln_density,cdf,sf\n")
    for name, (law, parameters, points) in LAWS.items():
        for p in parameters:
            for x in points(p):
                x = float(x)
                found = law(mpf(x), *map(mpf, p))
                padded = list(map(repr, map(float, p))) + [""] * (3 - len(p))
                out.write(",".join([name, repr(x), *padded, *map(text, found)]) + "\n")


def ln_phi(z):
    if z > 0:
        return log1p(-erfc(z / sqrt(2)) / 2)
    return log(erfc(-z / sqrt(2)) / 2)


def quantile(p):
    z = -sqrt(-2 * log(p)) if p < 0.4 else mpf(0)
    for _ in range(200):
        step = (ln_phi(z) - log(p)) / exp(-z * z / 2 - log(2 * pi) / 2 - ln_phi(z))
        z -= step
        if abs(step) < mpf(10) ** -45:
            break
    return z


SPECIAL = {
    "ln_gamma": (lambda x: lg(x), [(x,) for x in (1e-300, 1e-8, 0.1, 0.5, 1.5, 2.75, 9.5, 100, 12345.678, 1e9, 1e300)]),
    "ln_beta": (lambda a, b: lg(a) + lg(b) - lg(a + b), [(1e-5, 3), (0.5, 0.5), (8, 11), (2.5, 1e8), (3000, 4e5), (1e10, 1e10), (0.01, 50)]),
    "ln_choose": (lambda n, k: lg(n + 1) - lg(k + 1) - lg(n - k + 1), [(5, 2), (60, 30), (1e6, 3), (1e6, 5e5), (1e12, 7)]),
    "gamma_p": (lambda a, x: gammainc(a, 0, x, regularized=True), [(0.5, 1e-20), (3, 1e-50), (10, 1), (100, 40), (1e4, 9.5e3), (1e6, 9.97e5), (0.01, 0.2), (50, 51)]),
    "gamma_q": (lambda a, x: gammainc(a, x, regularized=True), [(0.5, 600), (3, 700), (10, 60), (100, 200), (1e4, 1.06e4), (1e6, 1.004e6), (0.01, 0.2), (50, 49)]),
    "beta_low": (lambda a, b, x: betainc(a, b, 0, x, regularized=True), [(0.5, 0.5, 1e-30), (5, 3, 1e-40), (100, 200, 0.1), (1e4, 1e4, 0.47), (2, 1e6, 1e-7), (0.1, 30, 0.3)]),
    "beta_high": (lambda a, b, x: betainc(a, b, x, 1, regularized=True), [(0.5, 7, 0.999), (3, 50, 0.9), (100, 200, 0.6), (1e4, 1e4, 0.53), (2, 1e6, 1e-4)]),
    "normal_cdf": (lambda z: erfc(-z / sqrt(2)) / 2, [(z,) for z in (-38, -20, -8, -1, -1e-9, 0.5, 5)]),
    "ln_normal_cdf": (ln_phi, [(z,) for z in (-1e10, -1000, -38, -20.5, -20, -19.5, -6, -1, 0, 0.5, 3, 5.9, 6.1, 20, 37)]),
    "normal_quantile": (quantile, [(p,) for p in (1e-300, 1e-100, 1e-20, 1e-5, 0.02, 0.3, 0.49)]),
    "log1m_exp": (lambda x: log(-expm1(x)) if x > -1 else log1p(-exp(x)), [(x,) for x in (-1e-20, -0.1, -0.7, -5, -700)]),
    "log1p_exp": (lambda x: log1p(exp(x)), [(x,) for x in (-700, -40, -1, 0, 3, 40, 800)]),
    "half_cauchy_quantile": (lambda u: mp.tan(pi * u / 2), [(u,) for u in (1e-20, 0.3, 0.75, 0.999999)]),
    "log1p_square": (lambda x: log1p(x * x), [(x,) for x in (1e-9, 3, 1e9, 1e200)]),
}

with open("special.csv", "w") as out:
    out.write("function,a,b,c,value\n")
    for name, (f, points) in SPECIAL.items():
        for p in points:
            padded = list(map(repr, map(float, p))) + [""] * (3 - len(p))
            out.write(",".join([name, *padded, text(f(*map(mpf, p)))]) + "\n")
