"""Counts by numpy.histogram of values anybody can make again, for tests/server/grids/first-step.test.ts."""
import numpy as np

i = np.arange(1000)
values = 10 ** (1.5 * np.sin(i))
edges = np.arange(-60, 61) / 20
counts, _ = np.histogram(np.log10(values), bins=edges)
used = np.nonzero(counts)[0]
print('numpy', np.__version__)
print('log10: first bin', int(round(edges[used[0]] * 20)), counts[used[0]:used[-1] + 1].tolist())
print('p10, median, p90 (inverted_cdf):', np.quantile(values, [0.1, 0.5, 0.9], method='inverted_cdf').tolist())
linear = 3 * np.sin(i) + 0.5
counts, _ = np.histogram(linear, bins=np.arange(-25, 36) / 10)
print('linear, steps of 0.1 from -2.5:', counts.tolist())
