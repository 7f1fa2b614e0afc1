import { describe, expect, it } from 'vitest'
import { formatCount, formatDate, formatDateTime, formatJulianDate, formatJulianDay, formatUtcTime, formatWaiting } from '../../../../shared/units/date-text'

describe('dates in words', () => {
  it('a day is written in UTC whatever offset the instant came with', () => {
    expect(formatDate('2026-03-14T21:04:00.000Z')).toBe('14 Mar 2026')
    expect(formatDate('2026-03-15T00:30:00+02:00')).toBe('14 Mar 2026')
  })

  it('an instant is written to the minute and names UTC', () => {
    expect(formatDateTime('2026-12-01T05:09:59.999Z')).toBe('1 Dec 2026, 05:09 UTC')
  })

  it('a Julian date is written as day and month, or with decimals of the day that go over to the next month', () => {
    expect(formatJulianDay(2461114.5)).toBe('15 Mar')
    expect(formatJulianDay(2461114.5, true)).toBe('15 Mar 2026')
    expect(formatJulianDate(2461142.814, 3)).toBe('2026 Apr 12.314')
    expect(formatJulianDate(2461130.4999, 2)).toBe('2026 Mar 31.00')
    expect(formatJulianDate(2461131.4999, 2)).toBe('2026 Apr 1.00')
  })

  it('an instant in a table is written to the second', () => {
    expect(formatUtcTime('2026-03-14T20:51:07.600Z')).toBe('2026-03-14 20:51:08')
  })

  it('text that is no instant is refused rather than printed as NaN', () => {
    expect(() => formatDate('soon')).toThrow('not an ISO 8601 instant: soon')
  })
})

describe('waiting time', () => {
  const since = '2026-12-01T12:00:00.000Z'
  it.each([
    ['2026-12-07T12:00:00.000Z', '6 days'],
    ['2026-12-02T11:59:59.000Z', '23 hours'],
    ['2026-12-01T13:00:00.000Z', '1 hour'],
    ['2026-12-01T12:00:59.000Z', 'moments'],
    ['2026-11-30T12:00:00.000Z', 'moments'],
  ])('until %s is %s', (now, words) => expect(formatWaiting(since, now)).toBe(words))
})

describe('counts', () => {
  it('one stands with the singular and none with the plural', () => {
    expect(formatCount(1, 'measure')).toBe('1 measure')
    expect(formatCount(0, 'measure')).toBe('0 measures')
    expect(formatCount(2, 'batch', 'batches')).toBe('2 batches')
  })
})
