import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import type { z } from 'zod'
import { newUser } from '../../../shared/schemas/users'
import { useMe } from '../../api/auth'
import { fieldErrors } from '../../api/field-errors'
import { useCreateUser } from '../../api/users'
import { TimeZoneField } from '../../components/region-form/time-zone-field'
import { TextField } from '../../components/ui/field'
import { PersonDialog } from './person-dialog'
import { RoleFields } from './role-fields'

/** For places without mail: the password is told by other means. */
export function AddPerson({ onClose }: { onClose: () => void }) {
  const create = useCreateUser()
  const zone = useMe()?.timeZone ?? 'UTC'
  const form = useForm<z.input<typeof newUser>, unknown, z.output<typeof newUser>>({
    resolver: zodResolver(newUser),
    defaultValues: { email: '', name: '', roles: [], password: '', timeZone: zone, phone: '' },
  })
  const { errors } = form.formState
  const refused = fieldErrors(create.error)
  const submit = form.handleSubmit((given) => create.mutate({ ...given, phone: given.phone || null }, { onSuccess: onClose }))
  return (
    <PersonDialog
      title="Add a person"
      about="You choose the first password and tell it yourself. By letter nobody needs to."
      act="Add the person"
      busy={create.isPending}
      error={create.error}
      onSubmit={() => void submit()}
      onClose={onClose}
    >
      <TextField label="Name" autoComplete="off" error={errors.name?.message} {...form.register('name')} />
      <TextField label="E-mail" type="email" autoComplete="off" error={errors.email?.message ?? refused['email']} {...form.register('email')} />
      <TextField
        label="First password"
        type="password"
        autoComplete="new-password"
        hint="At least 10 characters."
        error={errors.password?.message ?? refused['password']}
        {...form.register('password')}
      />
      <TextField label="Telephone" type="tel" className="fig" error={errors.phone?.message} {...form.register('phone')} />
      <TimeZoneField error={errors.timeZone?.message} {...form.register('timeZone')} />
      <RoleFields register={form.register('roles')} error={errors.roles?.message} />
    </PersonDialog>
  )
}
