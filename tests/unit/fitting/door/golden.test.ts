import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { ENGINE_VERSION } from '../../../../fitting/version'
import { goldenHashes, goldenRequests } from '../../../builders/engine-golden'
import { sha256Hex } from '../../../builders/sha256'

interface Golden {
  version: string
  whole: string
}

const golden = JSON.parse(readFileSync(new URL('../../../fixtures/golden/engine.json', import.meta.url), 'utf8')) as Golden

describe('golden results of the engine', () => {
  const hashes = goldenHashes()

  it('have not changed without a new engine version (write the new version and hash to tests/fixtures/golden/engine.json)', () => {
    expect({ version: ENGINE_VERSION, whole: hashes.whole }).toEqual(golden)
  })

  it('are the same when the same requests are fitted again', () => {
    expect(goldenHashes().whole).toBe(hashes.whole)
  })

  it('number two hundred', () => {
    expect(goldenRequests()).toHaveLength(200)
    expect(new Set(hashes.each).size).toBe(200)
  })
})

describe('sha256Hex', () => {
  it.each(['', 'abc', 'θ and ρ', 'x'.repeat(119), 'y'.repeat(1000)])('agrees with Node’s own digest of %j', (text) => {
    expect(sha256Hex(text)).toBe(createHash('sha256').update(text, 'utf8').digest('hex'))
  })
})
