import { z } from 'zod'
import { stages, type FeedProposal } from '../../../shared/schemas/feeds'

/** The points of a proposal that only a person can tell, as typed. */
export const answers = z.object({
  name: z.string().trim().min(1, 'The feed needs a name.').max(100, 'At most 100 characters.'),
  stage: z.enum(stages),
  processingVersion: z.string().trim().min(1, 'Say the version; 1 if there is none.').max(50, 'At most 50 characters.'),
  unit: z.string().trim().max(50, 'At most 50 characters.'),
  fileNamePattern: z.string().trim().max(200, 'At most 200 characters.'),
  hiddenFlags: z.array(z.string()),
  fileUnit: z.string().trim().max(50, 'At most 50 characters.'),
})
export type Answers = z.infer<typeof answers>

export function answersOf({ name, stage, processingVersion, unit, fileNamePattern, hiddenFlags, fileUnit }: FeedProposal): Answers {
  return { name, stage, processingVersion, unit: unit ?? '', fileNamePattern: fileNamePattern ?? '', hiddenFlags, fileUnit: fileUnit ?? '' }
}

export function feedOf(proposal: FeedProposal, given: Answers): FeedProposal {
  return { ...proposal, ...given, unit: given.unit || null, fileNamePattern: given.fileNamePattern || null, fileUnit: given.fileUnit || null }
}
