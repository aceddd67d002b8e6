import { useInfiniteQuery } from '@tanstack/react-query'
import { filesQuery } from '../../api/files'
import { countAtHead, countWords } from '../../lib/format'

/** What the newest files ask for, if anything. */
export function useFileSentence(): { statement: string; detail: string } {
  const files = useInfiniteQuery(filesQuery()).data?.pages[0]?.items ?? []
  const count = (status: string) => files.filter((file) => file.status === status).length
  const waiting = count('waiting')
  const refused = count('refused')
  const working = count('processing') + count('received')
  const detail = [
    working > 0 && `${countWords(working, 'file')} being read`,
    refused > 0 && `${refused} of the newest ${files.length} refused`,
  ].filter((part) => part !== false)
  return {
    statement: waiting > 0 ? `${countAtHead(waiting)} ${waiting === 1 ? 'file waits' : 'files wait'} for your word.` : 'Files and layers',
    detail: detail.length > 0 ? `${detail.join('; ')}.` : 'Every file received, what was made of it, and why not.',
  }
}
