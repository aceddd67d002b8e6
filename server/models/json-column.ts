import { DataTypes, type Model, type ModelAttributeColumnOptions } from 'sequelize'

/**
 * A column of JSON text. Sequelize parses JSON only where the table says so, which SQLite's TEXT does not, and its
 * first reads race for that knowledge; so it is parsed here. Reads with `raw: true` get the text.
 */
export function jsonColumn(name: string, allowNull: boolean): ModelAttributeColumnOptions {
  return {
    type: DataTypes.JSON,
    allowNull,
    get(this: Model) {
      const value: unknown = this.getDataValue(name)
      return typeof value === 'string' ? (JSON.parse(value) as unknown) : value
    },
  }
}
