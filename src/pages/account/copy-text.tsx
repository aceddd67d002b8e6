import { useState } from 'react'
import { Button } from '../../components/ui/button'

/** A text to be taken elsewhere, with a button that copies it; where the browser forbids that it can be selected. */
export function CopyText({ text }: { text: string }) {
  const [state, setState] = useState<'idle' | 'copied' | 'forbidden'>('idle')
  async function copy() {
    try {
      await navigator.clipboard.writeText(text)
      setState('copied')
    } catch {
      setState('forbidden')
    }
  }
  return (
    <span className="mt-2 flex flex-wrap items-center gap-x-4 gap-y-2">
      <code className="fig bg-sunk px-2 py-1 break-all select-all">{text}</code>
      <Button kind="text" size="small" onClick={() => void copy()}>
        Copy
      </Button>
      <span role="status" className="text-small text-ink2">
        {state === 'copied' && 'copied'}
        {state === 'forbidden' && 'this browser does not let it be copied; select it by hand'}
      </span>
    </span>
  )
}
