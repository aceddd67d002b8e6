import type { OffingFile } from '../../../shared/schemas/files'
import { countAtHead, countWords } from '../../lib/format'

/** What became of the file, as one sentence. */
export function fileSentence(file: OffingFile): { statement: string; detail: string | undefined } {
  switch (file.status) {
    case 'received':
      return { statement: 'This file waits to be read.', detail: 'It is kept; you can leave this page.' }
    case 'processing':
      return { statement: 'This file is being read.', detail: 'You can leave this page.' }
    case 'processed':
      return { statement: `${countAtHead(file.layers.length)} ${file.layers.length === 1 ? 'layer' : 'layers'} read from this file.`, detail: figuresDetail(file) }
    case 'waiting':
      return { statement: file.proposal ? 'This file fits no feed yet.' : 'This file waits.', detail: file.proposal ? readAs(file) : (file.waitingFor ?? undefined) }
    case 'refused':
      return { statement: 'This file was refused.', detail: undefined }
  }
}

/** What the file was taken for, until a person agrees. */
function readAs({ proposal, others, report, waitingFor }: OffingFile): string | undefined {
  const variable = report?.variables.find((one) => one.name === proposal?.variable)
  if (!proposal || !variable) return waitingFor ?? undefined
  const bands = proposal.quantity === 'reflectance' && others.length > 0 ? `${others.length + 1} bands of ` : ''
  const what = proposal.quantity === 'other' ? variable.name : `${bands}${proposal.quantity}`
  return `Understood as ${what}, ${countWords(variable.times.count, 'time step')}. No layer is made before a feed is confirmed.`
}

function figuresDetail({ layers, summaries }: OffingFile): string {
  if (layers.length > 0 && layers.every((layer) => layer.replaced)) return 'It gives no figures any more.'
  const regions = new Set(summaries.map((summary) => summary.regionId)).size
  return regions === 0 ? 'It meets no region.' : `It gave figures for ${countWords(regions, 'region')}.`
}
