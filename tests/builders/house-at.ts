import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { createContext } from '../../server/context/context'
import type { Context } from '../../server/context/context'
import { createEventBus } from '../../server/context/event-bus'
import { makeIds } from '../../server/context/ids'
import { silentLog } from '../../server/context/logger'
import { createPasswords } from '../../server/context/passwords'
import { openDatabase } from '../../server/db/client'
import { migrateToLatest } from '../../server/db/migrate'
import { createFakeClock } from './fake-clock'
import type { FakeClock } from './fake-clock'

export interface HouseAt {
  ctx: Context
  clock: FakeClock
  close(): Promise<void>
}

/** Opens the house in a data folder, to fill it before a server is started upon it: passwords and ids as in production, a clock that is told. */
export async function openHouseAt({ dataDir, baseUrl, startAt }: { dataDir: string, baseUrl: string, startAt: string }): Promise<HouseAt> {
  mkdirSync(dataDir, { recursive: true })
  const file = join(dataDir, 'semilatus.sqlite3')
  await migrateToLatest(file)
  const { db, reads, close } = openDatabase(file)
  const clock = createFakeClock(startAt)
  const events = createEventBus((error) => { throw error })
  const ctx = createContext({ db, reads, clock, ids: makeIds(), passwords: createPasswords(), log: silentLog, baseUrl, events, origin: 'command-line' })
  return { ctx, clock, close }
}
