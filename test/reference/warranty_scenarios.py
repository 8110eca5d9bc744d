"""The scenarios of make-warranty.py: their records, written by hand and invented, and the days they fall on."""

from datetime import date, timedelta

EPOCH = date(1970, 1, 1)

# name, period, as-of date, warranty in months and in days, delay, horizon, cohorts (first day; kind of cohort; shipped;
# returned and withdrawn by offset from the cohort's own period), planned (first day, shipped), parameters by family
SCENARIOS = [
    ("month cohorts, 12 months of warranty, delay 25 days", "month", date(2025, 10, 17), 12, None, 25, 6, "month", [
        (date(2024, 2, 1), 150, {2: 3, 5: 4, 8: 6, 11: 7, 12: 5}, {4: 6, 14: 9}),
        (date(2024, 5, 1), 120, {1: 1, 4: 3, 7: 4, 10: 5, 12: 3}, {12: 8}),
        (date(2024, 9, 1), 180, {3: 4, 6: 5, 9: 8, 12: 5}, {5: 7}),
        (date(2024, 11, 1), 160, {2: 2, 5: 4, 8: 6, 11: 3}, {11: 4}),
        (date(2025, 3, 1), 140, {1: 1, 4: 4, 6: 4}, {3: 5}),
        (date(2025, 7, 1), 200, {1: 1, 2: 2, 3: 2}, {}),
        (date(2025, 10, 1), 90, {}, {}),
    ], [(date(2025, 10, 18), 60), (date(2025, 11, 1), 130), (date(2026, 1, 1), 110)],
     {"weibull": {"shape": 1.4, "scale": 900}, "lognormal": {"location": 7.2, "scale": 1.1}}),
    ("week cohorts, 100 days of warranty", "week", date(2025, 9, 10), None, 100, 0, 8, "week", [
        (date(2025, 1, 6), 90, {3: 2, 9: 3, 14: 4, 15: 1}, {6: 4, 20: 3}),
        (date(2025, 3, 3), 110, {0: 1, 5: 3, 12: 3, 14: 2}, {14: 5}),
        (date(2025, 5, 5), 100, {2: 2, 8: 3, 13: 2, 15: 1}, {}),
        (date(2025, 6, 30), 130, {1: 1, 4: 3, 9: 4, 10: 1}, {7: 6}),
        (date(2025, 8, 25), 80, {1: 2}, {}),
        (date(2025, 9, 8), 40, {}, {}),
    ], [(date(2025, 9, 15), 70)],
     {"weibull": {"shape": 0.8, "scale": 1500}, "lognormal": {"location": 7, "scale": 1.8}}),
    ("day cohorts, one month of warranty of 28 to 31 days", "month", date(2025, 3, 12), 1, None, 0, 2, "day", [
        (date(2025, 1, 29), 60, {0: 1, 4: 2, 11: 2, 29: 3, 30: 1}, {8: 3, 35: 4}),
        (date(2025, 1, 31), 75, {1: 2, 15: 3, 27: 2, 28: 1}, {20: 5}),
        (date(2025, 2, 14), 50, {2: 1, 9: 2, 20: 2}, {}),
        (date(2025, 2, 28), 80, {0: 1, 3: 2, 10: 3}, {5: 4}),
        (date(2025, 3, 5), 65, {1: 1, 6: 2}, {}),
    ], [(date(2025, 3, 13), 40), (date(2025, 4, 1), 90)],
     {"weibull": {"shape": 0.7, "scale": 400}, "lognormal": {"location": 6, "scale": 2}}),
]
KEYS = ("name", "period", "asOf", "warrantyMonths", "warrantyDays", "delayDays", "horizon", "kind", "rows", "plan", "families")


def day(d):
    return (d - EPOCH).days


def month_later(d, months):
    index = d.year * 12 + d.month - 1 + months
    first = date(index // 12, index % 12 + 1, 1)
    after = date((index + 1) // 12, (index + 1) % 12 + 1, 1)
    return first.replace(day=min(d.day, (after - first).days))


def period_of(d, kind):
    if kind == "month":
        return d.replace(day=1), month_later(d.replace(day=1), 1)
    length = 7 if kind == "week" else 1
    first = d - timedelta(d.weekday()) if kind == "week" else d
    return first, first + timedelta(length)


def moved(d, kind, offset):
    return month_later(d, offset) if kind == "month" else d + timedelta(offset * (7 if kind == "week" else 1))


def periods_from(first, kind, enough):
    periods = []
    while not enough(periods):
        period = period_of(first, kind)
        periods.append((day(period[0]), day(period[1])))
        first = period[1]
    return periods


def limit_of(s, first):
    """Age in days at which warranty ends for a cohort that begins on day `first`."""
    months = s["warrantyMonths"]
    return s["warrantyDays"] if months is None else day(month_later(EPOCH + timedelta(first), months)) - first


def records_of(s):
    """The scenario in day numbers: cohorts and exits are cut at the cut-off."""
    c, kind = day(s["asOf"]) + 1, s["kind"]

    def cut(d, kind):
        a, b = period_of(d, kind)
        return [day(d), min(day(b), c)] if day(d) < c else [day(d), day(b)]

    def exits(column):
        return [[i, *cut(moved(row[0], kind, offset), kind), q]
                for i, row in enumerate(s["rows"]) for offset, q in sorted(row[column].items())]

    ahead = periods_from(s["asOf"] + timedelta(1), s["period"], lambda found: len(found) > s["horizon"])
    past = periods_from(s["rows"][0][0], s["period"], lambda found: found and found[-1][1] >= c)
    return {
        "cohorts": [[*cut(row[0], kind), row[1]] for row in s["rows"]],
        "returned": exits(2), "withdrawn": exits(3),
        "planned": [[*cut(d, s["period"]), q] for d, q in s["plan"]],
        "ahead": [[max(a, c), b] for a, b in ahead], "past": [[a, min(b, c)] for a, b in past],
    }
