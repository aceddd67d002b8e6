/** Asks an Offing for a series and a map tile by turns, ten times a second, and says how long each took in ms. */
let text = ''
for await (const piece of process.stdin) text += piece
const { address, token, series, tiles, forMs } = JSON.parse(text)
const headers = { authorization: `Bearer ${token}` }
const took = { series: [], tiles: [] }
const end = performance.now() + forMs
for (let i = 0; performance.now() < end; i++) {
  const kind = i % 2 ? 'tiles' : 'series'
  const started = performance.now()
  const reply = await fetch(address + (kind === 'series' ? series : tiles[(i >> 1) % tiles.length]), { headers })
  await reply.arrayBuffer()
  if (!reply.ok) throw new Error(`${reply.status} for ${reply.url}`)
  took[kind].push(performance.now() - started)
  await new Promise((resolve) => setTimeout(resolve, Math.max(0, 50 - (performance.now() - started))))
}
console.log(JSON.stringify(took))
