import { useState } from 'react'
import type { Alert } from '../../../shared/schemas/alerts'
import { SelectField } from '../../components/ui/field'
import { ActForm } from './act-form'
import type { Acting } from './use-acts'

export function AssignDialog({ alert, acts }: { alert: Alert; acts: Acting }) {
  const [userId, setUserId] = useState(String(alert.assignee?.id ?? alert.assignable[0]?.id ?? ''))
  return (
    <ActForm acts={acts} title="Assign" about="Who sees to it from now on." act="Assign" onSubmit={() => acts.assign(userId === '' ? null : Number(userId))}>
      <SelectField label="To" value={userId} onChange={(event) => setUserId(event.target.value)}>
        {alert.assignable.map((person) => (
          <option key={person.id} value={person.id}>
            {person.name}
          </option>
        ))}
        <option value="">nobody</option>
      </SelectField>
    </ActForm>
  )
}
