import type { UseFormRegisterReturn } from 'react-hook-form'
import { roles, type Role } from '../../../shared/permissions'
import { FaultMark } from '../../components/ui/fault-mark'
import { CheckField } from '../../components/ui/field'

const may: Record<Role, string> = {
  researcher: 'reads everything, exports, adds notes',
  analyst: 'draws regions, writes rules, sends files, confirms feeds',
  officer: 'acknowledges, assigns, holds and closes alerts',
  admin: 'everything, and people, feeds, jobs, letters and audit besides',
}

/** Roles are a set: a person may have several. Spread the form's `register('roles')` in. */
export function RoleFields({ register, error }: { register: UseFormRegisterReturn; error: string | undefined }) {
  return (
    <fieldset>
      <legend className="mb-1 text-small text-ink2">Roles</legend>
      {roles.map((role) => (
        <CheckField key={role} label={role} hint={may[role]} value={role} {...register} />
      ))}
      {error && (
        <p role="alert" className="flex items-start gap-2 text-small">
          <FaultMark /> {error}
        </p>
      )}
    </fieldset>
  )
}
