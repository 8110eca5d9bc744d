"""Records with a warranty limit, withdrawals, a delay and a plan, and what follows from them at given parameters, printed
as JSON: python3 make-warranty.py > warranty.json

With F the distribution function, G(t) = F(min(t, warranty) - delay) for t > delay and 0 before, u uniform in the days of
the cohort, v uniform in the days of the exit, c the cut-off:
  returned in [a, b)   mean of G(b - u) - G(a - u)          withdrawn in [a, b)   mean of 1 - G(v - u)
  survivor             mean of 1 - G(c - u)                 log likelihood        the sum of their logs
  expected in [a, b)   survivors (mean G(b - u) - mean G(a - u)) / (1 - mean G(c - u)); of planned units without the divisor
  until warranty ends  survivors (F(warranty - delay) - mean G(c - u)) / (1 - mean G(c - u)), plan left out
  history's fitted     units neither returned nor withdrawn by a, times (S(a) - S(b)) / S(a), S(t) = 1 - mean G(t - u)
Warranty in months is counted from the first day of a cohort; a day that the month lacks becomes its last.

Two routes to every mean that share nothing but the calendar and the sums: antiderivatives in closed form from partial
moments in 60 digits (mpmath), and Gauss-Legendre on pieces graded towards every kink in double precision (SciPy). The
script stops unless all answers agree to 1e-11 relative or 1e-12 absolute. The records are invented."""

import json
import sys

import mpmath
import numpy
import scipy
from mpmath import erfc, exp, expm1, gammainc, log, mp, mpf, sqrt
from scipy.special import ndtr

sys.dont_write_bytecode = True
from warranty_scenarios import KEYS, SCENARIOS, day, limit_of, records_of

mp.dps = 60
numpy.seterr(divide="ignore")  # log 0 at the end of the delay, where the lognormal is 0 as it should be


def closed(family, p):
    """F and its first and second antiderivative from the partial moments, the integrals of t^k f(t) from 0."""
    if family == "weibull":
        k, eta = mpf(p["shape"]), mpf(p["scale"])
        cdf = lambda t: -expm1(-((t / eta) ** k))
        moment = lambda n, t: eta**n * gammainc(1 + n / k, 0, (t / eta) ** k)
    else:
        m, s = mpf(p["location"]), mpf(p["scale"])
        phi = lambda z: erfc(-z / sqrt(2)) / 2
        cdf = lambda t: phi((log(t) - m) / s)
        moment = lambda n, t: exp(n * m + n * n * s * s / 2) * phi((log(t) - m) / s - n * s)
    return cdf, lambda t: t * cdf(t) - moment(1, t), lambda t: (t * t * cdf(t) - 2 * t * moment(1, t) + moment(2, t)) / 2


class ClosedRoute:
    log = staticmethod(log)

    def __init__(self, family, p, delay):
        self.F, self.A, self.B = closed(family, p)
        self.delay, self.known = delay, {}

    def ever(self, limit):
        return self.F(mpf(limit - self.delay))

    def integral(self, t, limit, order):
        """The first or second antiderivative of G."""
        if (t, limit, order) not in self.known:
            age, extra = mpf(min(t, limit) - self.delay), max(0, t - limit)
            if age <= 0:
                value = mpf(0)
            elif order == 1:
                value = self.A(age) + extra * self.F(age)
            else:
                value = self.B(age) + extra * self.A(age) + extra * extra * self.F(age) / 2
            self.known[t, limit, order] = value
        return self.known[t, limit, order]

    def by(self, t, s0, s1, limit):
        return (self.integral(t - s0, limit, 1) - self.integral(t - s1, limit, 1)) / (s1 - s0)

    def before_exit(self, a, b, s0, s1, limit):
        of = lambda t: self.integral(t, limit, 2)
        return (of(b - s0) - of(b - s1) - of(a - s0) + of(a - s1)) / ((s1 - s0) * (b - a))


class QuadratureRoute:
    log = staticmethod(numpy.log)
    nodes, weights = numpy.polynomial.legendre.leggauss(20)

    def __init__(self, family, p, delay):
        self.delay = delay
        if family == "weibull":
            self.F = lambda t: -numpy.expm1(-((t / p["scale"]) ** p["shape"]))
        else:
            self.F = lambda t: ndtr((numpy.log(t) - p["location"]) / p["scale"])

    def ever(self, limit):
        return self.F(limit - self.delay)

    def average(self, density, corners, limit):
        """The integral of density times G over age; the density is linear between its corners."""
        ends = sorted({e for e in [*corners, self.delay, limit] if self.delay <= e <= max(corners)})
        total = 0.0
        for a, b in zip(ends, ends[1:]):
            halves = 0.5 ** numpy.arange(1, 50)
            steps = [a, *sorted({*(a + (b - a) * halves), *(b - (b - a) * halves)}), b]
            for x, y in zip(steps, steps[1:]):
                t = (x + y) / 2 + (y - x) / 2 * self.nodes
                total += (y - x) / 2 * float(self.weights @ (density(t) * self.F(numpy.minimum(t, limit) - self.delay)))
        return total

    def by(self, t, s0, s1, limit):
        inside = lambda age: ((age >= t - s1) & (age <= t - s0)) / (s1 - s0)
        return self.average(inside, [t - s1, t - s0], limit)

    def before_exit(self, a, b, s0, s1, limit):
        corners = sorted([a - s1, a - s0, b - s1, b - s0])
        height = 1 / max(s1 - s0, b - a)
        trapezium = lambda age: numpy.interp(age, corners, [0, height, height, 0])
        return self.average(trapezium, corners, limit)


def answers(s, r, route):
    c = day(s["asOf"]) + 1

    lived = [(a, b, limit_of(s, a)) for a, b, _ in r["cohorts"]]
    by = lambda t, i: route.by(t, *lived[i][:2], lived[i][2])
    alive = [shipped - sum(e[3] for e in r["returned"] + r["withdrawn"] if e[0] == i) for i, (_, _, shipped) in enumerate(r["cohorts"])]
    assert min(alive) > 0
    likelihood = sum(q * route.log(by(b, i) - by(a, i)) for i, a, b, q in r["returned"])
    likelihood += sum(q * route.log(1 - route.before_exit(a, b, *lived[i])) for i, a, b, q in r["withdrawn"])
    likelihood += sum(n * route.log(1 - by(c, i)) for i, n in enumerate(alive))
    of_plan = lambda t, s0, s1: route.by(t, s0, s1, limit_of(s, s0))
    planned = [sum(n * (of_plan(b, s0, s1) - of_plan(a, s0, s1)) for s0, s1, n in r["planned"] if b > s0) for a, b in r["ahead"]]
    survivors = [sum(n * (by(b, i) - by(a, i)) / (1 - by(c, i)) for i, n in enumerate(alive)) for a, b in r["ahead"]]
    still = [(n, (route.ever(lived[i][2]) - by(c, i)) / (1 - by(c, i))) for i, n in enumerate(alive)]

    def at_risk(i, t):
        return r["cohorts"][i][2] - sum(q for j, _, b, q in r["returned"] + r["withdrawn"] if j == i and b <= t)

    fitted = [sum(at_risk(i, a) * (by(b, i) - by(a, i)) / (1 - by(a, i)) for i in range(len(lived))) for a, b in r["past"]]
    return {"logLikelihood": likelihood, "expected": [x + y for x, y in zip(survivors, planned)], "planned": planned,
            "untilWarrantyEnds": sum(n * p for n, p in still), "untilWarrantyEndsVariance": sum(n * p * (1 - p) for n, p in still),
            "fitted": fitted}


def agreed(name, first, second):
    """The first answer as doubles, or the end."""
    if isinstance(first, list):
        return [agreed(f"{name} {i}", a, b) for i, (a, b) in enumerate(zip(first, second, strict=True))]
    if abs(first - second) > 1e-11 * max(abs(first), 0.1):
        sys.exit(f"the two routes disagree: {name}: {float(first)} and {float(second)}")
    return float(first)


def line(value):
    return json.dumps(value, ensure_ascii=False)


def scenario(s):
    r = records_of(s)
    families = []
    for family, parameters in s["families"].items():
        routes = [route(family, parameters, s["delayDays"]) for route in (ClosedRoute, QuadratureRoute)]
        first, second = (answers(s, r, route) for route in routes)
        families.append({"family": family, "parameters": parameters,
                         **{key: agreed(f"{s['name']} {family} {key}", first[key], second[key]) for key in first}})
    head = {key: s[key] for key in ("name", "period", "warrantyMonths", "warrantyDays", "delayDays", "horizon")}
    fields = [f'   "{k}": {line(v)}' for k, v in {**head, "asOf": s["asOf"].isoformat(), **r}.items()]
    return "  {\n" + ",\n".join([*fields, '   "answers": [\n    ' + ",\n    ".join(map(line, families)) + "\n   ]"]) + "\n  }"


def main():
    header = {
        "about": "Day numbers count from 1970-01-01. Cohorts and planned: [from, to, shipped]; returned and withdrawn: [cohort, from, to, "
                 "quantity]; ahead and past: [from, to] of the periods after and before the cut-off, to which expected and planned, and fitted, "
                 "belong. Ranges are half-open; the records are invented.",
        "source": f"make-warranty.py with mpmath {mpmath.__version__}, closed forms in {mp.dps} digits, and SciPy {scipy.__version__}, Gauss "
                  "quadrature in double precision, agreeing to 1e-11 relative or 1e-12 absolute; no published table",
    }
    print("{")
    for key, value in header.items():
        print(f' "{key}": {line(value)},')
    print(' "scenarios": [')
    print(",\n".join(scenario(dict(zip(KEYS, s))) for s in SCENARIOS))
    print(" ]\n}")


main()
