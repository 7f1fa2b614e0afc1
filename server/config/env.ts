import { resolve } from 'node:path'

export const LOG_LEVELS = ['debug', 'info', 'warn', 'error', 'silent'] as const
export type LogLevel = (typeof LOG_LEVELS)[number]

export interface SmtpSettings {
  host: string
  port: number
  from: string
  user: string | null
  password: string | null
}

export interface Settings {
  /** Absolute path of the folder that holds everything this installation keeps. */
  dataDir: string
  databaseFile: string
  /** Where people reach this installation, without a slash at the end. */
  baseUrl: string
  host: string
  port: number
  /** null: mail stays in the outbox. */
  smtp: SmtpSettings | null
  logLevel: LogLevel
}

/** Every setting with its meaning, as `DEVELOPERS.md` and a failed start show them. */
export const SETTINGS = {
  SEMILATUS_DATA_DIR: 'folder that holds the database; default .data/live',
  SEMILATUS_HOST: 'address to listen on; default 127.0.0.1',
  SEMILATUS_PORT: 'port to listen on, 1 to 65535; default 3000',
  SEMILATUS_BASE_URL: 'where people reach this installation, such as https://orbits.example.org; default http://HOST:PORT',
  SEMILATUS_MAIL: '"smtp" or "none" (mail stays in the outbox); default none',
  SEMILATUS_SMTP_HOST: 'host of the mail server; needed for smtp',
  SEMILATUS_SMTP_PORT: 'port of the mail server; default 587',
  SEMILATUS_SMTP_FROM: 'sender address; needed for smtp',
  SEMILATUS_SMTP_USER: 'name at the mail server; optional',
  SEMILATUS_SMTP_PASSWORD: 'password at the mail server; needed with SEMILATUS_SMTP_USER',
  SEMILATUS_LOG_LEVEL: `one of ${LOG_LEVELS.join(', ')}; default info`,
  NUXT_SESSION_PASSWORD: 'secret of 32 characters or more that seals the session cookie; the start script makes it',
} as const

export class SettingsError extends Error {
  constructor(readonly problems: string[]) {
    super(`The settings cannot be used:\n${problems.map(problem => `- ${problem}`).join('\n')}`)
    this.name = 'SettingsError'
  }
}

type Environment = Record<string, string | undefined>

/** Reads and checks all settings; throws a SettingsError that names every one that is wrong. */
export function readSettings(env: Environment = process.env): Settings {
  const problems: string[] = []
  const refuse = (name: keyof typeof SETTINGS, why: string) => problems.push(`${name} ${why} (${SETTINGS[name]}).`)

  const dataDir = resolve(env.SEMILATUS_DATA_DIR || '.data/live')
  const host = env.SEMILATUS_HOST || '127.0.0.1'
  const port = readPort(env.SEMILATUS_PORT, 3000)
  if (port === null) refuse('SEMILATUS_PORT', `is "${env.SEMILATUS_PORT}"`)
  const baseUrl = (env.SEMILATUS_BASE_URL || `http://${nameOfHost(host)}:${port}`).replace(/\/+$/, '')
  if (!isWebAddress(baseUrl)) refuse('SEMILATUS_BASE_URL', `is "${baseUrl}"`)
  const logLevel = LOG_LEVELS.find(level => level === (env.SEMILATUS_LOG_LEVEL || 'info'))
  if (!logLevel) refuse('SEMILATUS_LOG_LEVEL', `is "${env.SEMILATUS_LOG_LEVEL}"`)
  if ((env.NUXT_SESSION_PASSWORD ?? '').length < 32) refuse('NUXT_SESSION_PASSWORD', 'is missing or shorter than 32 characters')
  const smtp = readSmtp(env, refuse)

  if (problems.length > 0 || port === null || !logLevel) throw new SettingsError(problems)
  return { dataDir, databaseFile: resolve(dataDir, 'semilatus.sqlite3'), baseUrl, host, port, smtp, logLevel }
}

function readSmtp(env: Environment, refuse: (name: keyof typeof SETTINGS, why: string) => void): SmtpSettings | null {
  const kind = env.SEMILATUS_MAIL || 'none'
  if (kind === 'none') return null
  if (kind !== 'smtp') {
    refuse('SEMILATUS_MAIL', `is "${kind}"`)
    return null
  }
  const port = readPort(env.SEMILATUS_SMTP_PORT, 587)
  if (!env.SEMILATUS_SMTP_HOST) refuse('SEMILATUS_SMTP_HOST', 'is missing')
  if (port === null) refuse('SEMILATUS_SMTP_PORT', `is "${env.SEMILATUS_SMTP_PORT}"`)
  if (!env.SEMILATUS_SMTP_FROM) refuse('SEMILATUS_SMTP_FROM', 'is missing')
  if (env.SEMILATUS_SMTP_USER && !env.SEMILATUS_SMTP_PASSWORD) refuse('SEMILATUS_SMTP_PASSWORD', 'is missing')
  return {
    host: env.SEMILATUS_SMTP_HOST ?? '',
    port: port ?? 0,
    from: env.SEMILATUS_SMTP_FROM ?? '',
    user: env.SEMILATUS_SMTP_USER || null,
    password: env.SEMILATUS_SMTP_PASSWORD || null,
  }
}

function readPort(text: string | undefined, fallback: number): number | null {
  if (!text) return fallback
  const port = /^\d{1,5}$/.test(text) ? Number(text) : 0
  return port >= 1 && port <= 65535 ? port : null
}

/** A host as it stands in an address: any interface is reached as localhost, IPv6 stands in brackets. */
function nameOfHost(host: string): string {
  if (host === '0.0.0.0' || host === '::') return 'localhost'
  return host.includes(':') ? `[${host}]` : host
}

function isWebAddress(text: string): boolean {
  if (!URL.canParse(text)) return false
  const { protocol, pathname, search, hash } = new URL(text)
  return (protocol === 'http:' || protocol === 'https:') && pathname === '/' && search === '' && hash === ''
}
