"""Cell probabilities in awkward regions, printed as JSON: python3 make-cells.py > cells.json

P(cell) is the mean over u, uniform in the cohort's days [s0, s1), of G(o1 - u) - G(o0 - u), and the survivor
probability is 1 minus the mean of G(c - u), where G(t) = F(min(t, warranty) - delay) for t > delay and 0 before.

Two routes that share only F: the antiderivative of F in closed form (t F(t) less the partial mean of the
distribution), in enough digits to survive the cancellation, and adaptive quadrature over u between the kinks. The
script stops unless they agree to 1e-20. A closed form for every family needs a partial mean: those are textbook.
"""

import json
import sys

import mpmath
from mpmath import log, mp, mpf

sys.dont_write_bytecode = True
from distributions import DISTRIBUTIONS

CLOSED_DIGITS = 500
QUADRATURE_DIGITS = 45


# name, family, parameters, cohort, cut-off, cells, delay, warranty (both ages in days)
CASES = [
    ("month cohort, shape 0.3, steep at 0", "weibull", {"shape": 0.3, "scale": 5e6}, [0, 31], 366,
     [[0, 31], [31, 60], [335, 366]], 0, None),
    ("day cohort, shape 0.7, first cell begins before shipment", "weibull", {"shape": 0.7, "scale": 70000}, [100, 101], 1100,
     [[91, 121], [100, 101], [101, 102], [250, 251], [1069, 1100]], 0, None),
    ("month cohort, shape 25, from 1e-38 to the bulk", "weibull", {"shape": 25, "scale": 900}, [0, 31], 1000,
     [[0, 31], [31, 60], [335, 366], [366, 397], [851, 882], [970, 1000]], 0, None),
    ("quarter cohort, shape 25, delay 27 days", "weibull", {"shape": 25, "scale": 900}, [90, 181], 731,
     [[90, 181], [181, 273], [365, 456], [639, 731]], 27, None),
    ("month cohort, sigma 0.1, far lower tail", "lognormal", {"location": 6.5, "scale": 0.1}, [31, 60], 731,
     [[31, 60], [60, 91], [366, 397], [397, 425], [640, 670], [700, 731]], 0, None),
    ("month cohort, sigma 2", "lognormal", {"location": 12, "scale": 2}, [0, 31], 1096,
     [[0, 31], [31, 60], [1065, 1096]], 0, None),
    ("week cohort, sigma 2, delay 27 days ends within a cell", "lognormal", {"location": 11, "scale": 2}, [7, 14], 371,
     [[7, 14], [28, 35], [35, 42], [42, 49], [364, 371]], 27, None),
    ("month cohort, warranty ends within a cell", "loglogistic", {"location": 8, "scale": 0.25}, [0, 31], 1096,
     [[0, 31], [31, 60], [700, 731], [731, 762], [762, 790]], 0, 731),
    ("day cohort, steep at 0, delay 27 days", "loglogistic", {"location": 14, "scale": 1.4}, [10, 11], 400,
     [[10, 31], [36, 37], [37, 38], [38, 39], [399, 400]], 27, None),
    ("month cohort, shape 0.3, warranty ends within a cell", "gamma", {"shape": 0.3, "scale": 30000}, [59, 90], 900,
     [[59, 90], [90, 120], [424, 455], [455, 485]], 0, 365),
    ("month cohort, shape 25, far lower tail", "gamma", {"shape": 25, "scale": 60}, [0, 31], 1096,
     [[0, 31], [31, 60], [335, 366], [500, 531], [1065, 1096]], 0, None),
    ("quarter cohort, months as cells, delay 27 days and warranty within a cell", "gamma", {"shape": 2.5, "scale": 900}, [0, 91], 500,
     [[0, 31], [31, 60], [60, 91], [91, 121], [335, 366], [366, 397], [425, 456]], 27, 365),
    ("month cohort, hardly anything fails", "exponential", {"scale": 1e12}, [0, 31], 366,
     [[0, 31], [31, 60], [335, 366]], 0, None),
    ("month cohort, shape 1.35, probability near 1e-10", "weibull", {"shape": 1.35, "scale": 1e9}, [0, 31], 366,
     [[0, 31], [31, 60], [335, 366]], 0, None),
    ("month cohort, everything has failed", "weibull", {"shape": 2, "scale": 100}, [0, 31], 900,
     [[0, 31], [100, 131], [500, 531], [869, 900]], 0, None),
    ("day cohort, day cells, delay and warranty", "weibull", {"shape": 1.8, "scale": 3000}, [400, 401], 900,
     [[426, 427], [427, 428], [428, 429], [600, 601], [764, 765], [765, 766], [766, 767]], 27, 365),
]


def antiderivative(case):
    distribution = DISTRIBUTIONS[case["family"]](**case["parameters"])
    cdf, partial = distribution["cdf"], distribution["partial_mean"]
    delay, warranty = case["delay"], case["warranty"]

    def whole(t):
        return t * cdf(t) - partial(t) if t > 0 else mpf(0)

    def of(t):
        end = t if warranty is None else min(t, warranty)
        if end <= delay:
            return mpf(0)
        return whole(mpf(end - delay)) + (t - end) * cdf(mpf(end - delay))

    return of


def closed(case):
    mp.dps = CLOSED_DIGITS
    A = antiderivative(case)
    s0, s1 = case["cohort"]
    mean = lambda t: (A(t - s0) - A(t - s1)) / (s1 - s0)
    cells = [mean(o1) - mean(o0) for o0, o1 in case["cells"]]
    return cells, 1 - mean(case["cutOff"])


def quadrature(case):
    mp.dps = QUADRATURE_DIGITS
    distribution = DISTRIBUTIONS[case["family"]](**case["parameters"])
    cdf, survival = distribution["cdf"], distribution["survival"]
    delay, warranty = case["delay"], case["warranty"]
    s0, s1 = case["cohort"]
    inner = lambda t: (t if warranty is None else min(t, mpf(warranty))) - delay

    def between(a, b):  # G(b) - G(a) from the smaller of the two tails
        a, b = inner(a), inner(b)
        if b <= 0:
            return mpf(0)
        if a <= 0:
            return cdf(b)
        return cdf(b) - cdf(a) if cdf(a) < 0.5 else survival(a) - survival(b)

    def mean(f, edges):
        kinks = {o - k for o in edges for k in (delay, warranty) if k is not None}
        ends = [mpf(s0), *sorted(mpf(k) for k in kinks if s0 < k < s1), mpf(s1)]
        # quad stops at an absolute error, so the integrand is brought to a height near 1
        height = max(f(p) for a, b in zip(ends, ends[1:]) for p in graded(a, b)) or mpf(1)
        parts = [mpmath.quad(lambda u: f(u) / height, graded(a, b)) for a, b in zip(ends, ends[1:])]
        return height * sum(parts) / (s1 - s0)

    cells = [mean(lambda u: between(o0 - u, o1 - u), (o0, o1)) for o0, o1 in case["cells"]]
    c = case["cutOff"]
    alive = lambda t: mpf(1) if inner(t) <= 0 else survival(inner(t))
    return cells, mean(lambda u: alive(c - u), (c,))


def graded(a, b):
    """Points that halve their distance towards both ends, where a steep or tiny integrand has all its weight."""
    halves = [mpf(2) ** -j for j in range(1, 12)]
    return sorted({a, b} | {a + (b - a) * h for h in halves} | {b - (b - a) * h for h in halves})


def check(name, a, b):
    mp.dps = QUADRATURE_DIGITS
    if b == 0 and abs(a) < mpf(10) ** (50 - CLOSED_DIGITS):
        return  # impossible by the quadrature, rounding noise in the closed form
    if abs(a - b) > mpf(10) ** -20 * abs(b):
        sys.exit(f"the two routes disagree: {name}: {mpmath.nstr(a, 25)} and {mpmath.nstr(b, 25)}")


def answer(case):
    (cells, alive), (cells2, alive2) = closed(case), quadrature(case)
    for cell, a, b in zip(case["cells"], cells, cells2):
        check(f"{case['name']} {cell}", a, b)
    check(f"{case['name']} survivor", alive, alive2)
    mp.dps = QUADRATURE_DIGITS
    return {**case, "cellProbabilities": [float(p) for p in cells],
            "survivorProbability": float(alive), "logSurvivorProbability": float(log(alive))}


def line(value):
    return json.dumps(value, ensure_ascii=False)


KEYS = ("name", "family", "parameters", "cohort", "cutOff", "cells", "delay", "warranty")
answers = [answer(dict(zip(KEYS, case))) for case in CASES]
header = {
    "about": "Cell and survivor probabilities in awkward regions. Days are whole numbers from an arbitrary day 0; the cohort is [s0, s1), "
             "each cell [o0, o1); delay and warranty are ages in days, null is without limit.",
    "source": f"make-cells.py with mpmath {mpmath.__version__}: antiderivatives in {CLOSED_DIGITS} digits and adaptive quadrature, "
              "agreeing to 1e-20 relative; no published table",
}
print("{")
for key, value in header.items():
    print(f' "{key}": {line(value)},')
print(' "cases": [')
print(",\n".join("  {\n" + ",\n".join(f'   "{k}": {line(v)}' for k, v in a.items()) + "\n  }" for a in answers))
print(" ]\n}")
