"""The nine sample quantiles by numpy, and weighted inverse distribution in exact fractions.

    python3 quantiles.py > ../values/quantiles.json
"""
import json
import sys
from fractions import Fraction

import numpy as np

SEED = 1996
random = np.random.default_rng(SEED)
METHODS = [
    'inverted_cdf',
    'averaged_inverted_cdf',
    'closest_observation',
    'interpolated_inverted_cdf',
    'hazen',
    'weibull',
    'linear',
    'median_unbiased',
    'normal_unbiased',
]
SHARES = [0, 0.05, 0.1, 0.25, 0.37, 0.5, 0.75, 0.9, 0.95, 1]


def plain(values):
    rows = {str(i + 1): np.quantile(values, SHARES, method=method).tolist() for i, method in enumerate(METHODS)}
    # At a tie type 3 takes the even neighbour; this numpy takes the odd one, so ties are left to the published table.
    for i, p in enumerate(SHARES):
        if p not in (0, 1) and (len(values) * Fraction(str(p)) - Fraction(1, 2)).denominator == 1:
            rows['3'][i] = None
    return {'values': values.tolist(), 'types': rows}


def weighted(values, weights):
    """Every value is tried: the smallest whose own weight and that of all smaller ones reaches the share."""
    pairs = [(Fraction(v), Fraction(w)) for v, w in zip(values, weights) if not np.isnan(v)]
    total = sum(w for _, w in pairs)
    answers = []
    for p in SHARES:
        enough = [v for v, _ in pairs if sum(w for u, w in pairs if u <= v) >= Fraction(p) * total]
        answers.append(float(min(enough)))
    return {'values': [None if np.isnan(v) else float(v) for v in values], 'weights': [float(w) for w in weights], 'answers': answers}


def main():
    lists = [random.lognormal(0, 1, n).round(6) for n in (1, 2, 5, 11, 50, 118)]
    lists.append(np.array([3.0, 3, 3, 1, 1, 7, 7, 7, 7, 2]))
    pairs = []
    for n in (1, 4, 37, 150):
        values = random.lognormal(0, 0.8, n).round(5)
        values[random.random(n) < 0.2] = np.nan
        if np.isnan(values).all():
            values[0] = 1.5
        pairs.append((values, random.uniform(0.01, 16, n).round(6)))
    pairs.append((np.array([5.0, 5, 1, 1, 9, 9, 9, -2, 0]), np.array([1.0, 2, 3, 1, 4, 1, 1, 2, 1])))
    json.dump(
        {
            'status': 'computed',
            'source': 'make/quantiles.py: numpy %s, python %s, seed %d' % (np.__version__, sys.version.split()[0], SEED),
            'shares': SHARES,
            'plain': [plain(np.asarray(values)) for values in lists],
            'weighted': [weighted(values, weights) for values, weights in pairs],
        },
        sys.stdout,
        separators=(',', ':'),
    )


main()
