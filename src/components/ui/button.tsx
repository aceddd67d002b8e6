import type { ComponentProps } from 'react'
import { Link } from 'react-router-dom'
import { buttonClass, type ButtonKind, type ButtonSize } from './button-class'

interface Look {
  kind?: ButtonKind
  size?: ButtonSize
}

export function Button({ kind = 'outline', size, className, type = 'button', ...rest }: ComponentProps<'button'> & Look) {
  return <button type={type} className={buttonClass(kind, size, className)} {...rest} />
}

/** A link that looks like what it does: going somewhere next. */
export function ButtonLink({ kind = 'outline', size, className, ...rest }: ComponentProps<typeof Link> & Look) {
  return <Link className={buttonClass(kind, size, className)} {...rest} />
}
