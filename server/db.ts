import { QueryTypes, Sequelize, Transaction } from 'sequelize'
import sqlite3 from 'sqlite3'

export type Bind = Record<string, unknown>

/**
 * The database. SQLite takes one writer, and Sequelize opens a connection for each transaction, so all writing goes
 * through `write`: one queue, IMMEDIATE transactions. Reads outside it see the last commit (WAL).
 */
export interface Database {
  sequelize: Sequelize
  write<T>(fn: (tx: Transaction) => Promise<T>): Promise<T>
  all<T extends object>(sql: string, bind?: Bind, tx?: Transaction): Promise<T[]>
  first<T extends object>(sql: string, bind?: Bind, tx?: Transaction): Promise<T | undefined>
  run(sql: string, bind: Bind, tx: Transaction): Promise<void>
  close(): Promise<void>
}

export type { Transaction }

export async function openDatabase(file: string): Promise<Database> {
  const sequelize = new Sequelize({
    dialect: 'sqlite',
    dialectModule: sqlite3,
    storage: file,
    logging: false,
    transactionType: Transaction.TYPES.IMMEDIATE,
  })
  await sequelize.query('PRAGMA journal_mode = WAL')
  await sequelize.query('PRAGMA busy_timeout = 10000')
  let queue: Promise<unknown> = Promise.resolve()

  const all = async <T extends object>(sql: string, bind: Bind = {}, tx?: Transaction): Promise<T[]> =>
    sequelize.query<T>(sql, { bind, type: QueryTypes.SELECT, ...(tx ? { transaction: tx } : {}) })

  return {
    sequelize,
    write: (fn) => {
      const turn = queue.then(() =>
        sequelize.transaction({ type: Transaction.TYPES.IMMEDIATE }, async (tx) => {
          await sequelize.query('PRAGMA busy_timeout = 10000', { transaction: tx })
          return fn(tx)
        }),
      )
      queue = turn.catch(() => undefined)
      return turn
    },
    all,
    first: async <T extends object>(sql: string, bind: Bind = {}, tx?: Transaction) => (await all<T>(sql, bind, tx))[0],
    run: async (sql, bind, tx) => {
      await sequelize.query(sql, { bind, transaction: tx, type: QueryTypes.RAW })
    },
    close: async () => {
      await queue
      await sequelize.close()
    },
  }
}
