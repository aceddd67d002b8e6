import { statistics, statisticWords } from '../../components/charts/statistic-words'

export function statisticName(statistic: string): string {
  const known = statistics.find((name) => name === statistic)
  return known ? statisticWords(known) : statistic
}
