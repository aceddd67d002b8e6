import { useNavigate, useParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { useAcceptInvitation } from '../../api/auth'
import { Door } from '../../components/frame/door'
import { NewPasswordForm } from '../../components/frame/new-password-form'

export function Component() {
  const { token = '' } = useParams()
  const navigate = useNavigate()
  const accept = useAcceptInvitation()
  return (
    <Door title="Welcome to the watch" about="You were invited. Choose a password and you are in.">
      <NewPasswordForm
        act="Set the password and enter"
        busy={accept.isPending}
        error={accept.error}
        onSend={(password) => accept.mutate({ token, password }, { onSuccess: () => void navigate(paths.today.to(), { replace: true }) })}
      />
    </Door>
  )
}
