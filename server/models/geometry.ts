import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { RegionGeometry } from '../../shared/schemas/regions'
import { jsonColumn } from './json-column'

export interface GeometryRow {
  id: number
  regionId: number
  version: number
  geometry: RegionGeometry
  repairs: string[]
  areaKm2: number
  shoreBufferKm: number
  west: number
  south: number
  east: number
  north: number
  centreLongitude: number
  createdBy: number | null
  createdAt: number
}

export interface GeometryRecord extends Model<GeometryRow, Optional<GeometryRow, 'id' | 'createdBy'>>, GeometryRow {}

export function defineGeometry(sequelize: Sequelize) {
  return sequelize.define<GeometryRecord>(
    'geometry',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      regionId: { type: DataTypes.INTEGER, allowNull: false },
      version: { type: DataTypes.INTEGER, allowNull: false },
      geometry: jsonColumn('geometry', false),
      repairs: jsonColumn('repairs', false),
      areaKm2: { type: DataTypes.REAL, allowNull: false },
      shoreBufferKm: { type: DataTypes.REAL, allowNull: false, defaultValue: 0 },
      west: { type: DataTypes.REAL, allowNull: false },
      south: { type: DataTypes.REAL, allowNull: false },
      east: { type: DataTypes.REAL, allowNull: false },
      north: { type: DataTypes.REAL, allowNull: false },
      centreLongitude: { type: DataTypes.REAL, allowNull: false },
      createdBy: { type: DataTypes.INTEGER, allowNull: true },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
    },
    { tableName: 'geometries', underscored: true, timestamps: false },
  )
}
