import { feedFields, type FeedProposal, type NewFeed } from '../../shared/schemas/feeds'
import { bandDistance, formulaOf, formulas, type Formula } from '../../shared/science/optics/formulas'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { FeedRecord } from '../models/feed'
import { newestReport } from '../queries/feed-files'
import { bandsOfReport } from './file-bands'

export type DerivedFields = FeedProposal & { derivedFrom: number; derivedSources: number[]; formula: string; formulaVersion: string }

/**
 * What a derived feed is, from the feed it is derived from and its formula: quantity and unit of the formula, cadence,
 * stage and version of the source. Refused where the source is no reflectance, the formula is unknown, or a band it needs is
 * neither in the source's files nor in a feed of its own.
 */
export async function derivedFields(context: Context, tx: Transaction, asked: NewFeed & { derivedFrom: number }): Promise<DerivedFields> {
  const source = await context.models.feeds.findByPk(asked.derivedFrom, { transaction: tx })
  if (!source) throw refused('derivedFrom', 'There is no feed to derive from.')
  if (source.quantity !== 'reflectance' || source.derivedFrom !== null) throw refused('derivedFrom', `${source.name} is no feed of reflectance: formulas work on reflectances.`)
  if (source.retired) throw refused('derivedFrom', `${source.name} is retired.`)
  const formula = formulaAsked(asked)
  const derivedSources = await sourcesFor(context, tx, source, formula, asked.derivedSources ?? [])
  const { cadence, stage, processingVersion, freshnessLimitHours, silentAfterHours, hiddenFlags, flagMeanings, gapFilled } = source
  const { variable, quantity, unit, scale } = formula
  const fields = { ...asked, variable, quantity, unit, scale, cadence, stage, processingVersion, freshnessLimitHours, silentAfterHours, hiddenFlags, flagMeanings, gapFilled, fileNamePattern: null }
  return { ...feedFields.parse(fields), derivedFrom: source.id, derivedSources, formula: formula.name, formulaVersion: formula.version }
}

function formulaAsked({ formula: name = '', formulaVersion: version = '' }: NewFeed): Formula {
  const formula = formulaOf(name, version)
  if (formula) return formula
  const versions = formulas.filter((one) => one.name === name).map((one) => one.version)
  if (versions.length > 0) throw refused('formulaVersion', `${name} has no version ${version}. It has ${versions.join(', ')}.`)
  throw refused('formula', `There is no formula ${name}. There are ${[...new Set(formulas.map((one) => one.name))].join(', ')}.`)
}

/** The feeds that give the formula's bands: the source alone where its files hold them all, else one more feed a missing band. */
async function sourcesFor(context: Context, tx: Transaction, source: FeedRecord, formula: Formula, named: readonly number[]): Promise<number[]> {
  const others = await otherFeeds(context, tx, source, named)
  const inFiles = await bandsOfFeed(context, tx, source)
  const sources = [source.id]
  const missing: string[] = []
  for (const band of formula.bands) {
    if (inFiles.some((nm) => bandDistance(band, nm) !== null)) continue
    const fitting: FeedRecord[] = []
    for (const feed of others) if ((await bandsOfFeed(context, tx, feed, true)).some((nm) => bandDistance(band, nm) !== null)) fitting.push(feed)
    const siblings = fitting.filter((feed) => feed.fileNamePattern === source.fileNamePattern)
    const [one, another] = siblings.length > 0 ? siblings : fitting
    if (another) throw refused('derivedSources', `More than one feed has the band of ${band.nm[0]} nm: ${fitting.map((feed) => feed.name).join(', ')}. Say which in derivedSources.`)
    if (one) sources.push(one.id)
    else missing.push(`${band.nm[0]} nm`)
  }
  if (missing.length > 0) {
    const needs = formula.bands.map((band) => `${band.nm[0]}`).join(', ')
    const unread = (await newestReport(context, tx, source)) === null ? ' No file of it has been read yet.' : ''
    throw refused('formula', `${formula.title}, version ${formula.version}, needs reflectance at ${needs} nm. Missing beside ${source.name}: ${[...new Set(missing)].join(', ')}.${unread}`)
  }
  return [...new Set(sources)]
}

async function otherFeeds(context: Context, tx: Transaction, source: FeedRecord, named: readonly number[]): Promise<FeedRecord[]> {
  const { cadence, id } = source
  const same = { quantity: 'reflectance' as const, cadence, retired: false, derivedFrom: null }
  const others = (await context.models.feeds.findAll({ where: same, order: [['id', 'ASC']], transaction: tx })).filter((feed) => feed.id !== id)
  const unknown = named.find((one) => one !== id && !others.some((feed) => feed.id === one))
  if (unknown !== undefined) throw refused('derivedSources', `Feed ${unknown} is no feed of reflectance with the cadence of ${source.name}.`)
  return named.length > 0 ? others.filter((feed) => named.includes(feed.id)) : others
}

/** Wavelengths in the newest file of a feed, or only that of its own variable; before any file came, the one in its name. */
async function bandsOfFeed(context: Context, tx: Transaction, feed: FeedRecord, ownOnly = false): Promise<number[]> {
  const report = await newestReport(context, tx, feed)
  const bands = bandsOfReport(report ?? []).filter((band) => !ownOnly || band.variable === feed.variable)
  const named = /(?:^|_)rrs_?(\d{3,4}(?:[._]\d+)?)/i.exec(feed.variable)
  return bands.length > 0 || !named ? bands.map((band) => band.wavelengthNm) : [Number(named[1]!.replace('_', '.'))]
}

function refused(field: string, message: string): ApiError {
  return new ApiError('not-valid', message, { fields: { [field]: message } })
}
