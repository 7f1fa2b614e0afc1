import { describe, expect, it } from 'vitest'
import { AU_KM, earthHeliocentric, observerHeliocentric, observerWarnings, sunBarycentricVelocity } from '../../../../fitting/earth'
import { jdFromCalendar, LEAP_SECONDS_EXPIRE_JD } from '../../../../fitting/time'

const jdUtc = jdFromCalendar({ year: 2024, month: 3, day: 7.25 })
const station = { longitudeEastDeg: 6.9267, rhoCosPhi: 0.72368, rhoSinPhi: 0.68811 }
const centre = { longitudeEastDeg: 0, rhoCosPhi: 0, rhoSinPhi: 0 }

describe('the observer of a measure', () => {
  it('has the time in TT, and at the centre of the Earth the place of the Earth and the velocity of the Sun', () => {
    const observer = observerHeliocentric(centre, jdUtc)
    expect((observer.jdTt - jdUtc) * 86400).toBeCloseTo(69.184, 4)
    const earth = new Float64Array(6)
    const sun = new Float64Array(3)
    earthHeliocentric(observer.jdTt, earth)
    sunBarycentricVelocity(observer.jdTt, sun)
    expect(observer.place).toEqual([...earth.slice(0, 3)])
    expect(observer.sunVelocity).toEqual([...sun])
  })

  it('is a station\'s distance from the centre away from it, and higher in z where north of the equator', () => {
    const there = observerHeliocentric(station, jdUtc)
    const away = there.place.map((x, k) => (x - observerHeliocentric(centre, jdUtc).place[k]!) * AU_KM)
    expect(Math.hypot(...away)).toBeCloseTo(6378.137 * Math.hypot(station.rhoCosPhi, station.rhoSinPhi), 2)
    expect(away[2]).toBeGreaterThan(4350)
  })

  it('is its own: a later call leaves an earlier answer as it was', () => {
    const first = observerHeliocentric(station, jdUtc)
    const before = structuredClone(first)
    observerHeliocentric(station, jdUtc + 100)
    expect(first).toEqual(before)
  })

  it('is nowhere before 1620, where no table of ΔT reaches', () => {
    const observer = observerHeliocentric(station, jdFromCalendar({ year: 1619, month: 1, day: 1 }))
    expect(observer.jdTt).toBeNaN()
    expect(observer.place.every(Number.isNaN)).toBe(true)
  })
})

describe('warnings about observers', () => {
  it('are none from 1972 to the expiry of the leap seconds', () => {
    expect(observerWarnings([jdFromCalendar({ year: 1972, month: 1, day: 1 }), jdUtc, LEAP_SECONDS_EXPIRE_JD])).toEqual([])
    expect(observerWarnings([])).toEqual([])
  })

  it('say after the expiry which value was kept and what a new leap second would do', () => {
    const [warning, ...others] = observerWarnings([jdUtc, LEAP_SECONDS_EXPIRE_JD + 1])
    expect(others).toEqual([])
    expect(warning).toBe('1 measure is later than 2027-06-28, where the table of leap seconds ends. TT − UTC was taken as 69.184 s; a leap second '
      + 'decided since would shift these times by 1 s. A newer version of the engine knows it.')
  })

  it('say before 1972 that ΔT was used, and outside 1900 to 2100 how well the Earth is known', () => {
    const warnings = observerWarnings([1850, 1860, 1950, 2150].map(year => jdFromCalendar({ year, month: 6, day: 1 })))
    expect(warnings.map(text => text.slice(0, 24))).toEqual(['1 measure is later than ', '3 measures are earlier t', '3 measures are outside 1'])
    expect(warnings.join(' ')).not.toMatch(/NaN|undefined|\d\.\d{6}/)
  })
})
