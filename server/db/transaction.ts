import { AsyncLocalStorage } from 'node:async_hooks'
import type { Kysely, Transaction } from 'kysely'

interface OpenTransaction {
  afterCommit: (() => void)[]
}

const openTransaction = new AsyncLocalStorage<OpenTransaction>()

export function isInTransaction(): boolean {
  return openTransaction.getStore() !== undefined
}

/** Runs `work` in one transaction, and after its commit returns what it registered with `runAfterCommit`. */
export async function transact<Tables, Answer>(db: Kysely<Tables>, work: (tx: Transaction<Tables>) => Promise<Answer>): Promise<{ answer: Answer, afterCommit: (() => void)[] }> {
  const store: OpenTransaction = { afterCommit: [] }
  const answer = await db.transaction().execute(tx => openTransaction.run(store, () => work(tx)))
  return { answer, afterCommit: store.afterCommit }
}

export function runAfterCommit(action: () => void): void {
  const store = openTransaction.getStore()
  if (!store) throw new Error('afterCommit was called outside a transaction. Call it from within withTransaction, or do the action directly.')
  store.afterCommit.push(action)
}
