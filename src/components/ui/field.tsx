import { useId, type ComponentProps, type ReactNode } from 'react'
import { FaultMark } from './fault-mark'

interface About {
  label: string
  hint?: ReactNode
  error?: string | undefined
}

interface Wired {
  id: string
  'aria-invalid': boolean
  'aria-describedby': string | undefined
  className: string
}

const control =
  'w-full min-h-12 tab:min-h-10 bg-sheet px-3 py-2 text-body text-ink border-0 border-b border-accent rounded-none ' +
  'placeholder:text-ink3 disabled:border-rule2 disabled:text-ink3 aria-invalid:border-b-3 aria-invalid:border-rule2'

/** A label, a control, a hint or what is wrong with it. Spread what `children` is given onto the control. */
export function Field({ label, hint, error, children }: About & { children: (wired: Wired) => ReactNode }) {
  const id = useId()
  const noteId = `${id}-note`
  const note = error ?? hint
  return (
    <div className="grid content-start gap-1">
      <label htmlFor={id} className="text-small text-ink2">
        {label}
      </label>
      {children({ id, 'aria-invalid': error !== undefined, 'aria-describedby': note ? noteId : undefined, className: control })}
      {note && (
        <p id={noteId} className={error ? 'flex items-start gap-2 text-small text-ink' : 'text-fine text-ink3'}>
          {error && <FaultMark />}
          {note}
        </p>
      )}
    </div>
  )
}

/** Spread a form's `register('name')` onto it. */
export function TextField({ label, hint, error, className = '', ...rest }: ComponentProps<'input'> & About) {
  return (
    <Field label={label} hint={hint} error={error}>
      {(wired) => <input {...rest} {...wired} className={`${wired.className} ${className}`} />}
    </Field>
  )
}

export function TextArea({ label, hint, error, className = '', rows = 3, ...rest }: ComponentProps<'textarea'> & About) {
  return (
    <Field label={label} hint={hint} error={error}>
      {(wired) => <textarea rows={rows} {...rest} {...wired} className={`${wired.className} ${className}`} />}
    </Field>
  )
}

export function SelectField({ label, hint, error, className = '', children, ...rest }: ComponentProps<'select'> & About) {
  return (
    <Field label={label} hint={hint} error={error}>
      {(wired) => (
        <select {...rest} {...wired} className={`${wired.className} ${className}`}>
          {children}
        </select>
      )}
    </Field>
  )
}

export function CheckField({ label, hint, className = '', ...rest }: ComponentProps<'input'> & { label: ReactNode; hint?: ReactNode }) {
  return (
    <label className={`flex min-h-11 items-start gap-3 py-2 tab:min-h-9 tab:py-1.5 ${className}`}>
      <input type="checkbox" {...rest} className="mt-0.5 size-4.5 shrink-0 accent-accent" />
      <span>
        <span className="block">{label}</span>
        {hint && <span className="block text-fine text-ink3">{hint}</span>}
      </span>
    </label>
  )
}

/** One of a few, all to be seen at once. Spread `register('name')` onto it. */
export function RadioFields({
  legend,
  options,
  error,
  ...rest
}: ComponentProps<'input'> & { legend: string; options: readonly { value: string; label: ReactNode }[]; error?: string | undefined }) {
  return (
    <fieldset className="grid gap-0.5">
      <legend className="mb-1 text-small text-ink2">{legend}</legend>
      {options.map((option) => (
        <label key={option.value} className="flex min-h-11 items-center gap-3 tab:min-h-8">
          <input type="radio" {...rest} value={option.value} className="size-4.5 shrink-0 accent-accent" />
          {option.label}
        </label>
      ))}
      {error && (
        <p className="flex items-start gap-2 text-small">
          <FaultMark />
          {error}
        </p>
      )}
    </fieldset>
  )
}
