import { createHash } from 'node:crypto'
import { copyFile, mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { createContext, actingAs } from '../../server/context/context'
import type { Context } from '../../server/context/context'
import { createEventBus } from '../../server/context/event-bus'
import type { NumberedEvent } from '../../server/context/event-bus'
import { makeIds } from '../../server/context/ids'
import type { Ids } from '../../server/context/ids'
import { silentLog } from '../../server/context/logger'
import { createPasswords } from '../../server/context/passwords'
import { openDatabase } from '../../server/db/client'
import type { DatabaseClient } from '../../server/db/client'
import { migrateToLatest } from '../../server/db/migrate'
import { getPerson } from '../../server/repositories/person-repository'
import { actorOf } from '../../server/services/people/actor-of-session'
import { createCollectingTransport } from '../../server/mail/transports/collecting-transport'
import type { CollectedMail, CollectingTransport } from '../../server/mail/transports/collecting-transport'
import { createFakeClock } from './fake-clock'
import type { FakeClock } from './fake-clock'

export interface TestHouse {
  /** Acts as nobody: a visitor, or the server itself. */
  ctx: Context
  clock: FakeClock
  database: DatabaseClient
  databaseFile: string
  /** What was sent, oldest first. */
  mail: readonly CollectedMail[]
  mailTransport: CollectingTransport
  /** What was published to open pages, oldest first. */
  events: NumberedEvent[]
  /** The context with this person as actor, with the roles that stand in the database now. */
  actAs(person: string | { id: string }): Promise<Context>
  /** Where `close` leaves the database instead of deleting it. */
  close(options?: { keepAs?: string }): Promise<void>
}

export interface TestHouseOptions {
  /** Other ids and secrets for another seed. */
  seed?: string
  startAt?: string
  /** Database file of a closed house to begin with a copy of; with another seed than that house had. */
  copyOf?: string
}

/** A whole server side on a fresh SQLite file: real migrations, a clock that stands still, seeded ids, mail that is collected. */
export async function createTestHouse({ seed = 'house', startAt = '2026-12-01T20:00:00.000Z', copyOf }: TestHouseOptions = {}): Promise<TestHouse> {
  const folder = await mkdtemp(join(tmpdir(), 'semilatus-'))
  const databaseFile = join(folder, 'semilatus.sqlite3')
  if (copyOf === undefined) await migrateToLatest(databaseFile)
  else await copyFile(copyOf, databaseFile)
  const database = openDatabase(databaseFile)
  const clock = createFakeClock(startAt)
  const events: NumberedEvent[] = []
  const bus = createEventBus((error) => { throw error })
  bus.subscribe(event => events.push(event))
  const mailTransport = createCollectingTransport()
  const ctx = createContext({
    db: database.db,
    reads: database.reads,
    clock,
    ids: seededIds(seed),
    passwords: createPasswords({ logN: 4, r: 8, p: 1 }),
    log: silentLog,
    baseUrl: 'http://127.0.0.1:4310',
    events: bus,
  })
  return {
    ctx,
    clock,
    database,
    databaseFile,
    mail: mailTransport.collected,
    mailTransport,
    events,
    actAs: async person => actingAs(ctx, actorOf(await getPerson(database.reads, typeof person === 'string' ? person : person.id))),
    async close({ keepAs } = {}) {
      await database.close()
      if (keepAs !== undefined) await copyFile(databaseFile, keepAs)
      await rm(folder, { recursive: true, force: true })
    },
  }
}

/** Ids that are the same on every run: SHA-256 of the seed and a count. */
function seededIds(seed: string): Ids {
  let count = 0
  return makeIds(byteCount => createHash('sha256').update(`${seed}:${count++}`).digest().subarray(0, byteCount))
}
