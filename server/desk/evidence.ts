import { ruleText } from '../../shared/rule-text'
import { dateOf } from '../../shared/science/local-day'
import type { Evidence } from '../../shared/schemas/alerts'
import type { EvidencePatch } from '../../shared/schemas/patches'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { Subject } from '../pipeline/active-rule'
import type { Judged } from '../pipeline/keep-standing'
import { maskText } from '../pipeline/masks/mask-in-force'
import { softwareVersion } from '../software-version'

interface LayerSource {
  fileId: number
  fileName: string
  checksum: string
  processingVersion: string
  maskKind: string
  maskVersion: number
  formula: string | null
}

/** What a judgement found, with the largest patch of the days that may be told of. */
export interface JudgedToTell extends Judged {
  largestPatches: ReadonlyMap<number, EvidencePatch | null>
}

/** What one day's view says, with everything needed to compute it again. */
export async function evidenceOn(context: Context, tx: Transaction, subject: Subject, judged: JudgedToTell, day: number): Promise<Evidence> {
  const view = judged.views.find((one) => one.day === day)!
  const verdict = judged.judgement.judged.find((one) => one.day === day)!
  const source = (await context.db.first<LayerSource>(
    `SELECT l.file_id AS fileId, f.name AS fileName, l.checksum, p.processing_version AS processingVersion, m.kind AS maskKind, m.version AS maskVersion, p.formula
     FROM summaries s JOIN layers l ON l.id = s.layer_id JOIN files f ON f.id = l.file_id
       JOIN provenances p ON p.id = s.provenance_id JOIN masks m ON m.id = p.mask_id
     WHERE s.geometry_id = $geometryId AND s.feed_id = $feedId AND s.day = $day`,
    { geometryId: subject.geometry.id, feedId: subject.feed.id, day },
    tx,
  ))!
  const baseline = judged.baselineId === null ? null : await context.db.first<{ version: number; years: string }>('SELECT version, years FROM baselines WHERE id = $id', { id: judged.baselineId }, tx)
  const { feed, rule, definition } = subject
  const largestPatch = judged.largestPatches.get(day)
  return {
    statistic: definition.statistic,
    unit: feed.unit,
    value: verdict.value!,
    usual: verdict.usual,
    p10: verdict.p10,
    p90: verdict.p90,
    threshold: verdict.threshold,
    timesUsual: verdict.timesUsual,
    coverage: view.coverage!,
    coverageFloor: definition.coverageFloor,
    wholeValid: view.wholeValid,
    cells: view.cells,
    day: dateOf(day),
    layerId: view.layerId,
    layerObservedAt: new Date(view.observedAt).toISOString(),
    fileId: source.fileId,
    fileName: source.fileName,
    checksum: source.checksum,
    processingVersion: source.processingVersion,
    ruleId: rule.id,
    ruleVersion: subject.ruleVersion,
    ruleText: ruleText(definition, feed.unit),
    baselineVersion: baseline?.version ?? null,
    baselineYears: baseline ? (JSON.parse(baseline.years) as number[]) : [],
    geometryVersion: subject.geometry.version,
    waterMask: maskText({ kind: source.maskKind, version: source.maskVersion }),
    softwareVersion,
    formula: source.formula,
    ...(largestPatch === undefined ? {} : { largestPatch }),
  }
}
