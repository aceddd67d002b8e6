import { useQuery } from '@tanstack/react-query'
import type { Feed } from '../../../shared/schemas/feeds'
import type { MaskChange, WaterMaskShown } from '../../../shared/schemas/masks'
import { sentenceOf } from '../../api/api-error'
import { maskChangeQuery, usePutInForce } from '../../api/masks'
import { Button } from '../../components/ui/button'
import { Dialog } from '../../components/ui/dialog'
import { Failure } from '../../components/ui/failure'
import { Message } from '../../components/ui/message'
import { Waiting } from '../../components/ui/waiting'
import { countWords, threeDigits } from '../../lib/format'
import { maskName } from './mask-words'

interface Props {
  feed: Pick<Feed, 'id' | 'name'>
  mask: WaterMaskShown
  inForce: WaterMaskShown
  onDone: () => void
}

/** Says what a mask will change before it does, and that it can be taken back. */
export function PutInForce({ feed, mask, inForce, onDone }: Props) {
  const change = useQuery({ ...maskChangeQuery(mask.id), staleTime: 0 })
  const force = usePutInForce(feed.id)
  const act = (insteadOf: number) => force.mutate({ id: mask.id, insteadOf }, { onSuccess: onDone })
  return (
    <Dialog open onOpenChange={(open) => !open && onDone()} title={`Put ${mask.kind}, version ${mask.version} in force`} about={`For ${feed.name}, instead of ${inForce.kind}, version ${inForce.version}.`}>
      <div className="grid gap-4">
        {change.isPending && <Waiting lines={4} />}
        {change.error && <Failure error={change.error} onRetry={() => void change.refetch()} />}
        {change.data && <WhatHappens change={change.data} inForce={inForce} />}
        {force.error && <Message fault>{sentenceOf(force.error)}</Message>}
        <div className="flex justify-end gap-3">
          <Button onClick={onDone}>Leave it</Button>
          <Button kind="filled" disabled={!change.data || force.isPending} onClick={() => change.data && act(change.data.insteadOf)}>
            Put it in force
          </Button>
        </div>
      </div>
    </Dialog>
  )
}

function WhatHappens({ change, inForce }: { change: MaskChange; inForce: WaterMaskShown }) {
  const { regions, regionsInAll, views, runningEvents, openAlerts, freshnessLimitHours } = change
  const resting = [...(runningEvents > 0 ? [countWords(runningEvents, 'running event')] : []), ...(openAlerts > 0 ? [countWords(openAlerts, 'open alert')] : [])]
  return (
    <div className="grid gap-3">
      <p>
        {countWords(views, 'view')} of {countWords(regionsInAll, 'region')} {views === 1 ? 'is' : 'are'} made anew, newest first, and every region is judged again.{' '}
        {resting.length > 0 ? `${resting.join(' and ')} of this feed may change, end or go.` : 'No event is running and no alert is open.'}
      </p>
      <p>Views older than {freshnessLimitHours} h raise no letters.</p>
      {regions.length === 0 ? (
        <p>No region has other water by it than now.</p>
      ) : (
        <div>
          <p>{countWords(regions.length, 'region has', 'regions have')} other water by it:</p>
          <ul aria-label="Water of regions, now and then" tabIndex={0} className="mt-1 max-h-56 overflow-y-auto border-t border-rule text-small">
            {regions.map((region) => (
              <li key={region.id} className="flex flex-wrap justify-between gap-x-4 border-b border-rule py-1.5">
                <span>
                  {region.name}
                  {region.allThen && <span className="block text-fine text-ink2">no water by it: every cell counts</span>}
                </span>
                <span className="fig">
                  {threeDigits(region.waterKm2Now)} → {threeDigits(region.waterKm2Then)} km²
                </span>
              </li>
            ))}
          </ul>
        </div>
      )}
      <p className="text-ink2">{maskName(inForce)} stays and can be put in force again.</p>
    </div>
  )
}
