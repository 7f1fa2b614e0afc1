import { describe, expect, it } from 'vitest'
import { chiSquareQuantile, chiSquareShares, fQuantile, fShares, normalShares, studentShares } from '../../fitting/uncertainty/distributions'
import { cell, checkAgainst, readFixture } from './published'

const SMALLEST_NORMAL = 2.3e-308

describe('critical values of χ²', () => {
  // Degrees of freedom, cumulative probability, value.
  const rows = [
    [1, 0.95, 3.841], [2, 0.95, 5.991], [3, 0.95, 7.815], [5, 0.95, 11.07], [10, 0.95, 18.307], [20, 0.95, 31.41], [30, 0.95, 43.773],
    [50, 0.95, 67.505], [100, 0.95, 124.342], [1, 0.99, 6.635], [10, 0.99, 23.209], [30, 0.99, 50.892], [10, 0.05, 3.94], [10, 0.01, 2.558],
    [10, 0.025, 3.247], [10, 0.975, 20.483], [7, 0.999, 24.322],
  ] as const
  checkAgainst('NIST/SEMATECH e-Handbook of Statistical Methods, sec. 1.3.6.7.4 (from memory)', rows.map(([degrees, p, expected]) => (
    { quantity: `χ²(${degrees}, ${p})`, expected, tolerance: 6e-4, computed: () => chiSquareQuantile(p, degrees) }
  )))
})

describe('critical values of F', () => {
  // Degrees of freedom of numerator and denominator, cumulative probability, value.
  const rows = [
    [1, 10, 0.95, 4.965], [3, 20, 0.95, 3.098], [5, 10, 0.95, 3.326], [10, 10, 0.95, 2.978], [7, 30, 0.95, 2.334], [2, 60, 0.95, 3.15],
    [1, 10, 0.99, 10.044], [5, 10, 0.99, 5.636], [10, 20, 0.99, 3.368], [7, 30, 0.99, 3.304],
  ] as const
  checkAgainst('NIST/SEMATECH e-Handbook of Statistical Methods, sec. 1.3.6.7.3 (from memory)', rows.map(([above, below, p, expected]) => (
    { quantity: `F(${above}, ${below}, ${p})`, expected, tolerance: 6e-4, computed: () => fQuantile(p, above, below) }
  )))
})

describe('shares below and above', () => {
  const sharesOf = (row: Record<string, string>) => {
    const x = cell(row, 'x')
    if (row.distribution === 'normal') return normalShares(x)
    if (row.distribution === 't') return studentShares(x, cell(row, 'degrees_1'))
    if (row.distribution === 'chi-square') return chiSquareShares(x, cell(row, 'degrees_1'))
    return fShares(x, cell(row, 'degrees_1'), cell(row, 'degrees_2'))
  }

  it.each(['chi-square', 'F', 'normal', 't'])('of %s are within 2e-15 of 50-digit values, and tails keep their figures', (distribution) => {
    const rows = readFixture('distribution_shares.csv').filter(row => row.distribution === distribution)
    expect(rows.length).toBeGreaterThan(30)
    for (const row of rows) {
      const { lower, upper } = sharesOf(row)
      const where = JSON.stringify(row)
      expect(Math.abs(lower - cell(row, 'lower')), where).toBeLessThanOrEqual(2e-15)
      expect(Math.abs(upper - cell(row, 'upper')), where).toBeLessThanOrEqual(2e-15)
      for (const [share, exact] of [[lower, cell(row, 'lower')], [upper, cell(row, 'upper')]] as const) {
        if (exact > SMALLEST_NORMAL) expect(Math.abs(share / exact - 1), where).toBeLessThanOrEqual(1e-13)
      }
    }
  })
})
