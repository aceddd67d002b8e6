import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { MaskMaking } from '../../../shared/schemas/masks'
import { useCan } from '../../api/auth'
import { isMaking } from '../../api/masks'
import { Message } from '../../components/ui/message'
import { Progress } from '../../components/ui/progress'
import { outcomeWords } from './mask-words'

/** How far the mask that was asked for has come, or what came of it. */
export function MaskMakingState({ making }: { making: MaskMaking }) {
  const maySteer = useCan('job:any')
  const outcome = outcomeWords(making)
  if (outcome) return <Message fault={outcome.fault}>{outcome.words}</Message>
  if (!isMaking(making) || !making.job) return null
  const { state, done, total } = making.job
  const steer = maySteer && (
    <Link className="link" to={paths.jobs.to()}>
      Pause or cancel it among the jobs
    </Link>
  )
  return <Progress done={done} total={total || making.layers} label={state === 'paused' ? 'Making a mask, paused' : state === 'waiting' && done === 0 ? 'A mask waits for its turn' : 'Making a mask'} unit="layers" action={steer} />
}
