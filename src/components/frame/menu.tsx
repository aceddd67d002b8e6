import { DropdownMenu } from 'radix-ui'
import type { ReactNode } from 'react'
import { Link } from 'react-router-dom'

const itemClass =
  'flex min-h-11 w-full items-center px-4 text-body text-ink outline-none data-highlighted:bg-accentTint data-highlighted:text-accentDeep'

interface Props {
  trigger: ReactNode
  children: ReactNode
  align?: 'start' | 'end'
}

/** A short list under a word, ruled like everything else. */
export function Menu({ trigger, children, align = 'start' }: Props) {
  return (
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger asChild>{trigger}</DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content align={align} sideOffset={6} className="z-[1100] min-w-52 border border-ink bg-sheet py-1">
          {children}
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  )
}

export function MenuLink({ to, children }: { to: string; children: ReactNode }) {
  return (
    <DropdownMenu.Item asChild>
      <Link to={to} className={itemClass}>
        {children}
      </Link>
    </DropdownMenu.Item>
  )
}

export function MenuAct({ onSelect, children }: { onSelect: () => void; children: ReactNode }) {
  return (
    <DropdownMenu.Item onSelect={onSelect} className={itemClass}>
      {children}
    </DropdownMenu.Item>
  )
}

export function MenuChoice<T extends string>({ value, options, onChange }: { value: T; options: readonly { value: T; label: string }[]; onChange: (value: T) => void }) {
  const choose = (next: string) => {
    const found = options.find((option) => option.value === next)
    if (found) onChange(found.value)
  }
  return (
    <DropdownMenu.RadioGroup value={value} onValueChange={choose}>
      {options.map((option) => (
        <DropdownMenu.RadioItem
          key={option.value}
          value={option.value}
          onSelect={(event) => event.preventDefault()}
          className={`${itemClass} data-[state=checked]:font-heading data-[state=checked]:shadow-[inset_4px_0_0_var(--ink)]`}
        >
          {option.label}
        </DropdownMenu.RadioItem>
      ))}
    </DropdownMenu.RadioGroup>
  )
}

export function MenuRule() {
  return <DropdownMenu.Separator className="my-1 border-t border-rule" />
}

export function MenuLabel({ children }: { children: ReactNode }) {
  return <DropdownMenu.Label className="px-4 pt-2 pb-1 text-fine text-ink3">{children}</DropdownMenu.Label>
}
