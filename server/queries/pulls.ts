import type { Database, Transaction } from '../db'
import type { FeedPull, PullFields, PullRun } from '../../shared/schemas/pulls'

export interface PullRow extends PullFields {
  feedId: number
  credentialsKind: NonNullable<FeedPull['settings']>['credentials']
  /** Encrypted. */
  credentials: string | null
  nextDueAt: number
  failuresInRow: number
  createdAt: number
  version: number
}

export interface RunRow extends Omit<PullRun, 'startedAt' | 'endedAt'> {
  startedAt: number
  endedAt: number
}

export interface PulledAddress {
  etag: string | null
  lastModified: string | null
  checksum: string
  /** The file it gave; null when that has been deleted, or was there before. */
  fileId: number | null
  askedAt: number
}

const pullColumns = `p.feed_id AS feedId, p.address, p.every_hours AS everyHours, p.at_minute AS atMinute, p.look_back_days AS lookBackDays,
  p.step_minutes AS stepMinutes, p.credentials_kind AS credentialsKind, p.credentials, p.next_due_at AS nextDueAt,
  p.failures_in_row AS failuresInRow, p.created_at AS createdAt, p.version`

export async function pullOf(db: Database, feedId: number, tx?: Transaction): Promise<PullRow | null> {
  return (await db.first<PullRow>(`SELECT ${pullColumns} FROM feed_pulls p WHERE p.feed_id = $feedId`, { feedId }, tx)) ?? null
}

/** Pulls of living feeds that are due, the longest due first. */
export async function duePulls(db: Database, now: number, tx?: Transaction): Promise<(PullRow & { feedName: string })[]> {
  return db.all(
    `SELECT ${pullColumns}, f.name AS feedName FROM feed_pulls p JOIN feeds f ON f.id = p.feed_id
     WHERE p.next_due_at <= $now AND f.retired = 0 ORDER BY p.next_due_at, p.feed_id`,
    { now },
    tx,
  )
}

export async function writePull(db: Database, tx: Transaction, row: PullRow): Promise<void> {
  await db.run(
    `INSERT INTO feed_pulls (feed_id, address, every_hours, at_minute, look_back_days, step_minutes, credentials_kind, credentials,
       next_due_at, failures_in_row, created_at, version)
     VALUES ($feedId, $address, $everyHours, $atMinute, $lookBackDays, $stepMinutes, $credentialsKind, $credentials,
       $nextDueAt, $failuresInRow, $createdAt, $version)
     ON CONFLICT (feed_id) DO UPDATE SET address = excluded.address, every_hours = excluded.every_hours, at_minute = excluded.at_minute,
       look_back_days = excluded.look_back_days, step_minutes = excluded.step_minutes, credentials_kind = excluded.credentials_kind,
       credentials = excluded.credentials, next_due_at = excluded.next_due_at, failures_in_row = excluded.failures_in_row, version = excluded.version`,
    { ...row },
    tx,
  )
}

export async function setNextDue(db: Database, tx: Transaction, feedId: number, nextDueAt: number): Promise<void> {
  await db.run('UPDATE feed_pulls SET next_due_at = $nextDueAt WHERE feed_id = $feedId', { feedId, nextDueAt }, tx)
}

export async function setFailures(db: Database, tx: Transaction, feedId: number, failuresInRow: number): Promise<void> {
  await db.run('UPDATE feed_pulls SET failures_in_row = $failuresInRow WHERE feed_id = $feedId', { feedId, failuresInRow }, tx)
}

/** Forgets the pull and what its addresses gave; the lines of its runs stay. */
export async function removePull(db: Database, tx: Transaction, feedId: number): Promise<void> {
  await db.run('DELETE FROM feed_pulls WHERE feed_id = $feedId', { feedId }, tx)
  await db.run('DELETE FROM pulled_addresses WHERE feed_id = $feedId', { feedId }, tx)
}

const keptRuns = 200

export async function addRun(db: Database, tx: Transaction, feedId: number, run: Omit<RunRow, 'id'>): Promise<void> {
  await db.run(
    `INSERT INTO pull_runs (feed_id, started_at, ended_at, outcome, fetched, unchanged, not_there, failed, sentence)
     VALUES ($feedId, $startedAt, $endedAt, $outcome, $fetched, $unchanged, $notThere, $failed, $sentence)`,
    { feedId, ...run },
    tx,
  )
  await db.run(
    `DELETE FROM pull_runs WHERE feed_id = $feedId
     AND id <= (SELECT id FROM pull_runs WHERE feed_id = $feedId ORDER BY id DESC LIMIT 1 OFFSET $keptRuns)`,
    { feedId, keptRuns },
    tx,
  )
}

/** Newest first. */
export async function runsOf(db: Database, feedId: number, limit: number): Promise<RunRow[]> {
  return db.all(
    `SELECT id, started_at AS startedAt, ended_at AS endedAt, outcome, fetched, unchanged, not_there AS notThere, failed, sentence
     FROM pull_runs WHERE feed_id = $feedId ORDER BY id DESC LIMIT $limit`,
    { feedId, limit },
  )
}

/** Whether a pull of the feed waits for its turn or is under way. */
export async function pullIsQueued(db: Database, feedId: number): Promise<boolean> {
  const row = await db.first<{ count: number }>(
    `SELECT count(*) AS count FROM jobs WHERE kind = 'pull-feed' AND job_key = $key AND state IN ('waiting', 'running')`,
    { key: String(feedId) },
  )
  return (row?.count ?? 0) > 0
}

export async function pulledAddress(db: Database, feedId: number, address: string): Promise<PulledAddress | null> {
  const row = await db.first<PulledAddress>(
    'SELECT etag, last_modified AS lastModified, checksum, file_id AS fileId, asked_at AS askedAt FROM pulled_addresses WHERE feed_id = $feedId AND address = $address',
    { feedId, address },
  )
  return row ?? null
}

export async function keepPulledAddress(
  db: Database,
  tx: Transaction,
  row: PulledAddress & { feedId: number; address: string },
): Promise<void> {
  await db.run(
    `INSERT INTO pulled_addresses (feed_id, address, etag, last_modified, checksum, file_id, asked_at)
     VALUES ($feedId, $address, $etag, $lastModified, $checksum, $fileId, $askedAt)
     ON CONFLICT (feed_id, address) DO UPDATE SET etag = excluded.etag, last_modified = excluded.last_modified,
       checksum = excluded.checksum, file_id = ifnull(excluded.file_id, file_id), asked_at = excluded.asked_at`,
    { ...row },
    tx,
  )
}

export async function touchPulledAddress(db: Database, tx: Transaction, feedId: number, address: string, askedAt: number): Promise<void> {
  await db.run('UPDATE pulled_addresses SET asked_at = $askedAt WHERE feed_id = $feedId AND address = $address', { feedId, address, askedAt }, tx)
}

/** Whether another address of the feed gave these bytes last: then they are of that one too, and no correction touches them. */
export async function givenElsewhere(db: Database, feedId: number, address: string, checksum: string): Promise<boolean> {
  const row = await db.first<{ count: number }>(
    'SELECT count(*) AS count FROM pulled_addresses WHERE feed_id = $feedId AND address <> $address AND checksum = $checksum',
    { feedId, address, checksum },
  )
  return (row?.count ?? 0) > 0
}

/** Whether the feed has these bytes already, in a file that is neither waiting nor refused. */
export async function feedHasBytes(db: Database, feedId: number, checksum: string): Promise<boolean> {
  const row = await db.first<{ count: number }>(
    `SELECT count(*) AS count FROM files WHERE checksum = $checksum AND feed_id = $feedId AND status NOT IN ('waiting', 'refused')`,
    { feedId, checksum },
  )
  return (row?.count ?? 0) > 0
}

export async function hostRestsUntil(db: Database, host: string): Promise<number | null> {
  const row = await db.first<{ notBefore: number }>('SELECT not_before AS notBefore FROM pull_hosts WHERE host = $host', { host })
  return row?.notBefore ?? null
}

export async function refusalsOfHost(db: Database, tx: Transaction, host: string): Promise<number> {
  const row = await db.first<{ refusals: number }>('SELECT refusals FROM pull_hosts WHERE host = $host', { host }, tx)
  return row?.refusals ?? 0
}

export async function restHost(db: Database, tx: Transaction, host: string, notBefore: number, refusals: number): Promise<void> {
  await db.run(
    `INSERT INTO pull_hosts (host, not_before, refusals) VALUES ($host, $notBefore, $refusals)
     ON CONFLICT (host) DO UPDATE SET not_before = excluded.not_before, refusals = excluded.refusals`,
    { host, notBefore, refusals },
    tx,
  )
}

/** The host answered well: what it refused before is forgiven. */
export async function forgiveHost(db: Database, tx: Transaction, host: string): Promise<void> {
  await db.run('DELETE FROM pull_hosts WHERE host = $host', { host }, tx)
}
