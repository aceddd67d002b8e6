import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'

export interface LayerRow {
  id: number
  feedId: number
  fileId: number
  gridId: number
  variable: string
  step: number
  observedAt: number
  endsAt: number | null
  hasClock: boolean
  checksum: string
  processingVersion: string
  stage: string
  receivedAt: number
  suspectAt: number | null
  suspectBy: number | null
  suspectNote: string | null
  /** When its file was made; null where nobody says. */
  producedAt: number | null
  /** The newer file that took its place. */
  replacedBy: number | null
  replacedAt: number | null
}

export interface LayerRecord extends Model<LayerRow, Optional<LayerRow, 'id' | 'endsAt' | 'suspectAt' | 'suspectBy' | 'suspectNote' | 'producedAt' | 'replacedBy' | 'replacedAt'>>, LayerRow {}

export function defineLayer(sequelize: Sequelize) {
  return sequelize.define<LayerRecord>(
    'layer',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      feedId: { type: DataTypes.INTEGER, allowNull: false },
      fileId: { type: DataTypes.INTEGER, allowNull: false },
      gridId: { type: DataTypes.INTEGER, allowNull: false },
      variable: { type: DataTypes.TEXT, allowNull: false },
      step: { type: DataTypes.INTEGER, allowNull: false },
      observedAt: { type: DataTypes.INTEGER, allowNull: false },
      endsAt: { type: DataTypes.INTEGER, allowNull: true },
      hasClock: { type: DataTypes.BOOLEAN, allowNull: false },
      checksum: { type: DataTypes.TEXT, allowNull: false },
      processingVersion: { type: DataTypes.TEXT, allowNull: false },
      stage: { type: DataTypes.TEXT, allowNull: false },
      receivedAt: { type: DataTypes.INTEGER, allowNull: false },
      suspectAt: { type: DataTypes.INTEGER, allowNull: true },
      suspectBy: { type: DataTypes.INTEGER, allowNull: true },
      suspectNote: { type: DataTypes.TEXT, allowNull: true },
      producedAt: { type: DataTypes.INTEGER, allowNull: true },
      replacedBy: { type: DataTypes.INTEGER, allowNull: true },
      replacedAt: { type: DataTypes.INTEGER, allowNull: true },
    },
    { tableName: 'layers', underscored: true, timestamps: false },
  )
}
