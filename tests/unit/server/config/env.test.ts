import { expect, test } from 'vitest'
import { readSettings, SettingsError } from '../../../../server/config/env'

const secret = { NUXT_SESSION_PASSWORD: 'x'.repeat(32) }

function problemsOf(env: Record<string, string>): string[] {
  try {
    readSettings({ ...secret, ...env })
    return []
  }
  catch (error) {
    if (error instanceof SettingsError) return error.problems
    throw error
  }
}

test('everything but the secret has a default', () => {
  expect(readSettings(secret)).toMatchObject({ host: '127.0.0.1', port: 3000, baseUrl: 'http://127.0.0.1:3000', smtp: null, logLevel: 'info' })
  expect(readSettings(secret).databaseFile).toMatch(/\.data\/live\/semilatus\.sqlite3$/)
})

test('the base address follows host and port, and loses a slash at its end', () => {
  expect(readSettings({ ...secret, SEMILATUS_HOST: '0.0.0.0', SEMILATUS_PORT: '8080' }).baseUrl).toBe('http://localhost:8080')
  expect(readSettings({ ...secret, SEMILATUS_HOST: '::1' }).baseUrl).toBe('http://[::1]:3000')
  expect(readSettings({ ...secret, SEMILATUS_BASE_URL: 'https://orbits.example.org/' }).baseUrl).toBe('https://orbits.example.org')
})

test('all settings that are wrong are named at once, each with what it takes', () => {
  const problems = problemsOf({ NUXT_SESSION_PASSWORD: 'short', SEMILATUS_PORT: '70000', SEMILATUS_BASE_URL: 'orbits', SEMILATUS_LOG_LEVEL: 'loud', SEMILATUS_MAIL: 'pigeon' })
  expect(problems.map(problem => problem.split(' ')[0])).toEqual(['SEMILATUS_PORT', 'SEMILATUS_BASE_URL', 'SEMILATUS_LOG_LEVEL', 'NUXT_SESSION_PASSWORD', 'SEMILATUS_MAIL'])
  expect(problems[0]).toContain('1 to 65535')
})

test.each(['http://a.example/path', 'ftp://a.example', 'https://a.example/?x=1'])('%s is no base address', (url) => {
  expect(problemsOf({ SEMILATUS_BASE_URL: url })).toHaveLength(1)
})

test('mail by smtp needs host and sender, and a password with a user', () => {
  expect(problemsOf({ SEMILATUS_MAIL: 'smtp' })).toHaveLength(2)
  expect(problemsOf({ SEMILATUS_MAIL: 'smtp', SEMILATUS_SMTP_HOST: 'mail.example', SEMILATUS_SMTP_FROM: 'a@example.org', SEMILATUS_SMTP_USER: 'a' })).toHaveLength(1)
  expect(readSettings({ ...secret, SEMILATUS_MAIL: 'smtp', SEMILATUS_SMTP_HOST: 'mail.example', SEMILATUS_SMTP_FROM: 'a@example.org' }).smtp)
    .toEqual({ host: 'mail.example', port: 587, from: 'a@example.org', user: null, password: null })
})

test('no problem repeats a secret', () => {
  expect(problemsOf({ NUXT_SESSION_PASSWORD: 'hunter2' }).join()).not.toContain('hunter2')
})
