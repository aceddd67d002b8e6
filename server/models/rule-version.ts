import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { RuleDefinition } from '../../shared/science/rule'
import { jsonColumn } from './json-column'

export interface RuleVersionRow {
  id: number
  ruleId: number
  version: number
  definition: RuleDefinition
  note: string
  createdBy: number | null
  createdAt: number
  activatedAt: number | null
}

export interface RuleVersionRecord extends Model<RuleVersionRow, Optional<RuleVersionRow, 'id' | 'createdBy' | 'activatedAt'>>, RuleVersionRow {}

export function defineRuleVersion(sequelize: Sequelize) {
  return sequelize.define<RuleVersionRecord>(
    'ruleVersion',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      ruleId: { type: DataTypes.INTEGER, allowNull: false },
      version: { type: DataTypes.INTEGER, allowNull: false },
      definition: jsonColumn('definition', false),
      note: { type: DataTypes.TEXT, allowNull: false },
      createdBy: { type: DataTypes.INTEGER, allowNull: true },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      activatedAt: { type: DataTypes.INTEGER, allowNull: true },
    },
    { tableName: 'rule_versions', underscored: true, timestamps: false },
  )
}
