import type { ReactNode } from 'react'
import { useWide } from '../../hooks/use-wide'
import { Button } from '../ui/button'

/** Saves a form from the head of the page; on a phone from a bar at the thumb. */
export function SaveButton({ form, disabled, children }: { form: string; disabled: boolean; children: ReactNode }) {
  const wide = useWide()
  if (wide) {
    return (
      <Button kind="filled" type="submit" form={form} disabled={disabled}>
        {children}
      </Button>
    )
  }
  return (
    <div data-phone-bar className="fixed inset-x-0 bottom-0 z-[1000] border-t border-ink bg-paper px-4 pt-3 pb-[calc(0.75rem+env(safe-area-inset-bottom))]">
      <Button kind="filled" size="tall" type="submit" form={form} disabled={disabled} className="w-full">
        {children}
      </Button>
    </div>
  )
}
