import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { entryKinds } from '../../shared/schemas/alerts'

export type EntryKind = (typeof entryKinds)[number]

export interface AlertEntryRow {
  id: number
  alertId: number
  at: number
  kind: EntryKind
  userId: number | null
  text: string
}

export interface AlertEntryRecord extends Model<AlertEntryRow, Optional<AlertEntryRow, 'id' | 'userId'>>, AlertEntryRow {}

export function defineAlertEntry(sequelize: Sequelize) {
  return sequelize.define<AlertEntryRecord>(
    'alertEntry',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      alertId: { type: DataTypes.INTEGER, allowNull: false },
      at: { type: DataTypes.INTEGER, allowNull: false },
      kind: { type: DataTypes.TEXT, allowNull: false },
      userId: { type: DataTypes.INTEGER, allowNull: true },
      text: { type: DataTypes.TEXT, allowNull: false },
    },
    { tableName: 'alert_entries', underscored: true, timestamps: false },
  )
}
