import { z } from 'zod'
import { cadences, stages, usualSilence, type FeedProposal } from '../../../shared/schemas/feeds'
import { rangeEnd, rangeTurned } from '../../lib/valid-range'

/** The points of a proposal that only a person can tell, as typed. */
export const answers = z
  .object({
    name: z.string().trim().min(1, 'The feed needs a name.').max(100, 'At most 100 characters.'),
    stage: z.enum(stages),
    cadence: z.enum(cadences),
    processingVersion: z.string().trim().min(1, 'Say the version; 1 if there is none.').max(50, 'At most 50 characters.'),
    unit: z.string().trim().max(50, 'At most 50 characters.'),
    fileNamePattern: z.string().trim().max(200, 'At most 200 characters.'),
    hiddenFlags: z.array(z.string()),
    validMin: rangeEnd,
    validMax: rangeEnd,
    storedLog10: z.boolean(),
    fileUnit: z.string().trim().max(50, 'At most 50 characters.'),
    /** Whether the first proposal is taken; always so where it stands alone. */
    taken: z.boolean(),
    others: z.array(z.object({ taken: z.boolean(), name: z.string().trim().max(100, 'At most 100 characters.') })),
  })
  .superRefine(({ taken, others, ...range }, context) => {
    if (rangeTurned(range)) context.addIssue({ code: 'custom', path: ['validMin'], message: 'The valid range ends before it begins.' })
    others.forEach((other, i) => {
      if (other.taken && other.name === '') context.addIssue({ code: 'custom', path: ['others', i, 'name'], message: 'The feed needs a name.' })
    })
    if (!taken && !others.some((other) => other.taken)) context.addIssue({ code: 'custom', path: ['taken'], message: 'Tick at least one feed.' })
  })
export type Answers = z.infer<typeof answers>

/** The bands of one file belong together and start ticked; what else a file holds is for the person to add. */
export function answersOf(proposal: FeedProposal, others: readonly FeedProposal[] = []): Answers {
  const { name, stage, cadence, processingVersion, unit, fileNamePattern, hiddenFlags, fileUnit, validMin, validMax, storedLog10 } = proposal
  return {
    name, stage, cadence, processingVersion, validMin, validMax, storedLog10, unit: unit ?? '', fileNamePattern: fileNamePattern ?? '', hiddenFlags, fileUnit: fileUnit ?? '', taken: true,
    others: others.map((other) => ({ taken: proposal.quantity === 'reflectance' && other.quantity === 'reflectance', name: other.name })),
  }
}

/** The feeds to make: the first with all answers, each other one with those that hold for the whole file. */
export function feedsOf(proposal: FeedProposal, others: readonly FeedProposal[], given: Answers): FeedProposal[] {
  const { name, stage, cadence, processingVersion, hiddenFlags, validMin, validMax, storedLog10 } = given
  const silence = cadence === proposal.cadence ? {} : { silentAfterHours: usualSilence[cadence] }
  const shared = { stage, cadence, ...silence, processingVersion, fileNamePattern: given.fileNamePattern || null, fileUnit: given.fileUnit || null }
  const first = given.taken ? [{ ...proposal, ...shared, name, hiddenFlags, validMin, validMax, storedLog10, unit: given.unit || null }] : []
  const more = others.flatMap((other, i) => {
    const answer = given.others[i]
    return answer?.taken ? [{ ...other, ...shared, name: answer.name, hiddenFlags: hiddenFlags.filter((flag) => other.flagMeanings.includes(flag)) }] : []
  })
  return [...first, ...more]
}
