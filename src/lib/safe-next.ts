/** Where to go after signing in: only a path of this program, whatever the address says. */
export function safeNext(next: string | null): string {
  if (!next || !next.startsWith('/')) return '/'
  const at = new URL(next, 'https://offing.invalid')
  return at.origin === 'https://offing.invalid' && !next.startsWith('//') ? at.pathname + at.search + at.hash : '/'
}
