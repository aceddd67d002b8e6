import { NavLink, useLocation } from 'react-router-dom'
import { can } from '../../../shared/permissions'
import type { Me } from '../../../shared/schemas/auth'
import { GraduatedRule } from '../ui/graduated-rule'
import { Clock } from './clock'
import { DemoTag } from './demo-tag'
import { Menu, MenuLink } from './menu'
import { PersonMenu } from './person-menu'
import { rooms, runningRooms } from './rooms'
import { Wordmark } from './wordmark'

const roomClass = 'relative grid h-14 place-items-center text-body'
const hereClass = 'font-heading after:absolute after:inset-x-0 after:-bottom-px after:h-1 after:bg-ink'

export function Masthead({ me, openAlerts }: { me: Me; openAlerts: number | undefined }) {
  return (
    <header data-masthead className="mx-auto w-full max-w-[1440px] px-4 pt-2 tab:px-8">
      <div className="flex items-center justify-between gap-4">
        <div className="flex items-center gap-4 desk:gap-9">
          <Wordmark />
          {me.demo && (
            <span className="tab:hidden">
              <DemoTag />
            </span>
          )}
          <nav aria-label="Rooms" className="hidden gap-5 tab:flex desk:gap-7">
            {rooms.map((room) => (
              <NavLink key={room.to} to={room.to} end={room.to === '/'} className={({ isActive }) => `${roomClass} ${isActive ? hereClass : 'hover:text-accent'}`}>
                <span>
                  {room.name}
                  {room.name === 'Alerts' && <AlertCount count={openAlerts} />}
                </span>
              </NavLink>
            ))}
            <Running me={me} />
          </nav>
        </div>
        <div className="flex items-center gap-3 desk:gap-5">
          {me.demo && (
            <span className="hidden desk:inline">
              <DemoTag />
            </span>
          )}
          <Clock timeZone={me.timeZone} />
          <span className="hidden tab:block">
            <PersonMenu me={me} />
          </span>
        </div>
      </div>
      <GraduatedRule />
    </header>
  )
}

export function AlertCount({ count }: { count: number | undefined }) {
  if (!count) return null
  return (
    <>
      {' '}
      <span className="fig ml-1 text-small font-heading text-ember">{count}</span>
      <span className="heard"> open</span>
    </>
  )
}

function Running({ me }: { me: Me }) {
  const { pathname } = useLocation()
  const open = runningRooms.filter((room) => can(me, room.may))
  if (open.length === 0) return null
  return (
    <Menu
      trigger={
        <button type="button" className={`${roomClass} ${pathname.startsWith('/admin') ? hereClass : 'hover:text-accent'}`}>
          <span>
            Running <span aria-hidden>▾</span>
          </span>
        </button>
      }
    >
      {open.map((room) => (
        <MenuLink key={room.to} to={room.to}>
          {room.name}
        </MenuLink>
      ))}
    </Menu>
  )
}
