import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'

export interface PasswordResetRow {
  id: number
  userId: number
  tokenHash: string
  expiresAt: number
  usedAt: number | null
}

export interface PasswordResetRecord extends Model<PasswordResetRow, Optional<PasswordResetRow, 'id' | 'usedAt'>>, PasswordResetRow {}

export function definePasswordReset(sequelize: Sequelize) {
  return sequelize.define<PasswordResetRecord>(
    'passwordReset',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      userId: { type: DataTypes.INTEGER, allowNull: false },
      tokenHash: { type: DataTypes.TEXT, allowNull: false },
      expiresAt: { type: DataTypes.INTEGER, allowNull: false },
      usedAt: { type: DataTypes.INTEGER, allowNull: true },
    },
    { tableName: 'password_resets', underscored: true, timestamps: false },
  )
}
