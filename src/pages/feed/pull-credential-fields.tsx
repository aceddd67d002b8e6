import { useWatch, type UseFormReturn } from 'react-hook-form'
import { SelectField, TextField } from '../../components/ui/field'
import { credentialWords } from './pull-words'
import type { PullFormInput, PullFormOutput } from './pull-fields'

interface Props {
  form: UseFormReturn<PullFormInput, unknown, PullFormOutput>
  stored: keyof typeof credentialWords
  /** What the server says of them. */
  told: string | undefined
}

/** What is stored is never shown; it can be kept, replaced or taken away. */
export function PullCredentialFields({ form, stored, told }: Props) {
  const { errors } = form.formState
  const choice = useWatch({ control: form.control, name: 'choice' })
  return (
    <>
      <SelectField label="Credentials" hint="Kept encrypted; nobody can read them again." error={told} {...form.register('choice')}>
        {stored !== 'none' && <option value="keep">as stored: {credentialWords[stored]}</option>}
        <option value="none">none</option>
        <option value="basic">{credentialWords.basic}</option>
        <option value="bearer">{credentialWords.bearer}</option>
      </SelectField>
      {choice === 'basic' && (
        <div className="grid gap-4 tab:grid-cols-2">
          <TextField label="Name at the provider" autoComplete="off" spellCheck={false} error={errors.user?.message} {...form.register('user')} />
          <TextField label="Password there" type="password" autoComplete="new-password" error={errors.password?.message} {...form.register('password')} />
        </div>
      )}
      {choice === 'bearer' && <TextField label="Token" type="password" autoComplete="new-password" error={errors.token?.message} {...form.register('token')} />}
    </>
  )
}
