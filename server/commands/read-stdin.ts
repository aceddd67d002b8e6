/** All of standard input as text, without the line end a terminal or `echo` adds. */
export async function readStdin(input: AsyncIterable<Uint8Array | string> = process.stdin): Promise<string> {
  const parts: Buffer[] = []
  for await (const part of input) parts.push(Buffer.from(part))
  return Buffer.concat(parts).toString('utf8').replace(/\r?\n$/, '')
}
