import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { newPassword } from '../../lib/new-password'
import { Button } from '../ui/button'
import { Failure } from '../ui/failure'
import { TextField } from '../ui/field'

interface Props {
  act: string
  busy: boolean
  error: Error | null
  onSend: (password: string) => void
}

export function NewPasswordForm({ act, busy, error, onSend }: Props) {
  const form = useForm({ resolver: zodResolver(newPassword), defaultValues: { password: '', again: '' } })
  const { errors } = form.formState
  const send = form.handleSubmit((given) => onSend(given.password))
  return (
    <form onSubmit={(event) => void send(event)} noValidate className="grid gap-5">
      <TextField
        label="New password"
        type="password"
        autoComplete="new-password"
        autoFocus
        hint="At least 10 characters; a short sentence is good."
        error={errors.password?.message}
        {...form.register('password')}
      />
      <TextField label="Once more" type="password" autoComplete="new-password" error={errors.again?.message} {...form.register('again')} />
      {error && <Failure error={error} />}
      <Button kind="filled" type="submit" disabled={busy}>
        {act}
      </Button>
    </form>
  )
}
