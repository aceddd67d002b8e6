import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { caughtLetterQuery } from '../../api/mail'
import { Button } from '../../components/ui/button'
import { Choice } from '../../components/ui/choice'
import { Failure } from '../../components/ui/failure'
import { Waiting } from '../../components/ui/waiting'
import { LetterFrame } from './letter-frame'
import { LetterHeaders } from './letter-headers'

const parts = [
  { value: 'html', label: 'letter' },
  { value: 'text', label: 'text part' },
  { value: 'headers', label: 'headers' },
] as const
type Part = (typeof parts)[number]['value']

export function OpenLetter({ id, onClose }: { id: string; onClose: () => void }) {
  const { data: letter, error, refetch } = useQuery(caughtLetterQuery(id))
  const [part, setPart] = useState<Part>('html')
  if (error) return <Failure error={error} onRetry={() => void refetch()} />
  if (!letter) return <Waiting />
  const shown = part === 'html' && letter.html === null ? 'text' : part
  return (
    <article aria-label={letter.subject} className="grid gap-4">
      <header className="grid gap-1 border-t border-ink pt-3">
        <Button kind="text" onClick={onClose} className="justify-self-start desk:hidden">
          All letters
        </Button>
        <h2 className="text-lead">{letter.subject}</h2>
        <p className="text-small text-ink2">
          to {letter.to.join(', ')}
        </p>
      </header>
      <Choice label="Part of the letter" options={letter.html === null ? parts.slice(1) : parts} value={shown} onChange={setPart} />
      {shown === 'html' && letter.html !== null && <LetterFrame html={letter.html} title={letter.subject} />}
      {shown === 'text' && <LetterText text={letter.text} />}
      {shown === 'headers' && <LetterHeaders letter={letter} />}
    </article>
  )
}

/** Plain text as a mail program shows it: addresses in it can be followed. */
function LetterText({ text }: { text: string }) {
  const pieces = text.split(/(https?:\/\/[^\s<>"]+)/)
  return (
    <pre className="fig overflow-x-auto border border-rule bg-sheet p-4 text-small whitespace-pre-wrap">
      {pieces.map((piece, index) =>
        index % 2 === 1 ? (
          <a key={index} className="link" href={piece}>
            {piece}
          </a>
        ) : (
          piece
        ),
      )}
    </pre>
  )
}
