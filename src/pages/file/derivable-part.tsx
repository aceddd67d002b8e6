import { useQuery } from '@tanstack/react-query'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Feed } from '../../../shared/schemas/feeds'
import type { OffingFile } from '../../../shared/schemas/files'
import type { Formula } from '../../../shared/science/optics/formulas'
import { useCan } from '../../api/auth'
import { feedsQuery } from '../../api/feeds'
import { SectionHead } from '../../components/ui/page'
import { derivableFrom } from './derivable'

/** After its bands are read: what can be worked out from them, and what already is. */
export function DerivablePart({ file }: { file: OffingFile }) {
  const feeds = useQuery(feedsQuery()).data?.items.filter((feed) => !feed.retired) ?? []
  const bands = (file.report?.variables ?? []).flatMap(({ quantity, unit, wavelengthNm }) => (quantity === 'reflectance' && unit === 'sr-1' && wavelengthNm != null ? [wavelengthNm] : []))
  const own = new Set(file.report?.feeds.map((one) => one.feedId))
  const source = feeds.find((feed) => own.has(feed.id) && feed.quantity === 'reflectance' && feed.derivedFrom === null)
  const possible = derivableFrom(bands)
  if (!source || possible.length === 0) return null
  const derived = feeds.filter((feed) => feed.derivedSources.some((id) => own.has(id)))
  return (
    <section>
      <SectionHead ruled={false} count={possible.length} aside={`from ${[...new Set(bands)].sort((a, b) => a - b).join(', ')} nm`}>
        What these bands can give
      </SectionHead>
      <ul className="text-small">
        {possible.map((versions) => (
          <FormulaLine key={versions[0]?.name} versions={versions} source={source} derived={derived} />
        ))}
      </ul>
    </section>
  )
}

function FormulaLine({ versions, source, derived }: { versions: readonly Formula[]; source: Feed; derived: readonly Feed[] }) {
  const mayDerive = useCan('feed:confirm')
  const [latest] = versions
  if (!latest) return null
  return (
    <li className="grid gap-x-6 border-b border-rule py-2 tab:grid-cols-[minmax(0,1.2fr)_minmax(0,1.6fr)_minmax(0,1.2fr)]">
      <span className="font-label">{latest.title}</span>
      <span className="text-ink2">
        Coefficients {latest.status}.{latest.caution && ` ${latest.caution}`}
      </span>
      <span className="flex flex-wrap gap-x-4">
        {versions.map(({ name, version }) => {
          const feed = derived.find((one) => one.formula === name && one.formulaVersion === version)
          if (feed) {
            return (
              <span key={version}>
                version {version}: made,{' '}
                <Link className="link" to={paths.feed.to({ id: feed.id })}>
                  {feed.name}
                </Link>
              </span>
            )
          }
          if (!mayDerive) return <span key={version}>version {version}</span>
          const query = new URLSearchParams({ formula: name, version })
          return (
            <Link key={version} className="link inline-flex min-h-11 items-center font-strong tab:min-h-0" to={`${paths.feed.to({ id: source.id })}?${query.toString()}`}>
              version {version}
              <span className="heard"> of {latest.title}: work it out</span>
            </Link>
          )
        })}
      </span>
    </li>
  )
}
