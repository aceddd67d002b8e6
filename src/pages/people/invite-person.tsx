import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import type { z } from 'zod'
import { newInvitation } from '../../../shared/schemas/users'
import { fieldErrors } from '../../api/field-errors'
import { useInvite } from '../../api/users'
import { TextField } from '../../components/ui/field'
import { PersonDialog } from './person-dialog'
import { RoleFields } from './role-fields'

/** The person gets a letter and chooses a password; nobody else ever knows it. */
export function InvitePerson({ onClose }: { onClose: () => void }) {
  const invite = useInvite()
  const form = useForm<z.input<typeof newInvitation>, unknown, z.output<typeof newInvitation>>({
    resolver: zodResolver(newInvitation),
    defaultValues: { email: '', name: '', roles: [] },
  })
  const { errors } = form.formState
  const refused = fieldErrors(invite.error)
  const submit = form.handleSubmit((given) => invite.mutate(given, { onSuccess: onClose }))
  return (
    <PersonDialog
      title="Invite by letter"
      about="The letter holds a link; whoever follows it chooses a password."
      act="Send the invitation"
      busy={invite.isPending}
      error={invite.error}
      onSubmit={() => void submit()}
      onClose={onClose}
    >
      <TextField label="Name" autoComplete="off" error={errors.name?.message} {...form.register('name')} />
      <TextField label="E-mail" type="email" autoComplete="off" error={errors.email?.message ?? refused['email']} {...form.register('email')} />
      <RoleFields register={form.register('roles')} error={errors.roles?.message} />
    </PersonDialog>
  )
}
