import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'

export interface UserRow {
  id: number
  email: string
  name: string
  passwordHash: string | null
  timeZone: string
  phone: string | null
  disabled: boolean
  createdAt: number
  lastSeenAt: number | null
  version: number
}

export interface UserRecord extends Model<UserRow, Optional<UserRow, 'id' | 'passwordHash' | 'phone' | 'lastSeenAt' | 'version'>>, UserRow {}

export function defineUser(sequelize: Sequelize) {
  return sequelize.define<UserRecord>(
    'user',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      email: { type: DataTypes.TEXT, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      passwordHash: { type: DataTypes.TEXT, allowNull: true },
      timeZone: { type: DataTypes.TEXT, allowNull: false },
      phone: { type: DataTypes.TEXT, allowNull: true },
      disabled: { type: DataTypes.BOOLEAN, allowNull: false },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      lastSeenAt: { type: DataTypes.INTEGER, allowNull: true },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { tableName: 'users', underscored: true, timestamps: false },
  )
}
