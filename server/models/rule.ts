import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'

export interface RuleRow {
  id: number
  regionId: number
  feedId: number
  name: string
  activeVersion: number | null
  createdBy: number | null
  createdAt: number
  version: number
}

export interface RuleRecord extends Model<RuleRow, Optional<RuleRow, 'id' | 'activeVersion' | 'createdBy' | 'version'>>, RuleRow {}

export function defineRule(sequelize: Sequelize) {
  return sequelize.define<RuleRecord>(
    'rule',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      regionId: { type: DataTypes.INTEGER, allowNull: false },
      feedId: { type: DataTypes.INTEGER, allowNull: false },
      name: { type: DataTypes.TEXT, allowNull: false },
      activeVersion: { type: DataTypes.INTEGER, allowNull: true },
      createdBy: { type: DataTypes.INTEGER, allowNull: true },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { tableName: 'rules', underscored: true, timestamps: false },
  )
}
