import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { LANDED_MIGRATIONS } from './landed-migrations'
import { readSources } from './source-files'

const migrations = readSources().filter(({ path }) => path.startsWith('server/db/migrations/') && !path.endsWith('/index.ts'))
const hashOf = (text: string) => createHash('sha256').update(text).digest('hex')

describe('migrations', () => {
  it('are unchanged since they landed', () => {
    expect(Object.fromEntries(migrations.map(({ path, text }) => [path, hashOf(text)]))).toEqual(LANDED_MIGRATIONS)
  })

  it('are named by date and time, then verb and noun', () => {
    for (const { path } of migrations) expect(path).toMatch(/\/\d{4}-\d{2}-\d{2}T\d{4}_[a-z]+(?:_[a-z]+)+\.ts$/)
  })

  it('stand in the list that is run, in the order of their names', () => {
    const index = readSources().find(({ path }) => path === 'server/db/migrations/index.ts')
    const listed = [...(index?.text ?? '').matchAll(/['"](?:\.\/)?(\d{4}-\d{2}-\d{2}T\d{4}_\w+)['"]/g)].map(match => match[1])
    const names = migrations.map(({ path }) => path.replace(/^.*\/|\.ts$/g, ''))
    expect([...new Set(listed)]).toEqual(names)
  })
})
