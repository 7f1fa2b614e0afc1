import { describe, expect, it } from 'vitest'
import {
  besselianEpochFromJd, besselianEpochFromJulian, calendarFromJd, deltaTSeconds, jdFromBesselianEpoch, jdFromCalendar, jdFromJulianEpoch, julianEpochFromBesselian, julianEpochFromJd, mjdFromJd,
  taiMinusUtcSeconds, ttMinusUtcSeconds,
} from '../../fitting/time'
import { cell, checkAgainst, readFixture } from './published'

describe('Julian dates of the civil calendar', () => {
  // Year, month, day with fraction, Julian date.
  const rows = [
    [1957, 10, 4.81, 2436116.31], [333, 1, 27.5, 1842713], [2000, 1, 1.5, 2451545], [1999, 1, 1, 2451179.5], [1987, 1, 27, 2446822.5],
    [1987, 6, 19.5, 2446966], [1988, 1, 27, 2447187.5], [1988, 6, 19.5, 2447332], [1900, 1, 1, 2415020.5], [1600, 1, 1, 2305447.5],
    [1600, 12, 31, 2305812.5], [837, 4, 10.3, 2026871.8], [-123, 12, 31, 1676496.5], [-122, 1, 1, 1676497.5], [-1000, 7, 12.5, 1356001],
    [-1000, 2, 29, 1355866.5], [-1001, 8, 17.9, 1355671.4], [-4712, 1, 1.5, 0],
  ] as const
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., ch. 7, Examples 7.a and 7.b and table p. 62', rows.map(([year, month, day, jd]) => (
    { quantity: `JD of ${year} ${month} ${day}`, expected: jd, tolerance: 1e-6, computed: () => jdFromCalendar({ year, month, day }) }
  )))

  it.each(rows)('%i %i %d comes back from its Julian date', (year, month, day, jd) => {
    const date = calendarFromJd(jd)
    expect([date.year, date.month]).toEqual([year, month])
    expect(date.day).toBeCloseTo(day, 6)
  })
})

describe('Besselian and Julian epochs', () => {
  checkAgainst('Lieske 1979, A&A 73, 282, and Meeus 1998, Astronomical Algorithms, p. 133', [
    { quantity: 'JD of B1950.0', expected: 2433282.4235, tolerance: 1e-4, computed: () => jdFromBesselianEpoch(1950) },
    { quantity: 'JD of J2050.0', expected: 2469807.5, tolerance: 1e-9, computed: () => jdFromJulianEpoch(2050) },
  ])
  checkAgainst('the test values of the IAU SOFA routines epb, epb2jd, epj and epj2jd', [
    { quantity: 'B of JD 2445122.99998', expected: 1982.418424159279, tolerance: 2e-12, computed: () => besselianEpochFromJd(2415019.8135 + 30103.18648) },
    { quantity: 'MJD of B1957.3', expected: 35948.1915101513, tolerance: 1e-9, computed: () => mjdFromJd(jdFromBesselianEpoch(1957.3)) },
    { quantity: 'J of JD 2444152.5', expected: 1979.760438056126, tolerance: 1e-12, computed: () => julianEpochFromJd(2451545 - 7392.5) },
    { quantity: 'MJD of J1996.8', expected: 50375.7, tolerance: 1e-7, computed: () => mjdFromJd(jdFromJulianEpoch(1996.8)) },
  ])
  checkAgainst('the formulas of Lieske 1979, A&A 73, 282', [
    { quantity: 'J of B2000.0', expected: 1999.998722, tolerance: 1e-5, standing: 'own', computed: () => julianEpochFromBesselian(2000) },
    { quantity: 'B of J2000.0', expected: 2000.001278, tolerance: 1e-6, standing: 'own', computed: () => besselianEpochFromJulian(2000) },
  ])
})

describe('leap seconds', () => {
  // First day of validity and TAI − UTC in seconds.
  const rows = [
    [1972, 1, 1, 10], [1972, 7, 1, 11], [1973, 1, 1, 12], [1974, 1, 1, 13], [1975, 1, 1, 14], [1976, 1, 1, 15], [1977, 1, 1, 16], [1978, 1, 1, 17],
    [1979, 1, 1, 18], [1980, 1, 1, 19], [1981, 7, 1, 20], [1982, 7, 1, 21], [1983, 7, 1, 22], [1985, 7, 1, 23], [1988, 1, 1, 24], [1990, 1, 1, 25],
    [1991, 1, 1, 26], [1992, 7, 1, 27], [1993, 7, 1, 28], [1994, 7, 1, 29], [1996, 1, 1, 30], [1997, 7, 1, 31], [1999, 1, 1, 32], [2006, 1, 1, 33],
    [2009, 1, 1, 34], [2012, 7, 1, 35], [2015, 7, 1, 36], [2017, 1, 1, 37], [1998, 12, 31, 31], [2008, 1, 17, 33],
  ] as const
  checkAgainst('IERS Bulletin C', rows.map(([year, month, day, seconds]) => (
    { quantity: `TAI − UTC (s) on ${year} ${month} ${day}`, expected: seconds, tolerance: 0, computed: () => taiMinusUtcSeconds(jdFromCalendar({ year, month, day })) }
  )))
  checkAgainst('IERS Bulletin C with TT = TAI + 32.184 s', [
    { quantity: 'TT − UTC (s) in 2020', expected: 69.184, tolerance: 1e-9, computed: () => ttMinusUtcSeconds(jdFromCalendar({ year: 2020, month: 1, day: 1 })) },
  ])

  it.each(rows.slice(1, 28))('the step to the value of %i %i %i falls at 0h UTC and not a second before', (year, month, day, seconds) => {
    const jd = jdFromCalendar({ year, month, day })
    expect(taiMinusUtcSeconds(jd - 1 / 86400)).toBe(seconds - 1)
  })
})

describe('ΔT before the atomic seconds', () => {
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Table 10.A p. 79 and Example 10.a', [
    { quantity: 'ΔT (s) on 1977 February 18', expected: 47.6, tolerance: 0.25, computed: () => deltaTSeconds(1977 + 48 / 365) },
    { quantity: 'ΔT (s) in 1980', expected: 50.5, tolerance: 0, computed: () => deltaTSeconds(1980) },
    { quantity: 'ΔT (s) in 2000', expected: 63.8, tolerance: 0, computed: () => deltaTSeconds(2000) },
    { quantity: 'ΔT (s) in 1900', expected: -2.8, tolerance: 0, computed: () => deltaTSeconds(1900) },
  ])

  it('every entry of the printed table comes back', () => {
    const rows = readFixture('delta_t.csv')
    expect(rows).toHaveLength(196)
    for (const row of rows) expect(deltaTSeconds(cell(row, 'year'))).toBe(cell(row, 'delta_t_s'))
  })
})
