import { describe, expect, it } from 'vitest'
import { JOB_CONTRACTS } from '../../server/jobs/contracts'
import { jobDefinitions } from '../../server/jobs/definitions/registry'
import { readSources } from './source-files'

const files = readSources().map(({ path }) => path).filter(path => path.startsWith('server/jobs/definitions/') && path.endsWith('.job.ts'))

describe('every job', () => {
  it('has a schema by its name, and that very schema is what its payload is read by', () => {
    for (const { name, schema } of jobDefinitions) expect(schema).toBe(JOB_CONTRACTS[name])
  })

  it('that has a contract is run by this server, once', () => {
    expect(jobDefinitions.map(({ name }) => name).sort()).toEqual(Object.keys(JOB_CONTRACTS).sort())
  })

  it('stands in a file of its name, and every such file is in the registry', () => {
    expect(files.map(path => path.replace(/^.*\/|\.job\.ts$/g, '')).sort()).toEqual(jobDefinitions.map(({ name }) => name).sort())
  })
})
