import { spawn } from 'node:child_process'
import { ROOT, SERVER_ENTRY } from './paths.mjs'

/**
 * Starts the built server and waits until it answers that it is ready.
 * @param {{ env: NodeJS.ProcessEnv, origin: string, logFile?: number }} options logFile: an open file descriptor for its log
 */
export async function runServer({ env, origin, logFile }) {
  const child = spawn(process.execPath, [SERVER_ENTRY], {
    cwd: ROOT,
    env: { ...process.env, NODE_ENV: 'production', ...env },
    stdio: ['ignore', logFile ?? 'inherit', logFile ?? 'inherit'],
  })
  /** @type {number | null} */
  let exitCode = null
  child.on('exit', (code, signal) => { exitCode = code ?? (signal ? 1 : 0) })
  for (let tries = 0; tries < 300; tries++) {
    if (exitCode !== null) throw new Error(`The server ended at its start with code ${exitCode}; the reason stands in its log.`)
    if (await isReady(origin)) return child
    await new Promise(resolve => setTimeout(resolve, 100))
  }
  child.kill('SIGTERM')
  throw new Error('The server was not ready after 30 seconds.')
}

/** @param {string} origin */
async function isReady(origin) {
  try {
    return (await fetch(`${origin}/readyz`)).ok
  }
  catch {
    // Not listening yet: asked again until the time is up.
    return false
  }
}

/**
 * Ends child processes with us, in order, and passes on the first one's exit code.
 * @param {import('node:child_process').ChildProcess[]} children
 */
export function endTogether(children) {
  const end = () => { for (const child of children) if (child.exitCode === null) child.kill('SIGTERM') }
  process.on('SIGINT', end)
  process.on('SIGTERM', end)
  let running = children.length
  for (const child of children) {
    child.on('exit', (code) => {
      process.exitCode ||= code ?? 0
      running -= 1
      end()
      if (running === 0) process.exit()
    })
  }
}
