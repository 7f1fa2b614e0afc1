// npm run demo: from an empty clone to a running, filled application with a local mailbox. Node only until the packages
// are installed; on a machine already set up it takes seconds.
import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, openSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { spawn } from 'node:child_process'
import { ensureBuilt } from './setup/ensure-built.mjs'
import { ensureInstalled } from './setup/ensure-installed.mjs'
import { findPort } from './setup/find-port.mjs'
import { hashSources } from './setup/hash-sources.mjs'
import { ROOT, inRoot } from './setup/paths.mjs'
import { endTogether, runServer } from './setup/run-server.mjs'
import { sessionSecret } from './setup/session-secret.mjs'

const HOST = '127.0.0.1'
const DATA = process.env.SEMILATUS_DEMO_DIR || inRoot('.data', 'demo')
const WISHED = { web: Number(process.env.SEMILATUS_PORT || 3000), mailbox: 3080, smtp: 2525 }

/**
 * Makes the demo's data through the services where there is none, or none of these sources; then draws new passwords.
 * @param {string} origin
 * @returns {Promise<{ role: string, name: string, email: string, password: string }[]>}
 */
async function fillDemo(origin) {
  const stamp = join(DATA, 'story.sha256')
  const wanted = hashSources(['tests/builders', 'server/db/migrations', 'server/services', 'server/domain', 'shared', 'fitting'])
  const isCurrent = existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted
  if (!isCurrent) {
    if (existsSync(stamp)) console.log('The sources changed since the demo was filled: its data are made anew.')
    rmSync(DATA, { recursive: true, force: true })
    mkdirSync(DATA, { recursive: true })
  }
  const child = spawn(process.execPath, [inRoot('scripts', 'run-bundled.mjs'), 'tests/builders/fill-demo.ts', DATA, origin, isCurrent ? 'passwords' : 'story'], { cwd: ROOT, stdio: ['pipe', 'pipe', 'inherit'] })
  child.stdin.end(JSON.stringify({ passwords: Array.from({ length: 12 }, () => randomBytes(9).toString('base64url')) }))
  let printed = ''
  for await (const chunk of child.stdout) printed += chunk
  const code = child.exitCode ?? await new Promise(resolve => child.on('exit', resolve))
  if (code !== 0) throw new Error('The demo could not be filled; the reason stands above.')
  writeFileSync(stamp, wanted)
  return JSON.parse(printed)
}

/**
 * @param {{ smtp: number, mailbox: number }} ports
 * @returns {Promise<import('node:child_process').ChildProcess>}
 */
async function startMailbox(ports) {
  const mails = join(DATA, 'mailbox')
  mkdirSync(mails, { recursive: true })
  const child = spawn(process.execPath, [inRoot('scripts', 'mailbox.mjs')], {
    cwd: ROOT,
    stdio: ['ignore', 'ignore', 'inherit'],
    env: { ...process.env, MAILBOX_HOST: HOST, MAILBOX_SMTP_PORT: String(ports.smtp), MAILBOX_PORT: String(ports.mailbox), MAILBOX_DIR: mails },
  })
  for (let tries = 0; tries < 100; tries++) {
    if (child.exitCode !== null) throw new Error('The mailbox ended at its start; the reason stands above.')
    try {
      if ((await fetch(`http://${HOST}:${ports.mailbox}/`)).ok) return child
    }
    catch {
      // Not listening yet: asked again until the time is up.
    }
    await new Promise(resolve => setTimeout(resolve, 100))
  }
  child.kill('SIGTERM')
  throw new Error('The mailbox did not answer within ten seconds.')
}

/** @param {keyof typeof WISHED} name */
async function choosePort(name) {
  const port = await findPort(WISHED[name], HOST)
  if (port !== WISHED[name]) console.log(`Port ${WISHED[name]} is taken by another program; ${port} is used for ${name === 'web' ? 'the application' : name === 'smtp' ? 'incoming mail' : 'the mailbox page'} instead.`)
  return port
}

async function main() {
  await ensureInstalled()
  await ensureBuilt()
  const ports = { web: await choosePort('web'), mailbox: await choosePort('mailbox'), smtp: await choosePort('smtp') }
  const origin = `http://${HOST}:${ports.web}`
  const people = await fillDemo(origin)
  const mailbox = await startMailbox(ports)
  const server = await runServer({
    origin,
    logFile: openSync(join(DATA, 'server.log'), 'a'),
    env: {
      SEMILATUS_DATA_DIR: DATA, SEMILATUS_HOST: HOST, SEMILATUS_PORT: String(ports.web), HOST, PORT: String(ports.web),
      SEMILATUS_BASE_URL: origin, NUXT_SESSION_PASSWORD: sessionSecret(DATA),
      SEMILATUS_MAIL: 'smtp', SEMILATUS_SMTP_HOST: HOST, SEMILATUS_SMTP_PORT: String(ports.smtp), SEMILATUS_SMTP_FROM: 'semilatus@example.org',
    },
  })
  endTogether([server, mailbox])
  console.log(`\nSemilatus is running.\n\n  application  ${origin}\n  mailbox      http://${HOST}:${ports.mailbox}\n  server log   ${join(DATA, 'server.log')}\n`)
  console.log('Sign-ins of the invented group (passwords are drawn anew at every start):\n')
  for (const person of people) console.log(`  ${person.role.padEnd(34)} ${person.email.padEnd(32)} ${person.password}`)
  console.log('\nCtrl+C ends both.')
}

main().catch((error) => {
  console.error(error instanceof Error ? error.message : error)
  process.exit(1)
})
