import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { Token } from '../../../shared/schemas/users'
import { sentenceOf } from '../../api/api-error'
import { tokensQuery, useDeleteToken } from '../../api/tokens'
import { Age } from '../../components/ui/age'
import { Button } from '../../components/ui/button'
import { ConfirmByName } from '../../components/ui/confirm-by-name'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { SectionHead } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { dayWithYear } from '../../lib/dates'
import { NewToken } from './new-token'

/** Keys for programs that act in this person's name. */
export function TokenPart() {
  const tokens = useQuery(tokensQuery())
  const [making, setMaking] = useState(false)
  const [revoking, setRevoking] = useState<Token | null>(null)
  const items = tokens.data?.items ?? []
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <SectionHead ruled={items.length === 0} count={items.length || undefined}>
        Personal tokens
      </SectionHead>
      {tokens.isPending && <Waiting />}
      {tokens.error && <Failure error={tokens.error} onRetry={() => void tokens.refetch()} />}
      {tokens.isSuccess && items.length === 0 && !making && (
        <Empty title="No token.">A program that sends files or reads figures for you signs in with one.</Empty>
      )}
      {items.length > 0 && (
        <Table label="Personal tokens">
          <thead>
            <tr>
              <Th>Name</Th>
              <Th>Made</Th>
              <Th>Holds until</Th>
              <Th figures>Last used</Th>
              <Th>
                <span className="heard">Acts</span>
              </Th>
            </tr>
          </thead>
          <tbody>
            {items.map((token) => (
              <Tr key={token.id}>
                <Td>{token.name}</Td>
                <Td className="fig">{dayWithYear(token.createdAt)}</Td>
                <Td className={token.expiresAt ? 'fig' : 'text-ink2'}>{token.expiresAt ? dayWithYear(token.expiresAt) : 'it is revoked'}</Td>
                <Td figures>{token.lastUsedAt ? <Age at={token.lastUsedAt} /> : <span className="font-text text-ink2">never</span>}</Td>
                <Td className="text-right">
                  <Button kind="text" size="small" aria-label={`Revoke ${token.name}`} onClick={() => setRevoking(token)}>
                    Revoke
                  </Button>
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      )}
      {making ? (
        <NewToken onDone={() => setMaking(false)} />
      ) : (
        <div>
          <Button size="small" onClick={() => setMaking(true)}>
            Make a token
          </Button>
        </div>
      )}
      {revoking && <RevokeToken token={revoking} onClose={() => setRevoking(null)} />}
    </section>
  )
}

function RevokeToken({ token, onClose }: { token: Token; onClose: () => void }) {
  const revoke = useDeleteToken()
  return (
    <ConfirmByName
      open
      onOpenChange={(open) => !open && onClose()}
      title={`Revoke ${token.name}`}
      about="A program that uses it is refused from its next call on."
      name={token.name}
      act="Revoke the token"
      busy={revoke.isPending}
      error={revoke.error ? sentenceOf(revoke.error) : undefined}
      onConfirm={() => revoke.mutate(token.id, { onSuccess: onClose })}
    />
  )
}
