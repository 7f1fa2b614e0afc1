import { describe, expect, it } from 'vitest'
import { citationSentence } from '../../../../server/domain/citation'
import { canBecome } from '../../../../server/domain/edition-state'
import { isOnTheCurve, predictionPlaces } from '../../../../server/domain/edition-predictions'
import { creditedObservers, sealSnapshot } from '../../../../server/domain/edition-snapshot'
import { canonicalJson } from '../../../../server/domain/canonical-json'
import type { EditionSnapshot } from '../../../../shared/schemas/editions'

describe('canonicalJson', () => {
  it('writes the numbers and the key order of RFC 8785', () => {
    // The numbers of RFC 8785, section 3.2.2, and its ordering by UTF-16 code units, section 3.2.3.
    // eslint-disable-next-line no-loss-of-precision -- the standard writes one digit too many on purpose
    expect(canonicalJson({ numbers: [333333333.33333329, 1e30, 4.50, 2e-3, 0.000000000000000000000000001] }))
      .toBe('{"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27]}')
    expect(canonicalJson({ '\u20ac': 1, '\r': 2, '\ufb33': 3, '1': 4, '\ud83d\ude00': 5, '\u0080': 6, '\u00f6': 7 }))
      .toBe('{"\\r":2,"1":4,"\u0080":6,"ö":7,"€":1,"😀":5,"\ufb33":3}')
  })

  it('refuses what JSON cannot say', () => {
    expect(() => canonicalJson({ value: NaN })).toThrow()
    expect(() => canonicalJson(undefined)).toThrow(TypeError)
  })
})

describe('sealSnapshot', () => {
  it('gives the same bytes and the same hash whatever the order of the keys', () => {
    const a = sealSnapshot({ format: 1, product: 'Semilatus' } as EditionSnapshot)
    const b = sealSnapshot({ product: 'Semilatus', format: 1 } as EditionSnapshot)
    expect(a).toEqual(b)
    // printf '{"format":1,"product":"Semilatus"}' | sha256sum
    expect(a.sha256).toBe('6a32aba6fdfcf47e7fb3ea8ef11c94b521eb9945b6594d09f624e15f83f738e9')
  })
})

describe('creditedObservers', () => {
  it('counts what was used and leaves out what was set aside', () => {
    expect(creditedObservers([
      { observer: 'T. Orrowin', role: 'used' }, { observer: 'Ossian Brandvik', role: 'used' }, { observer: 'Ossian Brandvik', role: 'used' },
      { observer: 'Ilka Soundraven', role: 'set-aside' }, { observer: 'R. Quellmann', role: 'not-fitted' }, { observer: 'Mirelle Tasque', role: 'used' },
    ])).toEqual([{ name: 'Ossian Brandvik', measures: 2 }, { name: 'Mirelle Tasque', measures: 1 }, { name: 'T. Orrowin', measures: 1 }])
  })
})

describe('citationSentence', () => {
  const edition = { programmeName: 'Northern pairs', targetName: 'Linden 12 AB', number: 2, publishedAt: '2026-03-14T21:00:00.000Z', url: 'https://orbits.example.org/orbits/t/2' }

  it('names programme, year, target, number, observers, address and licence', () => {
    expect(citationSentence({ ...edition, observers: ['Ossian Brandvik', 'T. Orrowin', 'Ilka Soundraven'] })).toBe(
      'Northern pairs (2026): Orbit of Linden 12 AB, edition 2. Measures by Ossian Brandvik, T. Orrowin and Ilka Soundraven. https://orbits.example.org/orbits/t/2 (CC BY 4.0)',
    )
  })

  it('counts the rest of a long list', () => {
    expect(citationSentence({ ...edition, observers: 'ABCDEFGHIJ'.split('') })).toContain('G, H and 2 others')
  })
})

describe('predictionPlaces', () => {
  it('gives ten years from the year of publication for a pair, and every tenth degree in the plane', () => {
    expect(predictionPlaces('relative', '2026-12-31T23:59:59.999Z')).toEqual([2026, 2027, 2028, 2029, 2030, 2031, 2032, 2033, 2034, 2035])
    const directions = predictionPlaces('plane', '2026-01-01T00:00:00.000Z')
    expect(directions).toHaveLength(36)
    expect([directions[0], directions[35]]).toEqual([0, 350])
  })

  it('gives every second day of forty and every thirtieth of a year, from the day after publication, for a body that moves', () => {
    const dates = predictionPlaces('equatorial', '2026-03-14T20:51:00.000Z')
    expect(dates.slice(0, 3)).toEqual([2461114.5, 2461116.5, 2461118.5])
    expect(dates[20]! - dates[0]!).toBe(40)
    expect(dates.slice(21, 23).map(at => at - dates[0]!)).toEqual([70, 100])
    expect(dates.at(-1)! - dates[0]!).toBe(370)
  })

  it('keeps no prediction where an open conic has none', () => {
    expect(isOnTheCurve({ at: 180, values: {}, sigmas: {}, correlation: null })).toBe(false)
    expect(isOnTheCurve({ at: 0, values: { r: 1 }, sigmas: { r: null }, correlation: null })).toBe(true)
  })
})

describe('the life of an edition', () => {
  it('ends in superseded or withdrawn', () => {
    const states = ['published', 'superseded', 'withdrawn'] as const
    const open = states.flatMap(from => states.filter(to => canBecome(from, to)).map(to => `${from} → ${to}`))
    expect(open).toEqual(['published → superseded', 'published → withdrawn'])
  })
})
