import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isoDateFromJd, isoTimeFromJd, readIsoTime } from '../../../../fitting/time'

describe('readIsoTime', () => {
  it.each([
    ['2000-01-01', 2451544.5], ['2000-01-01T12:00', 2451545], ['2000-01-01 12:00:00', 2451545], ['2000-01-01T12:00:00Z', 2451545],
    [' 2000-01-01T12:00:00.000z ', 2451545], ['2000-01-01T14:00+02:00', 2451545], ['2000-01-01T05:30-06:30', 2451545], ['2000-01-01T24:00', 2451545.5],
    ['2016-12-31T23:59:60Z', 2457754.5], ['1600-02-29', 2305506.5],
  ])('reads %s', (text, jd) => {
    expect(readIsoTime(text)).toMatchObject({ ok: true, jd: expect.closeTo(jd, 8) })
  })

  it('keeps fractions of a second to the precision of a Julian date', () => {
    const early = readIsoTime('2020-05-05T05:05:05.25Z')
    const late = readIsoTime('2020-05-05T05:05:05.75Z')
    if (!early.ok || !late.ok) throw new Error('both are times')
    expect((late.jd - early.jd) * 86400).toBeCloseTo(0.5, 3)
  })

  it('says whether a time and a zone were given', () => {
    expect(readIsoTime('2020-05-05')).toMatchObject({ hasTime: false, hasZone: false })
    expect(readIsoTime('2020-05-05T01:00')).toMatchObject({ hasTime: true, hasZone: false })
    expect(readIsoTime('2020-05-05T01:00Z')).toMatchObject({ hasTime: true, hasZone: true })
  })

  it.each([
    ['', 'not-iso'], ['yesterday', 'not-iso'], ['05/05/2020', 'not-iso'], ['2020-5-5', 'not-iso'], ['2020-05-05T5:00', 'not-iso'], ['20200505', 'not-iso'],
    ['2020-05-05Z', 'not-iso'], ['NaN', 'not-iso'], ['2020-02-30', 'no-such-date'], ['2023-02-29', 'no-such-date'], ['2020-13-01', 'no-such-date'], ['2020-00-10', 'no-such-date'],
    ['2020-05-05T24:01', 'no-such-time'], ['2020-05-05T12:60', 'no-such-time'], ['2020-05-05T12:30:60', 'no-such-time'], ['2020-05-05T12:30+25:00', 'no-such-time'],
  ])('refuses "%s" as %s', (text, problem) => {
    expect(readIsoTime(text)).toEqual({ ok: false, problem })
  })
})

describe('writing ISO times', () => {
  it('gives the Julian date back to half a second', () => {
    fc.assert(fc.property(fc.double({ min: 1_721_060, max: 5_373_484, noNaN: true }), (jd) => {
      const read = readIsoTime(isoTimeFromJd(jd))
      expect(read.ok && Math.abs(read.jd - jd) * 86400 <= 0.5001).toBe(true)
    }), { seed: 6, numRuns: 3000 })
  })

  it('carries a rounded second into the next day and year', () => {
    expect(isoTimeFromJd(2451544.5 - 0.2 / 86400)).toBe('2000-01-01T00:00:00Z')
    expect(isoTimeFromJd(2451545)).toBe('2000-01-01T12:00:00Z')
    expect(isoDateFromJd(2451545)).toBe('2000-01-01')
  })

  it('writes nothing outside the years 0 to 9999', () => {
    expect([isoTimeFromJd(0), isoTimeFromJd(NaN), isoTimeFromJd(6e6), isoDateFromJd(-5)]).toEqual(['', '', '', ''])
  })
})
