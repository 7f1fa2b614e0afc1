import type { Actor } from '#shared/schemas/people'
import type { Db, Reads, Tx } from '../db/client'
import { runAfterCommit, transact } from '../db/transaction'
import type { Clock } from './clock'
import type { EventBus } from './event-bus'
import type { Ids } from './ids'
import type { Log } from './logger'
import type { Passwords } from './passwords'

export type { Reads, Tx } from '../db/client'

/** All that a service may reach: built once at start, given an actor for each request or job. */
export interface Context {
  /** The write connection; use it through `withTransaction` only. */
  db: Db
  /** The read-only connection. */
  reads: Reads
  clock: Clock
  ids: Ids
  passwords: Passwords
  /** The signed-in person; null for a visitor and for the server itself. */
  actor: Actor | null
  /** Who acts where there is no actor. */
  origin: 'server' | 'command-line'
  log: Log
  /** Where people reach this installation, without a slash at the end. */
  baseUrl: string
  events: EventBus
  /** Registers an action for after the commit of the open transaction; it is dropped on rollback. */
  afterCommit(action: () => void): void
  /** Tells the job runner that there is work. */
  wakeJobs(): void
}

export type ContextParts = Omit<Context, 'actor' | 'origin' | 'afterCommit' | 'wakeJobs'> & Partial<Pick<Context, 'origin' | 'wakeJobs'>>

export function createContext(parts: ContextParts): Context {
  return { origin: 'server', wakeJobs: () => {}, ...parts, actor: null, afterCommit: runAfterCommit }
}

export function actingAs(ctx: Context, actor: Actor | null): Context {
  return { ...ctx, actor }
}

/**
 * Runs `work` in one transaction (BEGIN IMMEDIATE). Never wait for hashing, mail or the network in it: there is one write
 * connection. Inside it ctx.db and ctx.reads throw.
 */
export async function withTransaction<Answer>(ctx: Context, work: (tx: Tx) => Promise<Answer>): Promise<Answer> {
  const { answer, afterCommit } = await transact(ctx.db, work)
  for (const action of afterCommit) {
    try {
      action()
    }
    catch (error) {
      ctx.log.error({ err: error }, 'an action after commit failed; what was committed stands')
    }
  }
  return answer
}
