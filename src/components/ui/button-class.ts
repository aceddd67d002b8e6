export type ButtonKind = 'filled' | 'outline' | 'text' | 'danger'
export type ButtonSize = 'small' | 'normal' | 'tall'

const base =
  'inline-flex items-center justify-center gap-2 rounded-press font-strong text-center select-none ' +
  'disabled:border-dashed disabled:border-rule2 disabled:bg-transparent disabled:text-ink3 transition-colors motion-reduce:transition-none'

const kinds: Record<ButtonKind, string> = {
  filled: 'border border-accent bg-accent text-onAccent hover:bg-accentDeep hover:border-accentDeep',
  outline: 'border border-accent text-accent hover:bg-accentTint hover:text-accentDeep',
  /** Destructive acts are ink, not red; they are confirmed by naming the thing. */
  danger: 'border border-ink text-ink hover:bg-sunk',
  text: 'link font-strong',
}

const sizes: Record<ButtonSize, string> = {
  small: 'min-h-11 px-3 text-small tab:min-h-8',
  normal: 'min-h-12 px-4 text-body tab:min-h-10',
  tall: 'min-h-15 px-5 text-lead',
}

export function buttonClass(kind: ButtonKind, size: ButtonSize = 'normal', more = ''): string {
  if (kind === 'text') return `${base} ${kinds.text} min-h-11 tab:min-h-0 ${size === 'small' ? 'text-small' : 'text-body'} ${more}`
  return `${base} ${kinds[kind]} ${sizes[size]} ${more}`
}
