import type { Role } from '../../../shared/permissions'
import { escapeHtml, letterLayout, letterParagraph } from './layout'

export interface InvitationFacts {
  name: string
  invitedBy: string
  roles: readonly Role[]
  url: string
  days: number
  demo: boolean
}

export function invitationLetter({ name, invitedBy, roles, url, days, demo }: InvitationFacts) {
  const subject = `${invitedBy} invites you to Offing`
  const what = 'Offing watches satellite chlorophyll over waters somebody answers for, and tells when a view is unusual.'
  const role = `You are asked to join as ${roles.join(', ')}.`
  const expiry = `The link works for ${days} days and once. If you expected no such letter, leave it: nothing happens.`
  return {
    subject,
    text: `Hello ${name},\n\n${subject}. ${role}\n${what}\n\nAccept and choose a password:\n${url}\n\n${expiry}\n`,
    html: letterLayout({
      title: subject,
      preheader: role,
      bodyHtml: letterParagraph(`Hello ${escapeHtml(name)}. ${escapeHtml(role)}`) + letterParagraph(what),
      button: { label: 'Accept and choose a password', url },
      footer: expiry,
      demo,
    }),
  }
}
