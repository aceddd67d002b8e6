import { useNavigate } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { useMe, useSignOut } from '../../api/auth'
import { Button } from '../../components/ui/button'
import { Choice } from '../../components/ui/choice'
import { Page, SectionHead, Statement } from '../../components/ui/page'
import { chooseTheme, useThemeChoice } from '../../hooks/use-theme'
import { OwnSubscriptions } from './own-subscriptions'
import { PersonFacts } from './person-facts'
import { TokenPart } from './token-part'

const themes = [
  { value: 'system', label: 'as the system' },
  { value: 'light', label: 'paper' },
  { value: 'night', label: 'night' },
] as const

export function Component() {
  const me = useMe()
  const theme = useThemeChoice()
  const signOut = useSignOut()
  const navigate = useNavigate()
  if (!me) return null
  return (
    <Page title="Account">
      <Statement
        detail={me.roles.join(', ')}
        actions={
          <Button onClick={() => signOut.mutate(undefined, { onSuccess: () => void navigate(paths.signIn.to(), { replace: true }) })}>Sign out</Button>
        }
      >
        {me.name}
      </Statement>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.5fr)_minmax(0,1fr)]">
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-8">
          <OwnSubscriptions me={me} />
          <TokenPart />
        </div>
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-8">
          <PersonFacts me={me} />
          <section className="grid gap-3">
            <SectionHead>Theme</SectionHead>
            <Choice label="Theme" options={themes} value={theme} onChange={chooseTheme} />
          </section>
        </div>
      </div>
    </Page>
  )
}
