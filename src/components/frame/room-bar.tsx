import { useState } from 'react'
import { Link, NavLink, useNavigate } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { can } from '../../../shared/permissions'
import type { Me } from '../../../shared/schemas/auth'
import { useSignOut } from '../../api/auth'
import { chooseTheme, useThemeChoice } from '../../hooks/use-theme'
import { Choice } from '../ui/choice'
import { Dialog } from '../ui/dialog'
import { AlertCount } from './masthead'
import { rooms, runningRooms } from './rooms'

const wordClass = 'relative grid h-15 flex-1 place-items-center text-body'
const hereClass = 'font-heading after:absolute after:inset-x-3 after:-top-px after:h-1 after:bg-ink'

/** On a phone the rooms are at the thumb: three of them, and the rest under "More". */
export function RoomBar({ me, openAlerts }: { me: Me; openAlerts: number | undefined }) {
  const [more, setMore] = useState(false)
  return (
    <nav data-room-bar aria-label="Rooms at the foot" className="fixed inset-x-0 bottom-0 z-[1000] flex border-t border-ink bg-paper pb-[env(safe-area-inset-bottom)] tab:hidden">
      {rooms.slice(0, 3).map((room) => (
        <NavLink key={room.to} to={room.to} end={room.to === '/'} className={({ isActive }) => `${wordClass} ${isActive ? hereClass : ''}`}>
          <span>
            {room.name}
            {room.name === 'Alerts' && <AlertCount count={openAlerts} />}
          </span>
        </NavLink>
      ))}
      <button type="button" className={wordClass} onClick={() => setMore(true)}>
        More
      </button>
      <More me={me} open={more} onOpenChange={setMore} />
    </nav>
  )
}

const themes = [
  { value: 'system', label: 'as the system' },
  { value: 'light', label: 'paper' },
  { value: 'night', label: 'night' },
] as const

function More({ me, open, onOpenChange }: { me: Me; open: boolean; onOpenChange: (open: boolean) => void }) {
  const navigate = useNavigate()
  const signOut = useSignOut()
  const theme = useThemeChoice()
  const links = [
    ...rooms.slice(3),
    ...runningRooms.filter((room) => can(me, room.may)),
    { name: 'Account', to: paths.account.to() },
    ...(me.mailPage ? [{ name: 'Caught letters', to: paths.mail.to() }] : []),
  ]
  return (
    <Dialog open={open} onOpenChange={onOpenChange} title={me.name} about={me.roles.join(', ')}>
      <ul className="border-t border-rule">
        {links.map((link) => (
          <li key={link.to} className="border-b border-rule">
            <Link to={link.to} onClick={() => onOpenChange(false)} className="flex min-h-13 items-center">
              {link.name}
            </Link>
          </li>
        ))}
      </ul>
      <div className="mt-4 flex flex-wrap items-center justify-between gap-2">
        <Choice label="Theme" options={themes} value={theme} onChange={chooseTheme} />
        <button
          type="button"
          className="link min-h-11 font-strong"
          onClick={() => signOut.mutate(undefined, { onSuccess: () => void navigate(paths.signIn.to(), { replace: true }) })}
        >
          Sign out
        </button>
      </div>
    </Dialog>
  )
}
