import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { FeedProposal } from '../../shared/schemas/feeds'
import { jsonColumn } from './json-column'

export interface FeedRow {
  id: number
  name: string
  quantity: FeedProposal['quantity']
  variable: string
  unit: string | null
  scale: FeedProposal['scale']
  cadence: FeedProposal['cadence']
  stage: FeedProposal['stage']
  processingVersion: string
  validMin: number | null
  validMax: number | null
  fileNamePattern: string | null
  freshnessLimitHours: number
  silentAfterHours: number
  derivedFrom: number | null
  derivedSources: number[]
  hiddenFlags: string[]
  flagMeanings: string[]
  gapFilled: boolean
  storedLog10: boolean
  fileUnit: string | null
  formula: string | null
  formulaVersion: string | null
  retired: boolean
  createdAt: number
  version: number
}

export interface FeedRecord extends Model<FeedRow, Optional<FeedRow, 'id' | 'unit' | 'validMin' | 'validMax' | 'fileNamePattern' | 'derivedFrom' | 'derivedSources' | 'hiddenFlags' | 'flagMeanings' | 'gapFilled' | 'storedLog10' | 'fileUnit' | 'formula' | 'formulaVersion' | 'version'>>, FeedRow {}

export function defineFeed(sequelize: Sequelize) {
  return sequelize.define<FeedRecord>(
    'feed',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      name: { type: DataTypes.TEXT, allowNull: false },
      quantity: { type: DataTypes.TEXT, allowNull: false },
      variable: { type: DataTypes.TEXT, allowNull: false },
      unit: { type: DataTypes.TEXT, allowNull: true },
      scale: { type: DataTypes.TEXT, allowNull: false },
      cadence: { type: DataTypes.TEXT, allowNull: false },
      stage: { type: DataTypes.TEXT, allowNull: false },
      processingVersion: { type: DataTypes.TEXT, allowNull: false },
      validMin: { type: DataTypes.REAL, allowNull: true },
      validMax: { type: DataTypes.REAL, allowNull: true },
      fileNamePattern: { type: DataTypes.TEXT, allowNull: true },
      freshnessLimitHours: { type: DataTypes.REAL, allowNull: false },
      silentAfterHours: { type: DataTypes.REAL, allowNull: false },
      derivedFrom: { type: DataTypes.INTEGER, allowNull: true },
      hiddenFlags: { ...jsonColumn('hiddenFlags', false), defaultValue: [] },
      flagMeanings: { ...jsonColumn('flagMeanings', false), defaultValue: [] },
      gapFilled: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      storedLog10: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      fileUnit: { type: DataTypes.TEXT, allowNull: true },
      derivedSources: { ...jsonColumn('derivedSources', false), defaultValue: [] },
      formula: { type: DataTypes.TEXT, allowNull: true },
      formulaVersion: { type: DataTypes.TEXT, allowNull: true },
      retired: { type: DataTypes.BOOLEAN, allowNull: false },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { tableName: 'feeds', underscored: true, timestamps: false },
  )
}
