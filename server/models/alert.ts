import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { Severity } from '../../shared/schemas/common'
import type { alertStates, Evidence, notBloomCauses, outcomes } from '../../shared/schemas/alerts'
import type { Phase } from './event'
import { jsonColumn } from './json-column'

export type AlertState = (typeof alertStates)[number]
export type Outcome = (typeof outcomes)[number]
export type Cause = (typeof notBloomCauses)[number]

export interface AlertRow {
  id: number
  regionId: number
  feedId: number
  ruleId: number
  eventId: number | null
  state: AlertState
  phase: Phase
  severity: Severity
  triggerDay: number
  raisedAt: number
  evidence: Evidence
  acknowledgedBy: number | null
  acknowledgedAt: number | null
  assigneeId: number | null
  holdUntil: number | null
  holdReason: string | null
  outcome: Outcome | null
  cause: Cause | null
  closedBy: number | null
  closedAt: number | null
  version: number
}

export interface AlertRecord extends Model<AlertRow, Optional<AlertRow, 'id' | 'eventId' | 'acknowledgedBy' | 'acknowledgedAt' | 'assigneeId' | 'holdUntil' | 'holdReason' | 'outcome' | 'cause' | 'closedBy' | 'closedAt' | 'version'>>, AlertRow {}

export function defineAlert(sequelize: Sequelize) {
  return sequelize.define<AlertRecord>(
    'alert',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      regionId: { type: DataTypes.INTEGER, allowNull: false },
      feedId: { type: DataTypes.INTEGER, allowNull: false },
      ruleId: { type: DataTypes.INTEGER, allowNull: false },
      eventId: { type: DataTypes.INTEGER, allowNull: true },
      state: { type: DataTypes.TEXT, allowNull: false },
      phase: { type: DataTypes.TEXT, allowNull: false },
      severity: { type: DataTypes.TEXT, allowNull: false },
      triggerDay: { type: DataTypes.INTEGER, allowNull: false },
      raisedAt: { type: DataTypes.INTEGER, allowNull: false },
      evidence: jsonColumn('evidence', false),
      acknowledgedBy: { type: DataTypes.INTEGER, allowNull: true },
      acknowledgedAt: { type: DataTypes.INTEGER, allowNull: true },
      assigneeId: { type: DataTypes.INTEGER, allowNull: true },
      holdUntil: { type: DataTypes.INTEGER, allowNull: true },
      holdReason: { type: DataTypes.TEXT, allowNull: true },
      outcome: { type: DataTypes.TEXT, allowNull: true },
      cause: { type: DataTypes.TEXT, allowNull: true },
      closedBy: { type: DataTypes.INTEGER, allowNull: true },
      closedAt: { type: DataTypes.INTEGER, allowNull: true },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { tableName: 'alerts', underscored: true, timestamps: false },
  )
}
