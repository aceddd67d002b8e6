import type { Statistic } from './series-days'

const words: Record<Statistic, string> = {
  median: 'median',
  geometricMean: 'geometric mean',
  mean: 'mean',
  p90: '90th percentile',
}

/** What one figure a view is, as people say it. */
export function statisticWords(statistic: Statistic): string {
  return words[statistic]
}

export const statistics = Object.keys(words) as Statistic[]
