import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Evidence } from '../../../shared/schemas/alerts'
import { useMe } from '../../api/auth'
import { dayAndTime, zoneWord } from '../../lib/dates'
import { unitWords } from '../../../shared/figure-text'
import { shortChecksum } from '../../lib/format'
import { yearsWords } from '../../lib/years-words'

/** Where each figure came from, as it was when it was judged. */
export function Sources({ evidence }: { evidence: Evidence }) {
  const zone = useMe()?.timeZone ?? 'UTC'
  const at = evidence.layerObservedAt
  return (
    <dl className="grid content-start text-small [&>div]:grid [&>div]:grid-cols-[6.5rem_minmax(0,1fr)] [&>div]:gap-x-3 [&>div]:border-b [&>div]:border-rule [&>div]:py-2 [&_dt]:text-ink2">
      <div>
        <dt>Rule</dt>
        <dd>
          {ruleWords(evidence)} <span className="font-strong">Version {evidence.ruleVersion}</span>
        </dd>
      </div>
      <div>
        <dt>Layer</dt>
        <dd className="fig">
          {dayAndTime(at, zone)} {zoneWord(at, zone)}, processing {evidence.processingVersion}
        </dd>
      </div>
      <div>
        <dt>File</dt>
        <dd className="[overflow-wrap:anywhere]">
          <Link className="link" to={paths.file.to({ id: evidence.fileId })}>
            {evidence.fileName}
          </Link>{' '}
          <span className="fig" title={`sha256 ${evidence.checksum}`}>
            {shortChecksum(evidence.checksum)}
          </span>
        </dd>
      </div>
      {evidence.formula && (
        <div>
          <dt>Formula</dt>
          <dd>{evidence.formula}</dd>
        </div>
      )}
      <div>
        <dt>Baseline</dt>
        <dd className="fig">{evidence.baselineVersion === null ? 'none' : `version ${evidence.baselineVersion}, ${yearsWords(evidence.baselineYears)}`}</dd>
      </div>
      <div>
        <dt>Water</dt>
        <dd>
          {evidence.waterMask}, outline version {evidence.geometryVersion}, <span className="fig">{evidence.cells}</span> cells
        </dd>
      </div>
      <div>
        <dt>Software</dt>
        <dd className="fig">{evidence.softwareVersion}</dd>
      </div>
    </dl>
  )
}

/** The rule's sentence with its unit written as people write it. */
function ruleWords({ ruleText, unit }: Evidence): string {
  return unit ? ruleText.replaceAll(unit, unitWords(unit)) : ruleText
}
