import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { FeedProposal } from '../../shared/schemas/feeds'
import type { FileItem, FileReport, FileStatus } from '../../shared/schemas/files'
import { jsonColumn } from './json-column'

export type Refusal = { code: string; message: string; details: Record<string, unknown> }

export interface FileRow {
  id: number
  name: string
  checksum: string
  bytes: number
  status: FileStatus
  origin: FileItem['origin']
  uploadedBy: number | null
  receivedAt: number
  processedAt: number | null
  feedId: number | null
  observedAt: number | null
  report: FileReport | null
  proposal: FeedProposal | null
  waitingFor: string | null
  refusal: Refusal | null
  /** When its server says it was last changed. */
  modifiedAt: number | null
  /** The older file whose place it takes: wholly, or only at the instants both hold. */
  replaces: number | null
  replacesWholly: boolean
}

export interface FileRecord extends Model<FileRow, Optional<FileRow, 'id' | 'uploadedBy' | 'processedAt' | 'feedId' | 'observedAt' | 'report' | 'proposal' | 'waitingFor' | 'refusal' | 'modifiedAt' | 'replaces' | 'replacesWholly'>>, FileRow {}

export function defineFile(sequelize: Sequelize) {
  return sequelize.define<FileRecord>(
    'file',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      name: { type: DataTypes.TEXT, allowNull: false },
      checksum: { type: DataTypes.TEXT, allowNull: false },
      bytes: { type: DataTypes.INTEGER, allowNull: false },
      status: { type: DataTypes.TEXT, allowNull: false },
      origin: { type: DataTypes.TEXT, allowNull: false },
      uploadedBy: { type: DataTypes.INTEGER, allowNull: true },
      receivedAt: { type: DataTypes.INTEGER, allowNull: false },
      processedAt: { type: DataTypes.INTEGER, allowNull: true },
      feedId: { type: DataTypes.INTEGER, allowNull: true },
      observedAt: { type: DataTypes.INTEGER, allowNull: true },
      report: jsonColumn('report', true),
      proposal: jsonColumn('proposal', true),
      waitingFor: { type: DataTypes.TEXT, allowNull: true },
      refusal: jsonColumn('refusal', true),
      modifiedAt: { type: DataTypes.INTEGER, allowNull: true },
      replaces: { type: DataTypes.INTEGER, allowNull: true },
      replacesWholly: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
    },
    { tableName: 'files', underscored: true, timestamps: false },
  )
}
