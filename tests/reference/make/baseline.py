"""What is usual by date, written with calendar dates and numpy only.

    python3 baseline.py > ../values/baseline.json
"""
import json
import sys
from datetime import date, timedelta

import numpy as np

SEED = 366
SHARES = {'p10': 0.1, 'p25': 0.25, 'p50': 0.5, 'p75': 0.75, 'p90': 0.9, 'p95': 0.95}
FIRST, LAST = date(2010, 11, 1), date(2017, 2, 20)


def series():
    """Autocorrelated lognormal scatter on a season, with cloud gaps that last, and no February at all before 2016."""
    random = np.random.default_rng(SEED)
    values, scatter, cloudy = {}, 0.0, False
    day = FIRST
    while day <= LAST:
        scatter = 0.8 * scatter + random.normal(0, 0.12)
        cloudy = random.random() < (0.8 if cloudy else 0.25)
        season = 0.2 + 0.5 * np.exp(-(((day.timetuple().tm_yday - 120) / 30) ** 2))
        if not cloudy and not (day.month == 2 and day.year < 2016):
            values[day] = round(float(10 ** (season - 0.3 + scatter)), 4)
        day += timedelta(1)
    return values


def figures(values, month, dom, from_year, to_year, half):
    pool, years = [], 0
    for year in range(from_year, to_year + 1):
        centre = date(year, month, dom)
        window = [centre + timedelta(k) for k in range(-half, half + 1)]
        found = [values[d] for d in window if d in values and from_year <= d.year <= to_year]
        pool += found
        years += bool(found)
    row = {name: (float(np.quantile(pool, p)) if pool else None) for name, p in SHARES.items()}
    logs = np.log10([v for v in pool if v > 0])
    row['meanLog10'] = float(logs.mean()) if len(logs) else None
    row['sdLog10'] = float(logs.std(ddof=1)) if len(logs) > 1 else None
    return {**row, 'n': len(pool), 'years': years}


def baseline(values, from_year, to_year, half, smoothing):
    rows = []
    day = date(2000, 1, 1)
    while day.year == 2000:
        leap = (day.month, day.day) == (2, 29)
        rows.append(None if leap else figures(values, day.month, day.day, from_year, to_year, half))
        day += timedelta(1)
    before, after = rows[58], rows[60]
    rows[59] = {
        key: None if before[key] is None or after[key] is None else (before[key] + after[key]) / 2 for key in before
    }
    rows[59]['n'] = min(before['n'], after['n'])
    rows[59]['years'] = min(before['years'], after['years'])
    columns = {key: [row[key] for row in rows] for key in rows[0]}
    for key in columns:
        if smoothing == 1 or key in ('n', 'years'):
            continue
        column = np.array([np.nan if v is None else v for v in columns[key]])
        around = np.stack([np.roll(column, k) for k in range(-(smoothing // 2), smoothing // 2 + 1)])
        means = np.nanmean(around, axis=0)
        columns[key] = [None if np.isnan(v) else float(m) for v, m in zip(column, means)]
    return {key: [v if v is None or isinstance(v, int) else round(v, 12) for v in column] for key, column in columns.items()}


def main():
    values = series()
    epoch = date(1970, 1, 1)
    cases = []
    for from_year, to_year, half, smoothing, keys in (
        (2011, 2016, 5, 1, None),
        (2010, 2017, 5, 31, ('p50', 'p90', 'meanLog10', 'n', 'years')),
        (2012, 2013, 2, 1, ('p90', 'sdLog10', 'n', 'years')),
    ):
        columns = baseline(values, from_year, to_year, half, smoothing)
        cases.append(
            {
                'fromYear': from_year,
                'toYear': to_year,
                'halfWidthDays': half,
                'smoothingDays': smoothing,
                'columns': {key: columns[key] for key in keys or columns},
            }
        )
    json.dump(
        {
            'status': 'computed',
            'source': 'make/baseline.py: numpy %s, python %s, seed %d' % (np.__version__, sys.version.split()[0], SEED),
            'days': [(d - epoch).days for d in values],
            'values': list(values.values()),
            'cases': cases,
        },
        sys.stdout,
        separators=(',', ':'),
    )


main()
