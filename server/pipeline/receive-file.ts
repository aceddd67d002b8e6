import type { Context } from '../context'
import type { Transaction } from '../db'
import { enqueueJob } from '../jobs/queue'
import type { FileRecord } from '../models/file'
import { dropFile, keepFile, type Arrived } from './stored-files'

export interface Arrival {
  name: string
  arrived: Arrived
  origin: 'upload' | 'inbox' | 'command' | 'pull'
  userId: number | null
  feedId: number | null
  observedAt: number | null
  /** When its server says it was last changed. */
  modifiedAt?: number | null
  /** The file that the same address gave before: wholly replaced, or only at the instants both hold. */
  replaces?: { fileId: number; wholly: boolean } | null
}

/**
 * Takes a file in: its bytes under their checksum, a row and a job in one transaction. The same bytes for the same feed
 * and time are one file; a waiting or refused one is queued again with what is said of it now.
 */
export async function receiveFile(context: Context, arrival: Arrival): Promise<FileRecord> {
  await keepFile(context.env, arrival.arrived)
  const file = await context.db.write(async (tx) => {
    const known = await sameFile(context, arrival, tx)
    const correction = arrival.replaces && arrival.replaces.fileId !== known?.id ? arrival.replaces : null
    if (known && known.status !== 'waiting' && known.status !== 'refused' && !correction) return known
    const record = known ?? (await newFile(context, arrival, tx))
    if (known) await known.update({ ...fieldsOf(arrival, known), name: arrival.name }, { transaction: tx })
    if (correction) await takePlace(context, record, correction, tx)
    await queueFile(context, record, tx)
    return record
  })
  await dropFile(arrival.arrived)
  context.news.tell({ topic: 'files', id: file.id })
  return file
}

/** Puts a file in the queue again, from the start. */
export async function queueFile(context: Context, file: FileRecord, tx: Transaction): Promise<void> {
  await file.update({ status: 'received', refusal: null, proposal: null, waitingFor: null }, { transaction: tx })
  await enqueueJob(context, tx, {
    kind: 'process-file',
    key: String(file.id),
    subject: file.name,
    payload: { fileId: file.id },
    priority: 20,
  })
}

/** An address may go back to bytes it gave before: they are the newest again, and replaced by nothing. */
async function takePlace(context: Context, file: FileRecord, { fileId, wholly }: { fileId: number; wholly: boolean }, tx: Transaction): Promise<void> {
  await context.models.files.update({ replaces: null }, { where: { replaces: file.id }, transaction: tx })
  await file.update({ replaces: fileId, replacesWholly: wholly }, { transaction: tx })
}

function fieldsOf(arrival: Arrival, known?: FileRecord) {
  return {
    feedId: arrival.feedId ?? known?.feedId ?? null,
    observedAt: arrival.observedAt ?? known?.observedAt ?? null,
    modifiedAt: arrival.modifiedAt ?? known?.modifiedAt ?? null,
  }
}

async function sameFile(context: Context, arrival: Arrival, tx: Transaction): Promise<FileRecord | null> {
  const same = await context.models.files.findAll({
    where: { checksum: arrival.arrived.checksum },
    order: [['id', 'ASC']],
    transaction: tx,
  })
  const exact = same.find((file) => file.feedId === arrival.feedId && file.observedAt === arrival.observedAt)
  const unsaid = arrival.feedId === null && arrival.observedAt === null
  const open = same.find((file) => file.status === 'waiting' || file.status === 'refused')
  return exact ?? open ?? (unsaid ? same[0] : undefined) ?? null
}

async function newFile(context: Context, arrival: Arrival, tx: Transaction): Promise<FileRecord> {
  return context.models.files.create(
    {
      name: arrival.name,
      checksum: arrival.arrived.checksum,
      bytes: arrival.arrived.bytes,
      status: 'received',
      origin: arrival.origin,
      uploadedBy: arrival.userId,
      receivedAt: context.clock.now(),
      ...fieldsOf(arrival),
    },
    { transaction: tx },
  )
}
