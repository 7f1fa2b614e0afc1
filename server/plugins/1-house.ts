import { mkdirSync } from 'node:fs'
import { defineNitroPlugin } from 'nitropack/runtime'
import { readSettings } from '../config/env'
import type { Settings } from '../config/env'
import { systemClock } from '../context/clock'
import { createContext } from '../context/context'
import type { Context } from '../context/context'
import { createEventBus } from '../context/event-bus'
import { makeIds } from '../context/ids'
import { createLogger } from '../context/logger'
import type { Log } from '../context/logger'
import { createPasswords } from '../context/passwords'
import { openDatabase } from '../db/client'
import { migrateToLatest } from '../db/migrate'
import { openHouse } from '../http/house'
import { endEventStreams } from '../http/event-stream'
import { createSessionCookie } from '../http/session-cookie'
import { jobDefinitions } from '../jobs/definitions/registry'
import { createFitPool } from '../jobs/runner/fit-pool'
import { createJobRunner } from '../jobs/runner/job-runner'
import fitWorkerUrl from '../jobs/workers/fit?worker-file'
import { makeTransport } from '../mail/transports/make-transport'
import { actorOfSession } from '../services/people/actor-of-session'
import { makeFirstAdministratorLink } from '../services/people/make-first-administrator-link'
import { recoverJobs } from '../services/jobs/end-job'

/** Opens the house at start: settings, database, jobs. Requests wait for it; where it fails, the process ends with the reason. */
export default defineNitroPlugin((nitro) => {
  const opening = openAll().catch((error: unknown) => {
    process.stderr.write(`${reasonOf(error)}\n`)
    return process.exit(1)
  })
  nitro.hooks.hook('request', async () => void await opening)
  nitro.hooks.hook('close', async () => (await opening).close())
  // Nitro calls `close` only after every connection has ended, and an event stream does not end by itself.
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, endEventStreams)
})

async function openAll(): Promise<{ close(): Promise<void> }> {
  const settings = readSettings()
  const log = createLogger(settings.logLevel)
  mkdirSync(settings.dataDir, { recursive: true, mode: 0o700 })
  const migrations = await migrateToLatest(settings.databaseFile)
  const database = openDatabase(settings.databaseFile)
  const context = contextOf(settings, log, { ...database, wakeJobs: () => runner.wake() })
  const fitPool = createFitPool({ workerUrl: fitWorkerUrl() })
  const runner = createJobRunner({
    ctx: context,
    definitions: jobDefinitions,
    tools: { computeFit: fitPool.computeFit, mailTransport: makeTransport(settings) },
  })
  const recoveredJobs = await recoverJobs(context)
  greetFirstAdministrator(await makeFirstAdministratorLink(context))
  openHouse({ context, sessionCookie: createSessionCookie(settings.baseUrl), actorOfSession })
  runner.start()
  log.info({ baseUrl: settings.baseUrl, migrations, recoveredJobs, mail: settings.smtp ? 'smtp' : 'none' }, 'the server is ready')
  return {
    async close() {
      await runner.stop()
      openHouse(null)
      await fitPool.close()
      await database.close()
      log.info({}, 'the server has stopped')
    },
  }
}

function contextOf(settings: Settings, log: Log, { db, reads, wakeJobs }: Pick<Context, 'db' | 'reads' | 'wakeJobs'>): Context {
  return createContext({
    db,
    reads,
    clock: systemClock,
    ids: makeIds(),
    passwords: createPasswords(),
    log,
    baseUrl: settings.baseUrl,
    events: createEventBus(error => log.error({ err: error }, 'a listener of the event stream failed')),
    wakeJobs,
  })
}

/** Printed, not logged: the link is a secret, and a log is kept. */
function greetFirstAdministrator(url: string | null): void {
  if (url) process.stdout.write(`\nNobody has an account yet. This link makes the first administrator; it works once, within 14 days, and each start makes a new one:\n\n  ${url}\n\n`)
}

function reasonOf(error: unknown): string {
  if (!(error instanceof Error)) return String(error)
  return error.cause === undefined ? error.message : `${error.message}\n${reasonOf(error.cause)}`
}
