// npm start: installs and builds where needed, then serves from .data/live. An empty database prints a one-time link
// that makes the first administrator.
import { ensureBuilt } from './setup/ensure-built.mjs'
import { ensureInstalled } from './setup/ensure-installed.mjs'
import { tryPort } from './setup/find-port.mjs'
import { inRoot } from './setup/paths.mjs'
import { endTogether, runServer } from './setup/run-server.mjs'
import { sessionSecret } from './setup/session-secret.mjs'

async function main() {
  const host = process.env.SEMILATUS_HOST || '127.0.0.1'
  const port = Number(process.env.SEMILATUS_PORT || 3000)
  if (!Number.isInteger(port) || port < 1 || port > 65535) throw new Error(`SEMILATUS_PORT is "${process.env.SEMILATUS_PORT}"; it must be a whole number from 1 to 65535.`)
  if (await tryPort(port, host) === null) {
    throw new Error(`Port ${port} on ${host} is taken by another program. End that one, or choose another: SEMILATUS_PORT=${port + 1} npm start`)
  }
  await ensureInstalled()
  await ensureBuilt()
  const dataDir = process.env.SEMILATUS_DATA_DIR || inRoot('.data', 'live')
  const origin = `http://${host.includes(':') ? `[${host}]` : host}:${port}`
  const server = await runServer({
    origin,
    env: {
      SEMILATUS_DATA_DIR: dataDir,
      SEMILATUS_HOST: host,
      SEMILATUS_PORT: String(port),
      HOST: host,
      PORT: String(port),
      SEMILATUS_BASE_URL: process.env.SEMILATUS_BASE_URL || origin,
      NUXT_SESSION_PASSWORD: process.env.NUXT_SESSION_PASSWORD || sessionSecret(dataDir),
    },
  })
  endTogether([server])
  console.log(`Semilatus is at ${origin} (data in ${dataDir}). Ctrl+C ends it.`)
}

main().catch((error) => {
  console.error(error instanceof Error ? error.message : error)
  process.exit(1)
})
