import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import type { z } from 'zod'
import { type User, userChange } from '../../../shared/schemas/users'
import { useMe } from '../../api/auth'
import { useChangeUser } from '../../api/users'
import { TimeZoneField } from '../../components/region-form/time-zone-field'
import { CheckField, TextField } from '../../components/ui/field'
import { PersonDialog } from './person-dialog'
import { RoleFields } from './role-fields'

export function ChangePerson({ user, onClose }: { user: User; onClose: () => void }) {
  const change = useChangeUser(user.id)
  const isMe = useMe()?.id === user.id
  const form = useForm<z.input<typeof userChange>, unknown, z.output<typeof userChange>>({
    resolver: zodResolver(userChange),
    defaultValues: { version: user.version, name: user.name, roles: user.roles, timeZone: user.timeZone, phone: user.phone ?? '', disabled: user.disabled },
  })
  const { errors } = form.formState
  const submit = form.handleSubmit((given) => change.mutate({ ...given, phone: given.phone || null }, { onSuccess: onClose }))
  return (
    <PersonDialog
      title={`Change ${user.name}`}
      about={user.email}
      act="Save the changes"
      busy={change.isPending}
      error={change.error}
      onSubmit={() => void submit()}
      onClose={onClose}
    >
      <TextField label="Name" autoComplete="off" error={errors.name?.message} {...form.register('name')} />
      <TextField label="Telephone" type="tel" className="fig" error={errors.phone?.message} {...form.register('phone')} />
      <TimeZoneField error={errors.timeZone?.message} {...form.register('timeZone')} />
      <RoleFields register={form.register('roles')} error={errors.roles?.message} />
      {!isMe && <CheckField label="Disabled" hint="Cannot sign in; sessions and tokens end at once. Nothing this person did is lost." {...form.register('disabled')} />}
    </PersonDialog>
  )
}
