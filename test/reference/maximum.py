"""The maximum of a log likelihood and the standard errors there, for two parameters or one."""

import sys

import mpmath
from mpmath import exp, mpf
from scipy import optimize

NAMES = {
    "exponential": ["scale"],
    "weibull": ["shape", "scale"],
    "lognormal": ["location", "scale"],
    "loglogistic": ["location", "scale"],
    "gamma": ["shape", "scale"],
}


def natural(family, theta):
    """Positive parameters are searched as logarithms."""
    return {n: x if n == "location" else exp(x) for n, x in zip(NAMES[family], theta)}


def gradient_and_hessian(f, theta):
    n = len(theta)
    order = lambda i, j: tuple((k == i) + (k == j) for k in range(n))
    g = [mpmath.diff(f, theta, tuple(int(k == i) for k in range(n))) for i in range(n)]
    h = [[mpmath.diff(f, theta, order(i, j)) for j in range(n)] for i in range(n)]
    return mpmath.matrix(g), mpmath.matrix(h)


def maximise(f, starts):
    """f of mpf arguments; the best simplex end, then Newton until the step is below 1e-18."""
    rough = lambda x: float(-f(*map(mpf, x)))
    ends = [optimize.minimize(rough, s, method="Nelder-Mead", options={"xatol": 1e-4, "fatol": 1e-6}) for s in starts]
    theta = mpmath.matrix(min(ends, key=lambda e: e.fun).x.tolist())
    for _ in range(30):
        g, h = gradient_and_hessian(f, tuple(theta))
        step = mpmath.lu_solve(h, g)
        theta -= step
        if mpmath.norm(step) < mpf(10) ** -18:
            return tuple(theta), h
    sys.exit("the Newton iteration does not converge")


def answer(family, f, starts):
    theta, h = maximise(f, starts)
    covariance = (-h) ** -1
    parameters = natural(family, theta)
    slope = lambda n: 1 if n == "location" else parameters[n]
    errors = {n: slope(n) * mpmath.sqrt(covariance[i, i]) for i, n in enumerate(NAMES[family])}
    return theta, {
        "parameters": {n: float(x) for n, x in parameters.items()},
        "standardErrors": {n: float(x) for n, x in errors.items()},
        "logLikelihood": float(f(*theta)),
    }


def starts_for(family, typical):
    """Simplex starts around a typical age."""
    y = float(mpmath.log(typical))
    return {
        "exponential": [[y]],
        "weibull": [[0.0, y], [0.0, y + 3]],
        "gamma": [[0.0, y], [0.0, y + 3]],
        "lognormal": [[y, 0.0], [y + 3, 0.7]],
        "loglogistic": [[y, 0.0], [y + 3, 0.0]],
    }[family]
