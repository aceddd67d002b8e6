import { useQuery } from '@tanstack/react-query'
import type { UseFormRegisterReturn } from 'react-hook-form'
import { usersQuery } from '../../api/users'
import { SelectField } from '../../components/ui/field'

/** Whose subscription it is to be; only an admin is asked. */
export function PersonChoice({ register }: { register: UseFormRegisterReturn }) {
  const users = useQuery(usersQuery()).data?.items.filter((user) => !user.disabled) ?? []
  return (
    <SelectField label="Person" {...register}>
      <option value="">myself</option>
      {users.map((user) => (
        <option key={user.id} value={user.id}>
          {user.name}, {user.email}
        </option>
      ))}
    </SelectField>
  )
}
