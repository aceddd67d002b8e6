import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { Job } from '../../shared/schemas/running'
import { jsonColumn } from './json-column'

export type JobState = Job['state']
export type JobPayload = Record<string, number | string | null>

export interface JobRow {
  id: number
  kind: string
  jobKey: string
  subject: string
  payload: JobPayload
  state: JobState
  priority: number
  done: number
  total: number
  attempts: number
  runAfter: number | null
  leaseOwner: string | null
  leaseUntil: number | null
  lastError: string | null
  createdAt: number
  updatedAt: number
}

export interface JobRecord extends Model<JobRow, Optional<JobRow, 'id' | 'done' | 'total' | 'attempts' | 'runAfter' | 'leaseOwner' | 'leaseUntil' | 'lastError'>>, JobRow {}

export function defineJob(sequelize: Sequelize) {
  return sequelize.define<JobRecord>(
    'job',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      kind: { type: DataTypes.TEXT, allowNull: false },
      jobKey: { type: DataTypes.TEXT, allowNull: false },
      subject: { type: DataTypes.TEXT, allowNull: false },
      payload: jsonColumn('payload', false),
      state: { type: DataTypes.TEXT, allowNull: false },
      priority: { type: DataTypes.INTEGER, allowNull: false },
      done: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      total: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      attempts: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      runAfter: { type: DataTypes.INTEGER, allowNull: true },
      leaseOwner: { type: DataTypes.TEXT, allowNull: true },
      leaseUntil: { type: DataTypes.INTEGER, allowNull: true },
      lastError: { type: DataTypes.TEXT, allowNull: true },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      updatedAt: { type: DataTypes.INTEGER, allowNull: false },
    },
    { tableName: 'jobs', underscored: true, timestamps: false },
  )
}
