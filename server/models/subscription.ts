import { DataTypes, type Model, type Optional, type Sequelize } from 'sequelize'
import type { Severity } from '../../shared/schemas/common'
import type { Subscription } from '../../shared/schemas/duty'

export type Delivery = Subscription['delivery']

export interface SubscriptionRow {
  id: number
  userId: number
  allRegions: boolean
  minimumSeverity: Severity
  delivery: Delivery
  pausedUntil: number | null
  version: number
}

export interface SubscriptionRecord extends Model<SubscriptionRow, Optional<SubscriptionRow, 'id' | 'pausedUntil' | 'version'>>, SubscriptionRow {}

export function defineSubscription(sequelize: Sequelize) {
  return sequelize.define<SubscriptionRecord>(
    'subscription',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      userId: { type: DataTypes.INTEGER, allowNull: false },
      allRegions: { type: DataTypes.BOOLEAN, allowNull: false },
      minimumSeverity: { type: DataTypes.TEXT, allowNull: false },
      delivery: { type: DataTypes.TEXT, allowNull: false },
      pausedUntil: { type: DataTypes.INTEGER, allowNull: true },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { tableName: 'subscriptions', underscored: true, timestamps: false },
  )
}
