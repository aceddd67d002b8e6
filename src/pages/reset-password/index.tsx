import { useParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { useResetPassword } from '../../api/auth'
import { Door } from '../../components/frame/door'
import { NewPasswordForm } from '../../components/frame/new-password-form'
import { ButtonLink } from '../../components/ui/button'
import { Message } from '../../components/ui/message'

export function Component() {
  const { token = '' } = useParams()
  const reset = useResetPassword()
  return (
    <Door title="Set a new password" about={reset.isSuccess ? undefined : 'Sessions on other devices end when it is set.'}>
      {reset.isSuccess ? (
        <>
          <Message title="The password is set." />
          <ButtonLink kind="filled" to={paths.signIn.to()}>
            Sign in
          </ButtonLink>
        </>
      ) : (
        <NewPasswordForm act="Set the password" busy={reset.isPending} error={reset.error} onSend={(password) => reset.mutate({ token, password })} />
      )}
    </Door>
  )
}
