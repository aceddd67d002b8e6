import type { ReactNode } from 'react'
import type { Feed } from '../../../shared/schemas/feeds'
import { formulaOf } from '../../../shared/science/optics/formulas'
import { Fact, Facts } from '../../components/ui/facts'
import { SectionHead } from '../../components/ui/page'
import { dayWithYear } from '../../lib/dates'
import { unitWords } from '../../../shared/figure-text'
import { grouped } from '../../lib/format'

/** How the files of this feed are read and what it holds. */
export function FeedFacts({ feed }: { feed: Feed }) {
  const facts: [string, ReactNode][] = [
    ['Quantity', feed.quantity],
    ['Variable', <span className="fig">{feed.variable}</span>],
    ['Unit', unitWords(feed.unit) || 'none'],
    ['Scale', feed.scale === 'log10' ? 'log10: merged and averaged in log space' : 'linear'],
    ['Cadence', feed.cadence],
    ['Stage', feed.stage],
    ['Processing version', <span className="fig">{feed.processingVersion}</span>],
    ['Valid range', rangeWords(feed)],
    ['Hidden cells', feed.hiddenFlags.length > 0 ? <span className="fig break-words">{feed.hiddenFlags.join(', ')}</span> : 'none by flags'],
    ['File names', <span className="fig break-all">{feed.fileNamePattern ?? 'any'}</span>],
    ['Told at once', `views up to ${feed.freshnessLimitHours} h old`],
    ['Silent after', `${feed.silentAfterHours} h without a layer`],
    ['Layers', <span className="fig">{grouped(feed.layers)}</span>],
  ]
  if (feed.oldestLayerAt) facts.push(['Since', <span className="fig">{dayWithYear(feed.oldestLayerAt)}</span>])
  if (feed.gapFilled) facts.push(['Gap-filled', 'raises no alert: its files do not say which cells were seen'])
  if (feed.storedLog10) facts.push(['Numbers', 'base-10 logarithms, where the file does not say'])
  if (feed.fileUnit !== null) facts.push(['Unit of files', unitWords(feed.fileUnit)])
  if (feed.formula !== null) {
    const formula = formulaOf(feed.formula, feed.formulaVersion ?? '')
    facts.push(['Worked out by', `${formula?.title ?? feed.formula}, version ${feed.formulaVersion ?? '1'}`])
    if (formula) facts.push(['From bands', <span className="fig">{[...new Set(formula.bands.map((band) => band.nm[0]))].join(', ')} nm</span>])
    if (formula) facts.push(['Coefficients', formula.status])
    if (formula?.caution) facts.push(['Mind', formula.caution])
  }
  return (
    <section>
      <SectionHead>How it is read</SectionHead>
      <Facts>
        {facts.map(([name, value]) => (
          <Fact key={name} name={name}>
            {value}
          </Fact>
        ))}
      </Facts>
    </section>
  )
}

function rangeWords({ validMin, validMax }: Feed): string {
  if (validMin === null && validMax === null) return 'nothing dropped'
  if (validMin === null) return `up to ${validMax}`
  return validMax === null ? `from ${validMin}` : `${validMin} to ${validMax}`
}
