import { Op, type Model, type ModelStatic, type WhereOptions } from 'sequelize'

/** Rows in order of id, above an id. */
export async function rowsAfter<M extends Model>(model: ModelStatic<M>, after: number, limit: number): Promise<M[]> {
  return model.findAll({ where: { id: { [Op.gt]: after } } as WhereOptions, order: [['id', 'ASC']], limit })
}

/** Rows newest first, below an id. */
export async function rowsBefore<M extends Model>(model: ModelStatic<M>, before: number, limit: number, where: WhereOptions = {}): Promise<M[]> {
  return model.findAll({ where: { ...where, id: { [Op.lt]: before } } as WhereOptions, order: [['id', 'DESC']], limit })
}
