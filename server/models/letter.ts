import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { Letter } from '../../shared/schemas/duty'

export type LetterState = Letter['state']

export interface LetterRow {
  id: number
  kind: string
  dedupeKey: string
  userId: number | null
  toAddress: string
  alertId: number | null
  messageId: string
  inReplyTo: string | null
  subject: string
  textPart: string
  htmlPart: string | null
  state: LetterState
  attempts: number
  nextAttemptAt: number | null
  deliveredAt: number | null
  lastError: string | null
  createdAt: number
}

export interface LetterRecord extends Model<LetterRow, Optional<LetterRow, 'id' | 'userId' | 'alertId' | 'inReplyTo' | 'htmlPart' | 'attempts' | 'nextAttemptAt' | 'deliveredAt' | 'lastError'>>, LetterRow {}

export function defineLetter(sequelize: Sequelize) {
  return sequelize.define<LetterRecord>(
    'letter',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      kind: { type: DataTypes.TEXT, allowNull: false },
      dedupeKey: { type: DataTypes.TEXT, allowNull: false },
      userId: { type: DataTypes.INTEGER, allowNull: true },
      toAddress: { type: DataTypes.TEXT, allowNull: false },
      alertId: { type: DataTypes.INTEGER, allowNull: true },
      messageId: { type: DataTypes.TEXT, allowNull: false },
      inReplyTo: { type: DataTypes.TEXT, allowNull: true },
      subject: { type: DataTypes.TEXT, allowNull: false },
      textPart: { type: DataTypes.TEXT, allowNull: false },
      htmlPart: { type: DataTypes.TEXT, allowNull: true },
      state: { type: DataTypes.TEXT, allowNull: false },
      attempts: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      nextAttemptAt: { type: DataTypes.INTEGER, allowNull: true },
      deliveredAt: { type: DataTypes.INTEGER, allowNull: true },
      lastError: { type: DataTypes.TEXT, allowNull: true },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
    },
    { tableName: 'letters', underscored: true, timestamps: false },
  )
}
