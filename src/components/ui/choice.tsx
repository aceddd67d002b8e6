import { useId } from 'react'

interface Props<T extends string> {
  /** Said to screen readers; the words themselves tell the eye. */
  label: string
  options: readonly { value: T; label: string }[]
  value: T | undefined
  onChange: (value: T) => void
}

/** A choice among views: accent words, the chosen one in ink with a bar. */
export function Choice<T extends string>({ label, options, value, onChange }: Props<T>) {
  const name = useId()
  return (
    <fieldset className="flex flex-wrap">
      <legend className="heard">{label}</legend>
      {options.map((option) => (
        <label
          key={option.value}
          className={
            'relative grid min-h-11 place-items-center border-b px-4 text-body font-strong tab:min-h-9 ' +
            'has-focus-visible:outline-3 has-focus-visible:outline-offset-2 has-focus-visible:outline-ink ' +
            (option.value === value ? 'border-ink text-ink shadow-[inset_0_-3px_0_var(--ink)]' : 'border-accent text-accent hover:text-accentDeep')
          }
        >
          <input
            type="radio"
            className="absolute inset-0 cursor-pointer opacity-0"
            name={name}
            value={option.value}
            checked={option.value === value}
            onChange={() => onChange(option.value)}
          />
          {option.label}
        </label>
      ))}
    </fieldset>
  )
}
