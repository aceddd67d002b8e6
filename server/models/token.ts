import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'

export interface TokenRow {
  id: number
  userId: number
  name: string
  tokenHash: string
  createdAt: number
  lastUsedAt: number | null
  expiresAt: number | null
  revokedAt: number | null
}

export interface TokenRecord extends Model<TokenRow, Optional<TokenRow, 'id' | 'lastUsedAt' | 'expiresAt' | 'revokedAt'>>, TokenRow {}

export function defineToken(sequelize: Sequelize) {
  return sequelize.define<TokenRecord>(
    'token',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      userId: { type: DataTypes.INTEGER, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      tokenHash: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      lastUsedAt: { type: DataTypes.INTEGER, allowNull: true },
      expiresAt: { type: DataTypes.INTEGER, allowNull: true },
      revokedAt: { type: DataTypes.INTEGER, allowNull: true },
    },
    { tableName: 'tokens', underscored: true, timestamps: false },
  )
}
