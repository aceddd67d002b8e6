import { useQuery } from '@tanstack/react-query'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { OffingFile } from '../../../shared/schemas/files'
import { useCan } from '../../api/auth'
import { feedsQuery } from '../../api/feeds'
import { SectionHead } from '../../components/ui/page'
import { derivableFrom } from './derivable'

/** After its bands are read: what can be worked out from them, and what already is. */
export function DerivablePart({ file }: { file: OffingFile }) {
  const mayDerive = useCan('feed:confirm')
  const feeds = useQuery(feedsQuery()).data?.items ?? []
  const bands = (file.report?.variables ?? []).flatMap(({ quantity, unit, wavelengthNm }) => (quantity === 'reflectance' && unit === 'sr-1' && wavelengthNm != null ? [wavelengthNm] : []))
  const own = new Set(file.report?.feeds.map((one) => one.feedId))
  const source = feeds.find((feed) => own.has(feed.id) && feed.quantity === 'reflectance' && feed.derivedFrom === null && !feed.retired)
  const possible = derivableFrom(bands)
  if (!source || possible.length === 0) return null
  const made = (name: string, version: string) => feeds.find((feed) => !feed.retired && feed.derivedSources.some((id) => own.has(id)) && feed.formula === name && feed.formulaVersion === version)
  return (
    <section>
      <SectionHead ruled={false} count={possible.length} aside={`from ${[...new Set(bands)].sort((a, b) => a - b).join(', ')} nm`}>
        What these bands can give
      </SectionHead>
      <ul className="text-small">
        {possible.map(({ name, version, title, status, caution }) => {
          const feed = made(name, version)
          return (
            <li key={`${name} ${version}`} className="grid gap-x-6 border-b border-rule py-2 tab:grid-cols-[minmax(0,1.4fr)_minmax(0,2fr)_auto]">
              <span className="font-label">
                {title}, version {version}
              </span>
              <span className="text-ink2">
                Coefficients {status}.{caution && ` ${caution}`}
              </span>
              {feed ? (
                <span>
                  made:{' '}
                  <Link className="link" to={paths.feed.to({ id: feed.id })}>
                    {feed.name}
                  </Link>
                </span>
              ) : (
                mayDerive && (
                  <Link className="link font-strong" to={`${paths.feed.to({ id: source.id })}?formula=${encodeURIComponent(name)}&version=${encodeURIComponent(version)}`}>
                    Work it out…
                  </Link>
                )
              )}
            </li>
          )
        })}
      </ul>
    </section>
  )
}
