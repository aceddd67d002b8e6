import type { z } from 'zod'
import { ruleText } from '../../shared/rule-text'
import type { newRule, Rule, ruleActivation, ruleChange } from '../../shared/schemas/rules'
import { audit } from '../accounts/audit'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { RuleRecord } from '../models/rule'
import { queueJudging } from '../pipeline/queue-judging'
import { liveRegion } from './draw-region'

export async function presentRules(context: Context, rules: readonly RuleRecord[]): Promise<Rule[]> {
  const versions = await context.models.ruleVersions.findAll({ where: { ruleId: rules.map((rule) => rule.id) }, order: [['version', 'DESC']] })
  const feeds = new Map((await context.models.feeds.findAll()).map((feed) => [feed.id, feed.unit]))
  const people = new Map((await context.models.users.findAll({ attributes: ['id', 'name'] })).map((user) => [user.id, user.name]))
  return rules.map((rule) => ({
    id: rule.id,
    regionId: rule.regionId,
    feedId: rule.feedId,
    name: rule.name,
    activeVersion: rule.activeVersion,
    version: rule.version,
    versions: versions
      .filter((version) => version.ruleId === rule.id)
      .map((version) => ({
        version: version.version,
        definition: { ...version.definition, statistic: version.definition.statistic === 'departure' ? 'median' : version.definition.statistic },
        text: ruleText(version.definition, feeds.get(rule.feedId) ?? null),
        note: version.note,
        createdAt: new Date(version.createdAt).toISOString(),
        createdBy: version.createdBy === null ? null : (people.get(version.createdBy) ?? null),
        activatedAt: version.activatedAt === null ? null : new Date(version.activatedAt).toISOString(),
      })),
  }))
}

export async function rulesOf(context: Context, regionId: number): Promise<Rule[]> {
  const region = await context.models.regions.findByPk(regionId)
  if (!region) throw new ApiError('not-found', 'There is no such region.')
  return presentRules(context, await context.models.rules.findAll({ where: { regionId }, order: [['id', 'ASC']] }))
}

/** A new rule is a draft until it is switched on. */
export async function addRule(context: Context, person: Person, regionId: number, wanted: z.infer<typeof newRule>): Promise<Rule> {
  await liveRegion(context, undefined, regionId)
  const rule = await context.db.write(async (tx) => {
    if (!(await context.models.feeds.findByPk(wanted.feedId, { transaction: tx }))) throw new ApiError('not-valid', 'There is no such feed.')
    const record = await context.models.rules.create(
      { regionId, feedId: wanted.feedId, name: wanted.name, createdBy: person.id, createdAt: context.clock.now() },
      { transaction: tx },
    )
    await addVersion(context, tx, record, person, wanted.definition, 1)
    await audit(context, tx, { userId: person.id, action: 'rule:add', subject: `rule ${record.id}`, details: { regionId, name: wanted.name } })
    return record
  })
  return one(context, rule)
}

/** Another definition is a new version, a draft; the one in force stays until the new one is switched on. */
export async function changeRule(context: Context, person: Person, id: number, change: z.infer<typeof ruleChange>): Promise<Rule> {
  const rule = await context.db.write(async (tx) => {
    const record = await knownRule(context, tx, id)
    if (record.version !== change.version) throw new ApiError('stale-version', 'Somebody else changed this rule meanwhile. Look at it again.', { version: record.version })
    await record.update({ name: change.name ?? record.name, version: record.version + 1 }, { transaction: tx })
    if (change.definition) {
      const newest: number = (await context.models.ruleVersions.max('version', { where: { ruleId: id }, transaction: tx })) ?? 0
      await addVersion(context, tx, record, person, change.definition, newest + 1)
    }
    await audit(context, tx, { userId: person.id, action: 'rule:change', subject: `rule ${id}`, details: { definition: change.definition !== undefined } })
    return record
  })
  return one(context, rule)
}

export async function activateRule(context: Context, person: Person, id: number, { ruleVersion, note }: z.infer<typeof ruleActivation>): Promise<Rule> {
  const rule = await context.db.write(async (tx) => {
    const record = await knownRule(context, tx, id)
    const version = await context.models.ruleVersions.findOne({ where: { ruleId: id, version: ruleVersion }, transaction: tx })
    if (!version) throw new ApiError('not-valid', `This rule has no version ${ruleVersion}.`)
    await version.update({ activatedAt: context.clock.now(), note: note || version.note }, { transaction: tx })
    await record.update({ activeVersion: ruleVersion, version: record.version + 1 }, { transaction: tx })
    await queueJudging(context, tx, { regionId: record.regionId })
    await audit(context, tx, { userId: person.id, action: 'rule:activate', subject: `rule ${id}`, details: { ruleVersion, note } })
    return record
  })
  context.news.tell({ topic: 'regions', id: rule.regionId })
  context.wake()
  return one(context, rule)
}

async function addVersion(context: Context, tx: Transaction, rule: RuleRecord, person: Person, definition: z.infer<typeof newRule>['definition'], version: number) {
  await context.models.ruleVersions.create(
    { ruleId: rule.id, version, definition, note: '', createdBy: person.id, createdAt: context.clock.now() },
    { transaction: tx },
  )
}

async function knownRule(context: Context, tx: Transaction, id: number): Promise<RuleRecord> {
  const record = await context.models.rules.findByPk(id, { transaction: tx })
  if (!record) throw new ApiError('not-found', 'There is no such rule.')
  return record
}

async function one(context: Context, rule: RuleRecord): Promise<Rule> {
  return (await presentRules(context, [rule]))[0]!
}
