import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { createContext } from '../../../server/context/context'
import { createEventBus } from '../../../server/context/event-bus'
import { makeIds } from '../../../server/context/ids'
import { silentLog } from '../../../server/context/logger'
import { createPasswords } from '../../../server/context/passwords'
import { openDatabase } from '../../../server/db/client'
import { migrateToLatest } from '../../../server/db/migrate'
import { createFakeClock } from '../fake-clock'
import { STORY_BEGINS } from './demo-story'
import type { DemoHouse } from './demo-story'

/** The house that the demo's server will open: real passwords and ids drawn anew, and the clock of the story. */
export async function openDemoHouse({ folder, baseUrl }: { folder: string, baseUrl: string }): Promise<DemoHouse & { close(): Promise<void> }> {
  mkdirSync(folder, { recursive: true, mode: 0o700 })
  const file = join(folder, 'semilatus.sqlite3')
  await migrateToLatest(file)
  const database = openDatabase(file)
  const clock = createFakeClock(STORY_BEGINS)
  const ctx = createContext({
    db: database.db,
    reads: database.reads,
    clock,
    ids: makeIds(),
    passwords: createPasswords(),
    log: silentLog,
    baseUrl,
    events: createEventBus((error) => { throw error }),
    origin: 'command-line',
  })
  return { ctx, clock, close: () => database.close() }
}
