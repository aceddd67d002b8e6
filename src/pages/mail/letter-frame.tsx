/**
 * The letter's own HTML in a locked frame: no script runs in it, it cannot read this page, and a link a person follows
 * opens in place of the whole page, as from a mailbox.
 */
export function LetterFrame({ html, title }: { html: string; title: string }) {
  return (
    <iframe
      title={title}
      sandbox="allow-popups allow-top-navigation-by-user-activation"
      srcDoc={withBase(html)}
      className="h-[min(46rem,80dvh)] w-full border border-rule bg-[#fff]"
    />
  )
}

function withBase(html: string): string {
  const base = '<base target="_top">'
  return /<head[^>]*>/i.test(html) ? html.replace(/<head[^>]*>/i, (head) => head + base) : base + html
}
