import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Link, useNavigate, useSearchParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { credentials } from '../../../shared/schemas/auth'
import { useSignIn } from '../../api/auth'
import { Door } from '../../components/frame/door'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { TextField } from '../../components/ui/field'
import { safeNext } from '../../lib/safe-next'

export function Component() {
  const [search] = useSearchParams()
  const next = safeNext(search.get('next'))
  const navigate = useNavigate()
  const signIn = useSignIn()
  const form = useForm({ resolver: zodResolver(credentials), defaultValues: { email: '', password: '' } })
  const { errors } = form.formState
  const send = form.handleSubmit((given) => signIn.mutate(given, { onSuccess: () => void navigate(next, { replace: true }) }))
  return (
    <Door title="Sign in" about={next === '/' ? undefined : 'Sign in to open the page you asked for.'}>
      <form onSubmit={(event) => void send(event)} noValidate className="grid gap-5">
        <TextField label="E-mail" type="email" autoComplete="username" autoFocus error={errors.email?.message} {...form.register('email')} />
        <TextField
          label="Password"
          type="password"
          autoComplete="current-password"
          error={errors.password && 'Type your password.'}
          {...form.register('password')}
        />
        {signIn.error && <Failure error={signIn.error} />}
        <Button kind="filled" type="submit" disabled={signIn.isPending}>
          Sign in
        </Button>
        <Link className="link inline-flex min-h-11 items-center justify-self-start" to={paths.forgotPassword.to()}>
          Forgot the password?
        </Link>
      </form>
    </Door>
  )
}
