import { ageText } from '../../shared/figure-text'
import { patchSentence } from '../../shared/patch-text'
import { paths } from '../../shared/paths'
import { severities } from '../../shared/schemas/common'
import type { Context } from '../context'
import type { Transaction } from '../db'
import { enqueueLetter, messageIdFor } from '../mail/outbox'
import { escapeHtml, letterLayout, letterParagraph } from '../mail/letters/layout'
import type { AlertRecord } from '../models/alert'
import type { Subject } from '../pipeline/active-rule'
import { subscribersOf } from '../queries/subscribers'
import { cautions, opticallyComplexCaution } from './cautions'
import { alertStatement, evidenceLine } from './statement'

interface Occasion {
  alert: AlertRecord
  subject: Subject
  kind: 'raised' | 'rose'
}

/** One letter for each person who asked to hear of this region at once, from this severity; in the alert's transaction. */
export async function writeLetters(context: Context, tx: Transaction, occasion: Occasion): Promise<void> {
  const { alert, subject, kind } = occasion
  const rank = severities.indexOf(alert.severity)
  const readers = await subscribersOf(context, tx, subject.region.id, rank)
  const thread = (userId: number) => messageIdFor(context, `alert-${alert.id}-${userId}`, alert.raisedAt)
  for (const reader of readers) {
    const key = kind === 'raised' ? '' : `-${kind}-${alert.severity}`
    await enqueueLetter(context, tx, {
      kind: `alert ${kind}`,
      dedupeKey: `alert:${alert.id}:${kind}:${alert.severity}:${reader.userId}`,
      userId: reader.userId,
      to: reader.email,
      alertId: alert.id,
      messageId: kind === 'raised' ? thread(reader.userId) : messageIdFor(context, `alert-${alert.id}-${reader.userId}${key}`, alert.raisedAt),
      inReplyTo: kind === 'raised' ? null : thread(reader.userId),
      ...letterOf(context, occasion),
    })
  }
  if (readers.length > 0) {
    const names = readers.map((reader) => reader.name).join(', ')
    await context.models.alertEntries.create({ alertId: alert.id, at: context.clock.now(), kind: 'letter', userId: null, text: `Letter written to ${names}.` }, { transaction: tx })
  }
}

function letterOf(context: Context, { alert, subject, kind }: Occasion): { subject: string; text: string; html: string } {
  const { evidence, severity } = alert
  const { name, opticallyComplex } = subject.region
  const statement = alertStatement(severity, name, evidence)
  const url = `${context.env.baseUrl}${paths.alert.to({ id: alert.id })}`
  const age = ageText((context.clock.now() - Date.parse(evidence.layerObservedAt)) / 3_600_000)
  const rose = kind === 'rose' ? 'It rose. ' : ''
  const why = `${evidence.ruleText} View of ${evidence.day}, ${age} old.`
  const patch = evidence.largestPatch ? patchSentence(evidence.largestPatch, evidence.unit) : null
  const warnings = [...cautions, ...(opticallyComplex ? [opticallyComplexCaution] : [])]
  const demo = context.env.mode === 'demo'
  const text = [
    `${statement.lead} ${statement.rest}`,
    '',
    `${rose}${evidenceLine(evidence)}`,
    ...(patch ? [patch] : []),
    `Why: ${why}`,
    '',
    `See why and acknowledge: ${url}`,
    '',
    ...warnings,
    ...(demo ? ['', 'Demo: places, people and figures are invented.'] : []),
  ].join('\n')
  const html = letterLayout({
    title: statement.rest,
    markWord: severity,
    preheader: evidenceLine(evidence),
    bodyHtml: letterParagraph(escapeHtml(`${rose}${evidenceLine(evidence)}`)) + (patch ? letterParagraph(escapeHtml(patch)) : '') + letterParagraph(escapeHtml(`Why: ${why}`)),
    button: { label: 'See why and acknowledge', url },
    footer: warnings.join('\n'),
    headNote: `alert ${alert.id}, view of ${evidence.day}, ${age} old`,
    demo,
  })
  return { subject: `${demo ? '[demo] ' : ''}${name}: ${severity}${kind === 'rose' ? ', rose' : ''}, view ${age} old`, text, html }
}
