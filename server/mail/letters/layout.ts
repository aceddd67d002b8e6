import { severityMarks } from './severity-marks'

export interface LetterFrame {
  title: string
  /** A word above the title, such as a severity, with its mark. */
  markWord?: string
  /** What a mailbox shows beside the subject. */
  preheader: string
  /** Already escaped. */
  bodyHtml: string
  button?: { label: string; url: string }
  /** Plain text; lines become lines. */
  footer: string
  demo: boolean
  /** Small words at the right of the head, such as the alert's number and the view's age. */
  headNote?: string
}

const sans = `'Atkinson Hyperlegible Next','Segoe UI',Helvetica,Arial,sans-serif`
const ink = '#12221c'
const ink2 = '#3d4c45'
const ink3 = '#55635d'
const paper = '#f7f3eb'
const sheet = '#fdfbf6'
const rule = '#ccc9be'
const accent = '#04596e'
const ember = '#943f19'

export function escapeHtml(text: string): string {
  const marks: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }
  return text.replace(/[&<>"']/g, (mark) => marks[mark] ?? mark)
}

/** A paragraph in the letter's own type; `html` is already escaped. */
export function letterParagraph(html: string): string {
  return `<p style="margin:0 0 14px;font:400 16px/1.45 ${sans};color:${ink2}">${html}</p>`
}

/** The common frame of every letter: paper and ink, a graduated rule, one filled button. Styles stand in the tags, as mail needs. */
export function letterLayout(frame: LetterFrame): string {
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light"><title>${escapeHtml(frame.title)}</title></head>
<body style="margin:0;padding:0;background:${paper};color:${ink}">
<div style="display:none;max-height:0;overflow:hidden">${escapeHtml(frame.preheader)}</div>
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="background:${paper}"><tr><td align="center" style="padding:24px 12px">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="max-width:600px;background:${sheet};border:1px solid ${rule}"><tr><td style="padding:20px 24px 24px">
${head(frame)}
${graduatedRule()}
${markWord(frame.markWord)}<h1 style="margin:0 0 8px;font:700 24px/1.2 ${sans};color:${ink}">${escapeHtml(frame.title)}</h1>
${frame.bodyHtml}
${button(frame.button)}<p style="margin:18px 0 0;font:400 13px/1.45 ${sans};color:${ink3}">${escapeHtml(frame.footer).replace(/\n/g, '<br>')}</p>
</td></tr></table>
</td></tr></table>
</body></html>
`
}

function head({ demo, headNote }: LetterFrame): string {
  const demoWord = demo
    ? `<span style="display:inline-block;margin-left:14px;padding:2px 7px;border:1px dashed ${ink3};font:400 12px/1.3 'Atkinson Hyperlegible Mono',Consolas,monospace;color:${ink2};vertical-align:middle">demo</span>`
    : ''
  return `<table role="presentation" width="100%" cellpadding="0" cellspacing="0"><tr>
<td style="font:700 18px/1.2 ${sans};color:${ink};white-space:nowrap">${productMark}<span style="vertical-align:middle">Offing</span>${demoWord}</td>
<td align="right" style="font:400 12px/1.4 ${sans};color:${ink3}">${escapeHtml(headNote ?? '')}</td></tr></table>`
}

// A half-disc over the horizon, made of boxes: mail programs draw neither SVG nor data pictures.
const productMark =
  `<span style="display:inline-block;width:22px;margin-right:9px;vertical-align:middle;font-size:0;line-height:0;text-align:center">` +
  `<span style="display:inline-block;width:12px;height:6px;background:${ink};border-radius:6px 6px 0 0"></span>` +
  `<span style="display:block;height:2px;margin-top:2px;background:${ink}"></span>` +
  `<span style="display:block;height:2px;margin:3px 4px 0;background:${ink}"></span></span>`

function graduatedRule(): string {
  const segments = Array.from({ length: 24 }, (_, at) => `<td style="height:3px;background:${at % 2 === 0 ? ink : sheet};font-size:0;line-height:0">&nbsp;</td>`)
  return `<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="margin:14px 0 18px;border:1px solid ${ink};table-layout:fixed"><tr>${segments.join('')}</tr></table>`
}

function markWord(word: string | undefined): string {
  if (!word) return ''
  const mark = severityMarks(ember)[word] ?? ''
  return `<p style="margin:0 0 4px;font:700 15px/1.3 ${sans};color:${ember}">${mark}${escapeHtml(word)}</p>\n`
}

function button(wanted: LetterFrame['button']): string {
  if (!wanted) return ''
  const url = escapeHtml(wanted.url)
  return `<table role="presentation" cellpadding="0" cellspacing="0" style="margin:18px 0 0"><tr><td style="background:${accent};border-radius:2px">
<a href="${url}" style="display:inline-block;padding:12px 20px;font:700 16px/1.25 ${sans};color:#fcfaf4;text-decoration:none">${escapeHtml(wanted.label)}</a></td></tr></table>
`
}
