import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { fitOrbit } from '../../../../fitting'
import { ENGINE_VERSION } from '../../../../fitting/version'
import { goldenRequests, goldenTexts } from '../../../builders/engine-golden'
import { goldenHashes } from '../../../builders/golden-hashes'

interface Golden {
  version: string
  whole: string
}

const golden = JSON.parse(readFileSync(new URL('../../../fixtures/golden/engine.json', import.meta.url), 'utf8')) as Golden

describe('golden results of the engine', () => {
  const hashes = goldenHashes(goldenTexts())

  it('have not changed without a new engine version (write the new version and hash to tests/fixtures/golden/engine.json)', () => {
    expect({ version: ENGINE_VERSION, whole: hashes.whole }).toEqual(golden)
  })

  it('are the same when the same requests are fitted again', () => {
    const some = goldenRequests().filter((_, i) => i % 8 === 0)
    const twice = [some, some].map((requests) => requests.map((request) => JSON.stringify(fitOrbit(request))))
    expect(twice[1]).toEqual(twice[0])
  }, 60_000)

  it('number two hundred', () => {
    expect(goldenRequests()).toHaveLength(200)
    expect(new Set(hashes.each).size).toBe(200)
  })
})
