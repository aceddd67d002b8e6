import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { Severity } from '../../shared/schemas/common'
import type { eventPhases } from '../../shared/schemas/series'

export type Phase = (typeof eventPhases)[number]

export interface EventRow {
  id: number
  regionId: number
  geometryId: number
  feedId: number
  ruleId: number
  ruleVersion: number
  baselineId: number | null
  phase: Phase
  lastUnflaggedBefore: number | null
  firstFlagged: number
  lastFlagged: number
  firstUnflaggedAfter: number | null
  triggerDay: number
  peakDay: number
  peakValue: number
  peakTimesUsual: number | null
  severity: Severity
  usableViews: number
  /** Why it ended, where that was not what the water did. */
  endedBecause: string | null
}

export interface EventRecord extends Model<EventRow, Optional<EventRow, 'id' | 'baselineId' | 'lastUnflaggedBefore' | 'firstUnflaggedAfter' | 'peakTimesUsual' | 'endedBecause'>>, EventRow {}

export function defineEvent(sequelize: Sequelize) {
  return sequelize.define<EventRecord>(
    'event',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      regionId: { type: DataTypes.INTEGER, allowNull: false },
      geometryId: { type: DataTypes.INTEGER, allowNull: false },
      feedId: { type: DataTypes.INTEGER, allowNull: false },
      ruleId: { type: DataTypes.INTEGER, allowNull: false },
      ruleVersion: { type: DataTypes.INTEGER, allowNull: false },
      baselineId: { type: DataTypes.INTEGER, allowNull: true },
      phase: { type: DataTypes.TEXT, allowNull: false },
      lastUnflaggedBefore: { type: DataTypes.INTEGER, allowNull: true },
      firstFlagged: { type: DataTypes.INTEGER, allowNull: false },
      lastFlagged: { type: DataTypes.INTEGER, allowNull: false },
      firstUnflaggedAfter: { type: DataTypes.INTEGER, allowNull: true },
      triggerDay: { type: DataTypes.INTEGER, allowNull: false },
      peakDay: { type: DataTypes.INTEGER, allowNull: false },
      peakValue: { type: DataTypes.REAL, allowNull: false },
      peakTimesUsual: { type: DataTypes.REAL, allowNull: true },
      severity: { type: DataTypes.TEXT, allowNull: false },
      usableViews: { type: DataTypes.INTEGER, allowNull: false },
      endedBecause: { type: DataTypes.TEXT, allowNull: true },
    },
    { tableName: 'events', underscored: true, timestamps: false },
  )
}
