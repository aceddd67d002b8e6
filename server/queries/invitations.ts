import { Op } from 'sequelize'
import type { Context } from '../context'

export function invitationsBefore(context: Context, beforeId: number, limit: number) {
  return context.models.invitations.findAll({ where: { id: { [Op.lt]: beforeId } }, order: [['id', 'DESC']], limit })
}
