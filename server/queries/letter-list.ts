import { Op } from 'sequelize'
import type { Context } from '../context'
import type { LetterState } from '../models/letter'

/** Newest first. */
export function lettersBefore(context: Context, state: LetterState | undefined, beforeId: number, limit: number) {
  const where = { id: { [Op.lt]: beforeId }, ...(state ? { state } : {}) }
  return context.models.letters.findAll({ where, order: [['id', 'DESC']], limit })
}
