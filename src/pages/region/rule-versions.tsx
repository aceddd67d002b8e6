import { useState } from 'react'
import type { Rule } from '../../../shared/schemas/rules'
import { Button } from '../../components/ui/button'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { dayWithYear } from '../../lib/dates'
import { ActivateRule } from './activate-rule'

/** Versions newest first; each keeps its words, its note and its days. */
export function RuleVersions({ rule, mayActivate }: { rule: Rule; mayActivate: boolean }) {
  const [activating, setActivating] = useState<number | null>(null)
  const versions = rule.versions.toSorted((a, b) => b.version - a.version)
  return (
    <>
      <Table label={`Versions of ${rule.name}`}>
        <thead>
          <tr>
            <Th figures>Version</Th>
            <Th>In words</Th>
            <Th>In force</Th>
          </tr>
        </thead>
        <tbody>
          {versions.map((one) => (
            <Tr key={one.version}>
              <Td figures className="align-top">
                {one.version}
              </Td>
              <Td className="align-top">
                {one.version === rule.activeVersion ? 'As above.' : one.text}
                <span className="block text-fine text-ink2">
                  written <span className="fig">{dayWithYear(one.createdAt)}</span>
                  {one.createdBy && ` by ${one.createdBy}`}
                  {one.note && `: “${one.note}”`}
                </span>
              </Td>
              <Td className="align-top">
                {one.version === rule.activeVersion ? (
                  <strong className="font-strong whitespace-nowrap">
                    since <span className="fig">{one.activatedAt && dayWithYear(one.activatedAt)}</span>
                  </strong>
                ) : (
                  mayActivate && (
                    <Button kind="text" size="small" onClick={() => setActivating(one.version)}>
                      Switch on
                    </Button>
                  )
                )}
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
      {activating !== null && <ActivateRule rule={rule} ruleVersion={activating} onClose={() => setActivating(null)} />}
    </>
  )
}
