import { Dialog as Radix } from 'radix-ui'
import type { ReactNode } from 'react'

interface Props {
  open: boolean
  onOpenChange: (open: boolean) => void
  title: ReactNode
  /** One sentence of what this does; read out with the title. */
  about?: ReactNode
  children: ReactNode
}

/** A sheet of paper over the page: 460 wide at a desk, from the foot of the screen on a phone. */
export function Dialog({ open, onOpenChange, title, about, children }: Props) {
  return (
    <Radix.Root open={open} onOpenChange={onOpenChange}>
      <Radix.Portal>
        <Radix.Overlay className="fixed inset-0 z-[1200] bg-ink/40" />
        <Radix.Content
          {...(about ? {} : { 'aria-describedby': undefined })}
          className={
            'fixed inset-x-0 bottom-0 z-[1201] max-h-[92dvh] overflow-y-auto border-t border-ink bg-paper p-4 text-ink ' +
            'tab:inset-x-auto tab:bottom-auto tab:top-1/2 tab:left-1/2 tab:w-[460px] tab:-translate-1/2 tab:border tab:p-6'
          }
        >
          <Radix.Title className="text-lead">{title}</Radix.Title>
          {about && <Radix.Description className="mt-1 text-ink2">{about}</Radix.Description>}
          <div className="mt-4">{children}</div>
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  )
}
