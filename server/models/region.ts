import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { z } from 'zod'
import type { contact, site } from '../../shared/schemas/regions'
import { jsonColumn } from './json-column'

export type Site = z.infer<typeof site>
export type Contact = z.infer<typeof contact>

export interface RegionRow {
  id: number
  name: string
  timeZone: string
  site: Site | null
  contacts: Contact[]
  shoreBufferKm: number
  opticallyComplex: boolean
  geometryId: number | null
  wantedFeedId: number | null
  createdBy: number | null
  createdAt: number
  retiredAt: number | null
  version: number
}

export interface RegionRecord extends Model<RegionRow, Optional<RegionRow, 'id' | 'site' | 'geometryId' | 'wantedFeedId' | 'createdBy' | 'retiredAt' | 'version'>>, RegionRow {}

export function defineRegion(sequelize: Sequelize) {
  return sequelize.define<RegionRecord>(
    'region',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      name: { type: DataTypes.TEXT, allowNull: false },
      timeZone: { type: DataTypes.TEXT, allowNull: false },
      site: jsonColumn('site', true),
      contacts: jsonColumn('contacts', false),
      shoreBufferKm: { type: DataTypes.REAL, allowNull: false },
      opticallyComplex: { type: DataTypes.BOOLEAN, allowNull: false },
      geometryId: { type: DataTypes.INTEGER, allowNull: true },
      wantedFeedId: { type: DataTypes.INTEGER, allowNull: true },
      createdBy: { type: DataTypes.INTEGER, allowNull: true },
      createdAt: { type: DataTypes.INTEGER, allowNull: false },
      retiredAt: { type: DataTypes.INTEGER, allowNull: true },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { tableName: 'regions', underscored: true, timestamps: false },
  )
}
