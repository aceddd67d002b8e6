import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import { jsonColumn } from './json-column'

export interface AuditEntryRow {
  id: number
  at: number
  userId: number | null
  action: string
  subject: string
  details: Record<string,unknown>
}

export interface AuditEntryRecord extends Model<AuditEntryRow, Optional<AuditEntryRow, 'id' | 'userId'>>, AuditEntryRow {}

export function defineAuditEntry(sequelize: Sequelize) {
  return sequelize.define<AuditEntryRecord>(
    'auditEntry',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      at: { type: DataTypes.INTEGER, allowNull: false },
      userId: { type: DataTypes.INTEGER, allowNull: true },
      action: { type: DataTypes.TEXT, allowNull: false },
      subject: { type: DataTypes.TEXT, allowNull: false },
      details: jsonColumn('details', false),
    },
    { tableName: 'audit', underscored: true, timestamps: false },
  )
}
