"""Recomputes fits.json, grouped.json and tails.json from their own data and prints them as JSON:
python3 make.py > made-by-python.json      (from this folder; Debian: python3-mpmath, python3-scipy)

Maxima by a Newton iteration in mpmath from a simplex search of SciPy; nothing of the committed answers is used, except
the ages at which tails.json is tabulated. Compare with check.mjs."""

import datetime
import json
import sys
from functools import lru_cache

import mpmath
import numpy
import scipy
from mpmath import exp, log, mp, mpf
from scipy import optimize, stats

sys.dont_write_bytecode = True
from distributions import DISTRIBUTIONS
from maximum import NAMES, answer, natural, starts_for

mp.dps = 30
HALF_CHI_SQUARE_95 = mpf("3.841458820694124") / 2


# ---------------------------------------------------------------- fits.json


def sample_log_likelihood(data, family):
    def f(*theta):
        d = DISTRIBUTIONS[family](**natural(family, theta))
        between = lambda a, b: d["cdf"](b) - (d["cdf"](a) if a > 0 else 0)
        return (
            sum(q * d["log_density"](mpf(t)) for t, q in data["exact"])
            + sum(q * log(between(mpf(a), mpf(b))) for a, b, q in data["between"])
            + sum(q * log(d["survival"](mpf(t))) for t, q in data["surviving"])
        )

    return f


def likelihood_ratio_interval(f, theta, errors, index):
    """Both ends of the 95 % interval; solves: the profile likelihood is 1.92 below its maximum, and its slope along the other parameter is 0."""
    top = f(*theta)
    other = 1 - index
    slope = tuple(int(k == other) for k in range(2))
    system = lambda *x: (f(*x) - top + HALF_CHI_SQUARE_95, mpmath.diff(f, x, slope))
    ends = []
    for side in (-1, 1):
        start = profile_start(f, theta, errors, index, side)
        ends.append(mpmath.findroot(system, start, tol=1e-20)[index])
    return [float(exp(min(ends))), float(exp(max(ends)))]


def profile_start(f, theta, errors, index, side):
    """Bisection in double arithmetic along the profile."""
    top = f(*theta)

    def profile(x):
        put = lambda y: [mpf(x), mpf(y)] if index == 0 else [mpf(y), mpf(x)]
        near = float(theta[1 - index])
        end = optimize.minimize_scalar(lambda y: float(-f(*put(y))), bracket=(near, near + 0.1))
        return put(end.x), -end.fun - float(top) + float(HALF_CHI_SQUARE_95)

    centre = float(theta[index])
    reach = side * 6 * errors[index]
    x = optimize.brentq(lambda x: profile(x)[1], centre, centre + reach, xtol=1e-4)
    return profile(x)[0]


def fits():
    answers = {}
    for data in json.load(open("fits.json"))["dataSets"]:
        ages = [t for t, _ in data["exact"]] + [b for _, b, _ in data["between"]]
        for family in NAMES:
            f = sample_log_likelihood(data, family)
            theta, found = answer(family, f, starts_for(family, numpy.median(ages)))
            if family == "weibull":
                relative = [found["standardErrors"][n] / found["parameters"][n] for n in NAMES[family]]
                found["intervals95"] = {n: likelihood_ratio_interval(f, theta, relative, i) for i, n in enumerate(NAMES[family])}
            answers[f"{data['name']} {family}"] = found
    return answers


# ---------------------------------------------------------------- grouped.json


def edges(labels):
    """First days of the months, and of the month after the last, as day numbers."""
    first = lambda y, m: datetime.date(y + (m - 1) // 12, (m - 1) % 12 + 1, 1).toordinal()
    pairs = [tuple(map(int, label.split("-"))) for label in labels]
    return [first(*p) for p in pairs] + [first(pairs[-1][0], pairs[-1][1] + 1)]


def cell_probabilities(family, parameters, days):
    """P of cohort i in month j >= i, by the antiderivative of F in closed form."""
    d = DISTRIBUTIONS[family](**parameters)

    @lru_cache(None)
    def antiderivative(t):
        return mpf(t) * d["cdf"](mpf(t)) - d["partial_mean"](mpf(t)) if t > 0 else mpf(0)

    def mean(i, day):
        return (antiderivative(day - days[i]) - antiderivative(day - days[i + 1])) / (days[i + 1] - days[i])

    months = range(len(days) - 1)
    return [[mean(i, days[j + 1]) - mean(i, days[j]) for j in months if j >= i] for i in months]


def percentiles(pmf):
    cdf = numpy.cumsum(pmf)
    count = lambda p: int(numpy.argmax(cdf >= p))
    return {p: {"count": count(float(p)), "cdf": cdf[count(float(p))], "cdfBelow": cdf[count(float(p)) - 1]}
            for p in ("0.025", "0.05", "0.5", "0.95", "0.975")}


def plug_in_counts(survivors, probabilities):
    pmf = numpy.ones(1)
    for n, p in zip(survivors, probabilities):
        pmf = numpy.convolve(pmf, stats.binom.pmf(numpy.arange(n + 1), n, float(p)))
    return percentiles(pmf)


def grouped():
    table = json.load(open("grouped.json"))
    cohorts = len(table["shipMonths"])
    days = edges(table["shipMonths"] + table["forecastMonths"])
    survivors = [n - sum(r) for n, r in zip(table["shipped"], table["returned"])]
    answers = {}
    for family in NAMES:
        def f(*theta):
            cells = cell_probabilities(family, natural(family, theta), days[: cohorts + 1])
            alive = [1 - sum(row) for row in cells]
            seen = sum(r * log(p) for rs, ps in zip(table["returned"], cells) for r, p in zip(rs, ps) if r > 0)
            return seen + sum(n * log(s) for n, s in zip(survivors, alive))

        theta, found = answer(family, f, starts_for(family, 300))
        rows = cell_probabilities(family, natural(family, theta), days)[:cohorts]
        known = [row[: cohorts - i] for i, row in enumerate(rows)]
        alive = [1 - sum(row) for row in known]
        ahead = [[p / s for p in row[cohorts - i :]] for i, (row, s) in enumerate(zip(rows, alive))]
        months = list(zip(*ahead))
        total = [sum(row) for row in ahead]
        answers[family] = {
            **found,
            "cellProbabilities": [[float(p) for p in row] for row in known],
            "survivorProbabilities": [float(s) for s in alive],
            "expectedByMonth": [float(sum(n * p for n, p in zip(survivors, month))) for month in months],
            "expectedTotal": float(sum(n * p for n, p in zip(survivors, total))),
            "varianceTotal": float(sum(n * p * (1 - p) for n, p in zip(survivors, total))),
            "percentilesByMonth": [plug_in_counts(survivors, month) for month in months],
            "percentilesTotal": plug_in_counts(survivors, total),
        }
    return answers


# ---------------------------------------------------------------- tails.json


def tail_row(d, row):
    x = mpf(row["x"])
    tail = d["cdf"] if row["tail"] == "lower" else d["survival"]
    goal = log(mpf(row["p"]))
    quantile = exp(mpmath.findroot(lambda y: log(tail(exp(y))) - goal, log(x)))
    hazard = exp(d["log_density"](x)) / d["survival"](x)
    return {"quantile": float(quantile), "logCdf": float(log_tail(d, "cdf", x)), "logSurvival": float(log_tail(d, "survival", x)),
            "logDensity": float(d["log_density"](x)), "hazard": float(hazard), "logHazard": float(log(hazard))}


def log_tail(d, name, x):
    """From the smaller tail, so that neither digits nor the tail itself are lost."""
    other = d["survival" if name == "cdf" else "cdf"](x)
    return mpmath.log1p(-other) if other < 0.5 else log(d[name](x))


def tails():
    mp.dps = 60
    table = json.load(open("tails.json"))
    return [
        [tail_row(DISTRIBUTIONS[one["family"]](**one["parameters"]), dict(zip(table["columns"], row))) for row in one["rows"]]
        for one in table["families"]
    ]


tool = f"Python {sys.version.split()[0]}, mpmath {mpmath.__version__}, SciPy {scipy.__version__}"
print(json.dumps({"tool": tool, "fits": fits(), "grouped": grouped(), "tails": tails()}, indent=1))
