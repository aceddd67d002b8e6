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
      return { statement: file.proposal ? 'This file fits no feed yet.' : 'This file waits.', detail: file.waitingFor ?? undefined }
    case 'refused':
      return { statement: 'This file was refused.', detail: undefined }
  }
}

function figuresDetail({ summaries }: OffingFile): string {
  const regions = new Set(summaries.map((summary) => summary.regionId)).size
  return regions === 0 ? 'It meets no region.' : `It gave figures for ${countWords(regions, 'region')}.`
}
