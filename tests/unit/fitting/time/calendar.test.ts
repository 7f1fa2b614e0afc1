import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { calendarFromJd, isCalendarDate, jdFromCalendar, julianEpochFromCalendarYear } from '../../../../fitting/time'

describe('calendar dates', () => {
  it.each(['civil', 'gregorian'] as const)('come back from every thirteenth day of eleven thousand years in the %s calendar', (calendar) => {
    const lost: number[] = []
    for (let jd = 0.5; jd < 4_000_000; jd += 13) {
      const date = calendarFromJd(jd, calendar)
      if (!isCalendarDate(date, calendar) || jdFromCalendar(date, calendar) !== jd) lost.push(jd)
    }
    expect(lost).toEqual([])
  })

  it('keep the time of day', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 5_000_000, noNaN: true }), (jd) => {
      expect(Math.abs(jdFromCalendar(calendarFromJd(jd)) - jd)).toBeLessThanOrEqual(2e-9)
    }), { seed: 4, numRuns: 3000 })
  })

  it('pass from 1582 October 4 to October 15 in one day, and know none between', () => {
    expect(jdFromCalendar({ year: 1582, month: 10, day: 15 }) - jdFromCalendar({ year: 1582, month: 10, day: 4 })).toBe(1)
    expect(calendarFromJd(2299160.5)).toEqual({ year: 1582, month: 10, day: 15 })
    expect(calendarFromJd(2299159.5)).toEqual({ year: 1582, month: 10, day: 4 })
    expect(isCalendarDate({ year: 1582, month: 10, day: 10 })).toBe(false)
    expect(isCalendarDate({ year: 1582, month: 10, day: 10 }, 'gregorian')).toBe(true)
  })

  it('have a leap day in 2000 and 2024, none in 1900 but in the Julian year 1500', () => {
    const hasLeapDay = (year: number) => isCalendarDate({ year, month: 2, day: 29 })
    expect([2000, 2024, 1900, 2023, 1500].map(hasLeapDay)).toEqual([true, true, false, false, true])
    expect(isCalendarDate({ year: 1500, month: 2, day: 29 }, 'gregorian')).toBe(false)
  })

  it.each([
    { year: 2020, month: 0, day: 1 }, { year: 2020, month: 13, day: 1 }, { year: 2020, month: 4, day: 31 }, { year: 2020, month: 4, day: 0.9 },
    { year: 2020.5, month: 1, day: 1 }, { year: 2020, month: 1.5, day: 1 }, { year: NaN, month: 1, day: 1 }, { year: 2020, month: 1, day: NaN },
    { year: -5000, month: 1, day: 1 }, { year: 20230, month: 1, day: 1 }, { year: 2020, month: 1, day: 32 },
  ])('do not include $year $month $day', (date) => {
    expect(isCalendarDate(date)).toBe(false)
    expect(jdFromCalendar(date)).toBeNaN()
  })

  it('before the count of days have no date', () => {
    expect(calendarFromJd(-1).year).toBeNaN()
    expect(calendarFromJd(NaN).year).toBeNaN()
  })

  it('in decimals count through the calendar year', () => {
    expect(julianEpochFromCalendarYear(2000)).toBeCloseTo(2000 - 0.5 / 365.25, 12)
    expect(julianEpochFromCalendarYear(2024.5) - julianEpochFromCalendarYear(2024)).toBeCloseTo(183 / 365.25, 10)
    expect(julianEpochFromCalendarYear(2023.5) - julianEpochFromCalendarYear(2023)).toBeCloseTo(182.5 / 365.25, 10)
    expect(julianEpochFromCalendarYear(NaN)).toBeNaN()
  })
})
