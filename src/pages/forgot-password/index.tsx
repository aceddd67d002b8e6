import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { forgotPassword } from '../../../shared/schemas/auth'
import { useForgotPassword } from '../../api/auth'
import { Door } from '../../components/frame/door'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'

export function Component() {
  const ask = useForgotPassword()
  const form = useForm({ resolver: zodResolver(forgotPassword), defaultValues: { email: '' } })
  const send = form.handleSubmit((given) => ask.mutate(given))
  return (
    <Door title="A new password" about="A letter with a link goes to your address. The link can be used once.">
      {ask.isSuccess ? (
        <Message title="Look in your mail.">If the address belongs to somebody here, a letter is on its way to it.</Message>
      ) : (
        <form onSubmit={(event) => void send(event)} noValidate className="grid gap-5">
          <TextField label="E-mail" type="email" autoComplete="username" autoFocus error={form.formState.errors.email?.message} {...form.register('email')} />
          {ask.error && <Failure error={ask.error} />}
          <Button kind="filled" type="submit" disabled={ask.isPending}>
            Send the letter
          </Button>
        </form>
      )}
      <Link className="link inline-flex min-h-11 items-center justify-self-start" to={paths.signIn.to()}>
        Back to sign in
      </Link>
    </Door>
  )
}
