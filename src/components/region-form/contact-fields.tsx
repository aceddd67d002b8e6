import { useFieldArray, type UseFormReturn } from 'react-hook-form'
import { Button } from '../ui/button'
import { TextField } from '../ui/field'
import type { RegionFields } from './region-fields'

/** Whom to call about this water. */
export function ContactFields({ form }: { form: UseFormReturn<RegionFields> }) {
  const { fields, append, remove } = useFieldArray({ control: form.control, name: 'contacts' })
  const errors = form.formState.errors.contacts
  return (
    <fieldset className="grid gap-3">
      <legend className="mb-1 text-small text-ink2">Contacts</legend>
      {fields.map((field, index) => (
        <div key={field.id} className="grid gap-3 border-b border-rule pb-3 tab:grid-cols-2">
          <TextField label="Name" error={errors?.[index]?.name?.message} {...form.register(`contacts.${index}.name`)} />
          <TextField label="Telephone" type="tel" className="fig" error={errors?.[index]?.phone?.message} {...form.register(`contacts.${index}.phone`)} />
          <div className="tab:col-span-2">
            <TextField label="Note" error={errors?.[index]?.note?.message} {...form.register(`contacts.${index}.note`)} />
          </div>
          <div>
            <Button kind="text" size="small" onClick={() => remove(index)}>
              Take out contact {index + 1}
            </Button>
          </div>
        </div>
      ))}
      <div>
        <Button kind="text" size="small" onClick={() => append({ name: '', phone: '', note: '' })}>
          Add a contact
        </Button>
      </div>
    </fieldset>
  )
}
