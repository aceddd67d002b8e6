import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { Role } from '../../shared/permissions'
import { jsonColumn } from './json-column'

export interface InvitationRow {
  id: number
  email: string
  name: string
  roles: Role[]
  tokenHash: string
  createdBy: number | null
  createdAt: number
  expiresAt: number
  acceptedAt: number | null
}

export interface InvitationRecord extends Model<InvitationRow, Optional<InvitationRow, 'id' | 'createdBy' | 'acceptedAt'>>, InvitationRow {}

export function defineInvitation(sequelize: Sequelize) {
  return sequelize.define<InvitationRecord>(
    'invitation',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      email: { type: DataTypes.TEXT, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      roles: jsonColumn('roles', false),
      tokenHash: { type: DataTypes.TEXT, allowNull: false },
      createdBy: { type: DataTypes.INTEGER, allowNull: true },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      expiresAt: { type: DataTypes.INTEGER, allowNull: false },
      acceptedAt: { type: DataTypes.INTEGER, allowNull: true },
    },
    { tableName: 'invitations', underscored: true, timestamps: false },
  )
}
