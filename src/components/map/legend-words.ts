import type { Colouring } from '../../../shared/colouring'
import type { LayerLegend } from '../../../shared/schemas/layer-legend'
import { percent } from '../../lib/format'

/** Where the ends of a scale come from, when they are not those of a quantity Offing knows. */
export function rangeWords({ rangeFrom }: Colouring): string[] {
  if (rangeFrom === 'valid range') return ["from the feed's valid range"]
  return rangeFrom === 'layer' ? ['fitted to this layer'] : []
}

/** "61 % of cells: CLOUD 48 %, 13 % without a reason in the file". */
export function missingWords({ cells, valid, hidden, looked }: LayerLegend): string {
  const missing = cells - valid
  if (missing <= 0) return 'no cell'
  const whole = `${looked === 'strips' ? 'about ' : ''}${percent(missing / cells)} of cells`
  if (hidden.length === 0) return `${whole}, land among them; the file says no more`
  const reasons = hidden.slice(0, 4).map((one) => `${one.reason} ${percent(one.cells / cells)}`)
  const rest = hidden.length > 4 ? ', other flags' : ''
  // Reasons may overlap, so what has none is known only where they do not.
  const explained = hidden.reduce((sum, one) => sum + one.cells, 0)
  const unexplained = explained < missing ? `; ${percent((missing - explained) / cells)} or more without a value in the file` : ''
  return `${whole}: ${reasons.join(', ')}${rest}${unexplained}`
}
