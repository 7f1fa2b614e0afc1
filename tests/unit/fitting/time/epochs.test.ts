import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  besselianEpochFromJd, besselianEpochFromJulian, DELTA_T_YEARS, deltaTSeconds, jdFromBesselianEpoch, jdFromCalendar, jdFromJulianEpoch, jdFromMjd, julianEpochFromBesselian, julianEpochFromJd, julianEpochFromWritten,
  LEAP_SECONDS_EXPIRE_JD, isoDateFromJd, mjdFromJd, taiMinusUtcSeconds, ttFromUtc, ttMinusUtcSeconds,
} from '../../../../fitting/time'

const runs = { seed: 8, numRuns: 2000 }

describe('epochs', () => {
  it('go to Julian dates and back without loss', () => {
    fc.assert(fc.property(fc.double({ min: 1600, max: 2500, noNaN: true }), (epoch) => {
      expect(Math.abs(julianEpochFromJd(jdFromJulianEpoch(epoch)) - epoch)).toBeLessThanOrEqual(3e-12)
      expect(Math.abs(besselianEpochFromJd(jdFromBesselianEpoch(epoch)) - epoch)).toBeLessThanOrEqual(3e-12)
      expect(Math.abs(besselianEpochFromJulian(julianEpochFromBesselian(epoch)) - epoch)).toBeLessThanOrEqual(3e-12)
    }), runs)
  })

  it('as written are Besselian with B or below 1984.0, Julian with J or from 1984.0', () => {
    expect(julianEpochFromWritten(1950)).toBe(julianEpochFromBesselian(1950))
    expect(julianEpochFromWritten(1983.999)).not.toBe(1983.999)
    expect(julianEpochFromWritten(1984)).toBe(1984)
    expect(julianEpochFromWritten(1950, 'J')).toBe(1950)
    expect(julianEpochFromWritten(2000, 'B')).toBeCloseTo(1999.9987225, 6)
  })

  it('MJD and JD differ by 2400000.5 days', () => {
    expect(mjdFromJd(2451545)).toBe(51544.5)
    expect(jdFromMjd(51544.5)).toBe(2451545)
  })
})

describe('UTC and TT', () => {
  it('never run back: TT − UTC grows by one second at a time from 1972', () => {
    let before = ttMinusUtcSeconds(jdFromCalendar({ year: 1972, month: 1, day: 1 }))
    expect(before).toBeCloseTo(42.184, 10)
    const steps: number[] = []
    for (let jd = 2441317.5; jd < LEAP_SECONDS_EXPIRE_JD; jd += 1) {
      const now = ttMinusUtcSeconds(jd)
      if (now !== before) steps.push(Math.round((now - before) * 1e6) / 1e6)
      before = now
    }
    expect(steps).toEqual(new Array(27).fill(1))
  })

  it('join the table of ΔT within half a second at 1972', () => {
    const jd = jdFromCalendar({ year: 1972, month: 1, day: 1 })
    expect(Math.abs(ttMinusUtcSeconds(jd - 1) - ttMinusUtcSeconds(jd))).toBeLessThan(0.5)
    expect(taiMinusUtcSeconds(jd - 1)).toBeNaN()
  })

  it('keep the last known value after the table expires, on a day that is stated', () => {
    expect(isoDateFromJd(LEAP_SECONDS_EXPIRE_JD)).toBe('2027-06-28')
    expect(ttMinusUtcSeconds(LEAP_SECONDS_EXPIRE_JD + 1000)).toBeCloseTo(69.184, 10)
  })

  it('are not known before 1620', () => {
    expect(ttFromUtc(jdFromCalendar({ year: 1619, month: 6, day: 1 }))).toBeNaN()
    expect(ttFromUtc(NaN)).toBeNaN()
    expect(ttFromUtc(2451545) - 2451545).toBeCloseTo(64.184 / 86400, 8)
  })
})

describe('ΔT', () => {
  it('is continuous between the entries of its table', () => {
    let largest = 0
    for (let year = DELTA_T_YEARS.first; year < DELTA_T_YEARS.last - 0.01; year += 0.01) largest = Math.max(largest, Math.abs(deltaTSeconds(year + 0.01) - deltaTSeconds(year)))
    expect(largest).toBeLessThan(0.7)
  })

  it('has no value outside its table', () => {
    expect([deltaTSeconds(1619.9), deltaTSeconds(2010.1), deltaTSeconds(NaN)]).toEqual([NaN, NaN, NaN])
  })
})
