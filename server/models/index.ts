import type { ModelAttributes } from 'sequelize'
import type { Database } from '../db'
import { defineUser } from './user'
import { defineSession } from './session'
import { defineToken } from './token'
import { defineInvitation } from './invitation'
import { definePasswordReset } from './password-reset'
import { defineFeed } from './feed'
import { defineFile } from './file'
import { defineLayer } from './layer'
import { defineRegion } from './region'
import { defineGeometry } from './geometry'
import { defineRule } from './rule'
import { defineRuleVersion } from './rule-version'
import { defineEvent } from './event'
import { defineAlert } from './alert'
import { defineAlertEntry } from './alert-entry'
import { defineSubscription } from './subscription'
import { defineLetter } from './letter'
import { defineJob } from './job'
import { defineAuditEntry } from './audit-entry'

/** What is not given at creation is null in the record too, as it is in the table; else a fresh record would miss fields. */
function unsetIsNull(attributes: ModelAttributes): void {
  for (const attribute of Object.values(attributes)) {
    if (typeof attribute === 'object' && 'allowNull' in attribute && attribute.allowNull && attribute.defaultValue === undefined) attribute.defaultValue = null
  }
}

function define(db: Database) {
  const { sequelize } = db
  sequelize.addHook('beforeDefine', unsetIsNull)
  const models = {
    users: defineUser(sequelize),
    sessions: defineSession(sequelize),
    tokens: defineToken(sequelize),
    invitations: defineInvitation(sequelize),
    passwordResets: definePasswordReset(sequelize),
    feeds: defineFeed(sequelize),
    files: defineFile(sequelize),
    layers: defineLayer(sequelize),
    regions: defineRegion(sequelize),
    geometries: defineGeometry(sequelize),
    rules: defineRule(sequelize),
    ruleVersions: defineRuleVersion(sequelize),
    events: defineEvent(sequelize),
    alerts: defineAlert(sequelize),
    alertEntries: defineAlertEntry(sequelize),
    subscriptions: defineSubscription(sequelize),
    letters: defineLetter(sequelize),
    jobs: defineJob(sequelize),
    audit: defineAuditEntry(sequelize),
  }
  models.rules.hasMany(models.ruleVersions, { foreignKey: 'ruleId', as: 'versions' })
  models.regions.hasMany(models.geometries, { foreignKey: 'regionId', as: 'geometries', constraints: false })
  models.alerts.hasMany(models.alertEntries, { foreignKey: 'alertId', as: 'entries' })
  models.files.hasMany(models.layers, { foreignKey: 'fileId', as: 'layers' })
  return models
}

export type Models = ReturnType<typeof define>

const defined = new WeakMap<Database, Models>()

/** The models of one database, defined once. Writing needs the transaction of `db.write`. */
export function modelsOf(db: Database): Models {
  const known = defined.get(db) ?? define(db)
  defined.set(db, known)
  return known
}
