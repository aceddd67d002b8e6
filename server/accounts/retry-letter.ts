import { audit } from './audit'
import type { Person } from './person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { LetterRecord } from '../models/letter'

/** Puts a failed or waiting letter first in line again, with all its attempts. */
export async function retryLetter(context: Context, person: Person, id: number): Promise<LetterRecord> {
  const letter = await context.db.write(async (tx) => {
    const found = await context.models.letters.findByPk(id, { transaction: tx })
    if (!found) throw new ApiError('not-found', 'There is no such letter.')
    if (found.state === 'delivered') throw new ApiError('conflict', 'This letter was delivered already.')
    await found.update({ state: 'waiting', attempts: 0, nextAttemptAt: context.clock.system() }, { transaction: tx })
    await audit(context, tx, { userId: person.id, action: 'letter:retry', subject: `letter ${id}` })
    return found
  })
  context.news.tell({ topic: 'letters', id })
  return letter
}
