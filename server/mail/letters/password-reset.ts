import { escapeHtml, letterLayout, letterParagraph } from './layout'

export function passwordResetLetter({ name, url, minutes, demo }: { name: string; url: string; minutes: number; demo: boolean }) {
  const subject = 'Set a new password for Offing'
  const why = 'Somebody asked for a new password for this account. Setting one signs out every device.'
  const expiry = `The link works for ${minutes} minutes and once. If it was not you, leave this letter: the password stays as it is.`
  return {
    subject,
    text: `Hello ${name},\n\n${why}\n\nSet a new password:\n${url}\n\n${expiry}\n`,
    html: letterLayout({
      title: subject,
      preheader: why,
      bodyHtml: letterParagraph(`Hello ${escapeHtml(name)}. ${why}`),
      button: { label: 'Set a new password', url },
      footer: expiry,
      demo,
    }),
  }
}
