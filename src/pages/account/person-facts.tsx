import type { Me } from '../../../shared/schemas/auth'
import { sentenceOf } from '../../api/api-error'
import { useForgotPassword } from '../../api/auth'
import { Button } from '../../components/ui/button'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'

export function PersonFacts({ me }: { me: Me }) {
  const letter = useForgotPassword()
  return (
    <section className="grid gap-3">
      <div>
        <SectionHead>You</SectionHead>
        <dl className="grid grid-cols-[auto_minmax(0,1fr)] text-small [&>dd]:border-b [&>dd]:border-rule [&>dd]:py-2 [&>dt]:border-b [&>dt]:border-rule [&>dt]:py-2 [&>dt]:pr-6 [&>dt]:text-ink2">
          <dt>Name</dt>
          <dd>{me.name}</dd>
          <dt>E-mail</dt>
          <dd className="fig break-all">{me.email}</dd>
          <dt>Roles</dt>
          <dd>{me.roles.join(', ')}</dd>
          <dt>Time zone</dt>
          <dd>{me.timeZone}</dd>
        </dl>
        <p className="pt-2 text-fine text-ink3">Name, roles and time zone are changed by an administrator.</p>
      </div>
      {letter.isSuccess ? (
        <Message>A letter with a link to set a new password is on its way to {me.email}.</Message>
      ) : (
        <div>
          <Button size="small" disabled={letter.isPending} onClick={() => letter.mutate({ email: me.email })}>
            Send me a letter to set a new password
          </Button>
        </div>
      )}
      {letter.error && <Message fault>{sentenceOf(letter.error)}</Message>}
    </section>
  )
}
