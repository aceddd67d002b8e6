import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'

export interface SessionRow {
  id: number
  userId: number
  refreshHash: string
  previousHash: string | null
  previousUntil: number | null
  createdAt: number
  expiresAt: number
  revokedAt: number | null
}

export interface SessionRecord extends Model<SessionRow, Optional<SessionRow, 'id' | 'previousHash' | 'previousUntil' | 'revokedAt'>>, SessionRow {}

export function defineSession(sequelize: Sequelize) {
  return sequelize.define<SessionRecord>(
    'session',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      userId: { type: DataTypes.INTEGER, allowNull: false },
      refreshHash: { type: DataTypes.TEXT, allowNull: false },
      previousHash: { type: DataTypes.TEXT, allowNull: true },
      previousUntil: { type: DataTypes.INTEGER, allowNull: true },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      expiresAt: { type: DataTypes.INTEGER, allowNull: false },
      revokedAt: { type: DataTypes.INTEGER, allowNull: true },
    },
    { tableName: 'sessions', underscored: true, timestamps: false },
  )
}
