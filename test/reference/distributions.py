"""The five distributions of the reference numbers in mpmath: distribution function, survival function, density and
partial mean (the integral of t f(t) from 0), each at the working precision. Textbook formulas."""

from mpmath import betainc, erfc, exp, expm1, gamma, gammainc, log, mpf, pi, sqrt


def exponential(scale):
    return weibull(1, scale)


def weibull(shape, scale):
    k, s = mpf(shape), mpf(scale)
    return {
        "cdf": lambda t: -expm1(-((t / s) ** k)),
        "survival": lambda t: exp(-((t / s) ** k)),
        "log_density": lambda t: log(k / s) + (k - 1) * log(t / s) - (t / s) ** k,
        "partial_mean": lambda t: s * gammainc(1 + 1 / k, 0, (t / s) ** k),
    }


def lognormal(location, scale):
    m, s = mpf(location), mpf(scale)
    phi = lambda z: erfc(-z / sqrt(2)) / 2
    return {
        "cdf": lambda t: phi((log(t) - m) / s),
        "survival": lambda t: phi(-(log(t) - m) / s),
        "log_density": lambda t: -(((log(t) - m) / s) ** 2) / 2 - log(t * s * sqrt(2 * pi)),
        "partial_mean": lambda t: exp(m + s * s / 2) * phi((log(t) - m) / s - s),
    }


def loglogistic(location, scale):
    m, s = mpf(location), mpf(scale)
    cdf = lambda t: 1 / (1 + exp(-(log(t) - m) / s))
    survival = lambda t: 1 / (1 + exp((log(t) - m) / s))
    return {
        "cdf": cdf,
        "survival": survival,
        "log_density": lambda t: log(cdf(t)) + log(survival(t)) - log(s * t),
        "partial_mean": lambda t: exp(m) * betainc(1 + s, 1 - s, 0, cdf(t)),
    }


def gamma_distribution(shape, scale):
    k, s = mpf(shape), mpf(scale)
    return {
        "cdf": lambda t: gammainc(k, 0, t / s, regularized=True),
        "survival": lambda t: gammainc(k, t / s, regularized=True),
        "log_density": lambda t: (k - 1) * log(t / s) - t / s - log(s * gamma(k)),
        "partial_mean": lambda t: s * gammainc(k + 1, 0, t / s) / gamma(k),
    }


DISTRIBUTIONS = {
    "exponential": exponential,
    "weibull": weibull,
    "lognormal": lognormal,
    "loglogistic": loglogistic,
    "gamma": gamma_distribution,
}
