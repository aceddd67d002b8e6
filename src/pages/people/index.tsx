import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { User } from '../../../shared/schemas/users'
import { useMe } from '../../api/auth'
import { invitationsQuery, usersQuery } from '../../api/users'
import { Age } from '../../components/ui/age'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Page, SectionHead, Statement } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { dayWithYear } from '../../lib/dates'
import { countAtHead } from '../../lib/format'
import { AddPerson } from './add-person'
import { ChangePerson } from './change-person'
import { InvitePerson } from './invite-person'

type Open = { kind: 'add' } | { kind: 'invite' } | { kind: 'change'; user: User } | null

export function Component() {
  const users = useQuery(usersQuery())
  const [open, setOpen] = useState<Open>(null)
  const items = users.data?.items ?? []
  const active = items.filter((user) => !user.disabled)
  const close = () => setOpen(null)
  return (
    <Page title="People">
      <Statement
        actions={
          <>
            <Button onClick={() => setOpen({ kind: 'add' })}>Add a person</Button>
            <Button kind="filled" onClick={() => setOpen({ kind: 'invite' })}>
              Invite by letter
            </Button>
          </>
        }
      >
        {users.isSuccess ? `${countAtHead(active.length)} ${active.length === 1 ? 'person' : 'people'} can sign in.` : 'People'}
      </Statement>
      {users.isPending && <Waiting lines={4} />}
      {users.error && <Failure error={users.error} onRetry={() => void users.refetch()} />}
      {items.length > 0 && <PeopleTable users={items} onChange={(user) => setOpen({ kind: 'change', user })} />}
      <Invitations />
      {open?.kind === 'add' && <AddPerson onClose={close} />}
      {open?.kind === 'invite' && <InvitePerson onClose={close} />}
      {open?.kind === 'change' && <ChangePerson user={open.user} onClose={close} />}
    </Page>
  )
}

function PeopleTable({ users, onChange }: { users: readonly User[]; onChange: (user: User) => void }) {
  const me = useMe()
  return (
    <Table label="People">
      <thead>
        <tr>
          <Th>Name</Th>
          <Th>Roles</Th>
          <Th className="hidden tab:table-cell">Telephone</Th>
          <Th figures>Last seen</Th>
          <Th>
            <span className="heard">Acts</span>
          </Th>
        </tr>
      </thead>
      <tbody>
        {users.map((user) => (
          <Tr key={user.id}>
            <Td className={user.disabled ? 'text-ink3' : ''}>
              <span className="text-body font-strong">
                {user.name}
                {user.id === me?.id && ' (you)'}
              </span>
              <span className="fig block text-fine break-all">{user.email}</span>
            </Td>
            <Td className={user.disabled ? 'text-ink3' : ''}>
              {user.roles.join(', ')}
              {user.disabled && <span className="block">disabled</span>}
            </Td>
            <Td className="fig hidden tab:table-cell">{user.phone}</Td>
            <Td figures>{user.lastSeenAt ? <Age at={user.lastSeenAt} /> : <span className="font-text text-ink2">never</span>}</Td>
            <Td className="text-right">
              <Button kind="text" size="small" aria-label={`Change ${user.name}`} onClick={() => onChange(user)}>
                Change
              </Button>
            </Td>
          </Tr>
        ))}
      </tbody>
    </Table>
  )
}

function Invitations() {
  const invitations = useQuery(invitationsQuery())
  const waiting = invitations.data?.items.filter((one) => one.acceptedAt === null) ?? []
  if (waiting.length === 0) return null
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-2">
      <SectionHead count={waiting.length} ruled={false}>
        Invited, not yet here
      </SectionHead>
      <Table label="Invitations">
        <thead>
          <tr>
            <Th>Name</Th>
            <Th>Roles</Th>
            <Th>Invited</Th>
            <Th>Holds until</Th>
          </tr>
        </thead>
        <tbody>
          {waiting.map((one) => (
            <Tr key={one.id}>
              <Td>
                {one.name}
                <span className="fig block text-fine break-all text-ink2">{one.email}</span>
              </Td>
              <Td>{one.roles.join(', ')}</Td>
              <Td className="fig">{dayWithYear(one.createdAt)}</Td>
              <Td className="fig">{dayWithYear(one.expiresAt)}</Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </section>
  )
}
