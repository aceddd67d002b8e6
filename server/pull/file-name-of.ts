/** What a fetched file is called: the last part of the path it was asked under, or its host where there is none. */
export function fileNameOf(url: URL): string {
  const last = url.pathname.split('/').filter(Boolean).at(-1) ?? url.hostname
  return (decoded(last).replace(/[\p{Cc}/\\]/gu, '_') || url.hostname).slice(-200)
}

function decoded(text: string): string {
  try {
    return decodeURIComponent(text)
  } catch {
    return text
  }
}
