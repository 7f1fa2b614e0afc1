import { spawn } from 'node:child_process'
import type { ChildProcess } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, openSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'

/** npm and vitest both run in the project's root. */
const ENTRY = resolve('.output/server/index.mjs')

export interface RunningServer {
  origin: string
  dataDir: string
  /** Everything the server logged so far. */
  log(): string
  /** Ends the process without warning, as a power cut would. */
  killHard(): Promise<void>
  /** Starts the same data folder again, on the same port. */
  restart(): Promise<void>
  stop(): Promise<number | null>
}

export async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', reject)
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address()
      probe.close(() => resolve(typeof address === 'object' && address ? address.port : 0))
    })
  })
}

/** A fresh data folder below the system's temporary folder. */
export function freshDataDir(): string {
  return mkdtempSync(join(tmpdir(), 'semilatus-e2e-'))
}

/** Starts the built server on a data folder; what a production start sets is set here too. */
export async function startServer(options: { dataDir: string, port?: number, env?: Record<string, string> }): Promise<RunningServer> {
  const { dataDir, env = {} } = options
  const port = options.port ?? await freePort()
  const origin = `http://127.0.0.1:${port}`
  const logFile = join(dataDir, 'server.log')
  let child: ChildProcess

  async function start() {
    const log = openSync(logFile, 'a')
    child = spawn(process.execPath, [ENTRY], {
      stdio: ['ignore', log, log],
      env: {
        ...process.env,
        NODE_ENV: 'production', HOST: '127.0.0.1', PORT: String(port), SEMILATUS_HOST: '127.0.0.1', SEMILATUS_PORT: String(port),
        SEMILATUS_DATA_DIR: dataDir, SEMILATUS_BASE_URL: origin, SEMILATUS_MAIL: 'none',
        NUXT_SESSION_PASSWORD: 'a key for tests only, of enough characters', ...env,
      },
    })
    for (let tries = 0; tries < 300; tries++) {
      if (child.exitCode !== null) throw new Error(`The server ended at its start with code ${child.exitCode}:\n${readFileSync(logFile, 'utf8')}`)
      const answer = await fetch(`${origin}/readyz`).catch(() => null)
      if (answer?.ok) return
      await new Promise(resolve => setTimeout(resolve, 100))
    }
    throw new Error(`The server was not ready after 30 s:\n${readFileSync(logFile, 'utf8')}`)
  }

  function ended(): Promise<number | null> {
    if (child.exitCode !== null || child.signalCode !== null) return Promise.resolve(child.exitCode)
    return new Promise(resolve => child.once('exit', code => resolve(code)))
  }

  await start()
  return {
    origin,
    dataDir,
    log: () => readFileSync(logFile, 'utf8'),
    async killHard() {
      const gone = ended()
      child.kill('SIGKILL')
      await gone
    },
    restart: start,
    async stop() {
      const gone = ended()
      child.kill('SIGTERM')
      const code = await gone
      rmSync(dataDir, { recursive: true, force: true })
      return code
    },
  }
}
