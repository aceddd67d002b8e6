import { useNavigate } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Me } from '../../../shared/schemas/auth'
import { useSignOut } from '../../api/auth'
import { chooseTheme, useThemeChoice } from '../../hooks/use-theme'
import { Menu, MenuAct, MenuChoice, MenuLabel, MenuLink, MenuRule } from './menu'

const themes = [
  { value: 'system', label: 'As the system' },
  { value: 'light', label: 'Paper' },
  { value: 'night', label: 'Night' },
] as const

function initials(name: string): string {
  const words = name.split(/\s+/).filter(Boolean)
  return ((words[0]?.[0] ?? '') + (words.length > 1 ? (words.at(-1)?.[0] ?? '') : '')).toUpperCase()
}

export function PersonMenu({ me }: { me: Me }) {
  const navigate = useNavigate()
  const signOut = useSignOut()
  const theme = useThemeChoice()
  const leave = () => signOut.mutate(undefined, { onSuccess: () => void navigate(paths.signIn.to(), { replace: true }) })
  return (
    <Menu
      align="end"
      trigger={
        <button
          type="button"
          className="grid size-11 place-items-center rounded-round tab:size-9"
        >
          <span className="heard">{me.name}: account, theme, sign out</span>
          <span aria-hidden className="grid size-8 place-items-center rounded-round border-2 border-accent text-fine font-heading text-accent">{initials(me.name)}</span>
        </button>
      }
    >
      <MenuLabel>
        <span className="block text-body font-heading text-ink">{me.name}</span>
        {me.roles.join(', ')}
      </MenuLabel>
      <MenuRule />
      <MenuLink to={paths.account.to()}>Account</MenuLink>
      {me.mailPage && <MenuLink to={paths.mail.to()}>Caught letters</MenuLink>}
      <MenuRule />
      <MenuLabel>Theme</MenuLabel>
      <MenuChoice value={theme} options={themes} onChange={chooseTheme} />
      <MenuRule />
      <MenuAct onSelect={leave}>Sign out</MenuAct>
    </Menu>
  )
}
