import { describe, expect, it } from 'vitest'
import { readRow } from '../../../../shared/intake/read-row'
import { HOSTILE_CELLS } from '../../../fixtures/intake/hostile-cells'

const GOOD = { epoch: '2026.72', theta_deg: '62.4', rho_arcsec: '0.94' }
const parsed = (cells: Record<string, string>) => {
  const { parsed: row, problems } = readRow(cells, 'relative')
  expect(problems.filter(problem => problem.severity === 'error')).toEqual([])
  if (row?.kind !== 'relative') throw new Error('not read as a pair measure')
  return row
}

describe('a wrong cell of a row', () => {
  it.each(HOSTILE_CELLS)('is named with its value, a reason and a remedy: $cells', ({ cells, column, says }) => {
    const read = readRow(cells, 'relative', { rowNumber: 7 })
    expect(read.parsed).toBeNull()
    const problem = read.problems.find(candidate => candidate.severity === 'error')
    expect(problem).toMatchObject({ rowNumber: 7, column })
    expect(`${problem?.reason}. ${problem?.remedy}`).toContain(says)
    expect(problem?.remedy.length).toBeGreaterThan(5)
    if (column !== null) expect(problem?.value).toBe(cells[column]!.length > 80 ? `${cells[column]!.slice(0, 80)}…` : cells[column])
  })

  it('does not hide the other wrong cells of the row', () => {
    const { problems } = readRow({ epoch: '20230', theta_deg: '361', rho_arcsec: '0', nights: '0' }, 'relative')
    expect(problems.map(problem => problem.column)).toEqual(['epoch', 'theta_deg', 'rho_arcsec', 'nights'])
  })

  it('with a decimal comma is refused in a file separated by commas, and read when it is mended alone', () => {
    const cells = { ...GOOD, rho_arcsec: '0,94' }
    const inFile = readRow(cells, 'relative', { delimiter: 'comma' })
    expect(inFile.problems[0]!.remedy).toContain('0.94')
    expect(inFile.problems[0]!.remedy).toContain('semicolons')
    expect(parsed(cells).rhoArcsec).toBe(0.94)
  })
})

describe('a good row', () => {
  it('may give the position in two forms that agree, and says which is used', () => {
    const row = readRow({ epoch: '1995.439', theta_deg: '346.1102', east_arcsec: '-0.0401', north_arcsec: '0.16216' }, 'relative')
    expect(row.parsed).toMatchObject({ thetaDeg: null, eastArcsec: -0.0401, northArcsec: 0.16216 })
    expect(row.problems).toMatchObject([{ severity: 'note', column: 'theta_deg' }])
  })

  it('may give θ or ρ alone, or a limit', () => {
    expect(parsed({ epoch: '2026.72', theta_deg: '62.4' })).toMatchObject({ thetaDeg: 62.4, rhoArcsec: null })
    expect(parsed({ epoch: '2026.72', rho_arcsec: '0.94' })).toMatchObject({ thetaDeg: null, rhoArcsec: 0.94 })
    expect(parsed({ epoch: '2026.72', rho_limit_arcsec: '0.15' })).toMatchObject({ thetaDeg: null, rhoLimitArcsec: 0.15 })
  })

  it('reads 360 degrees as 0 and remarks on it', () => {
    const { parsed: row, problems } = readRow({ ...GOOD, theta_deg: '360' }, 'relative')
    expect(row).toMatchObject({ thetaDeg: 0 })
    expect(problems).toMatchObject([{ severity: 'note', column: 'theta_deg' }])
  })

  it('remarks on an epoch later than the present, and on a standard error without its value', () => {
    const later = readRow({ ...GOOD, epoch: '2027.5' }, 'relative', { now: 2026.9 })
    expect(later.parsed).not.toBeNull()
    expect(later.problems).toMatchObject([{ severity: 'note', column: 'epoch' }])
    const lonely = readRow({ epoch: '2026.72', theta_deg: '62.4', sigma_rho_arcsec: '0.1' }, 'relative')
    expect(lonely.parsed).toMatchObject({ sigmaRhoArcsec: null })
    expect(lonely.problems).toMatchObject([{ severity: 'note', column: 'sigma_rho_arcsec' }])
  })

  it('reads words whatever their case, signs of every kind and numbers of every form', () => {
    expect(parsed({ ...GOOD, quadrant: 'Ambiguous', theta_frame: 'of date' })).toMatchObject({ quadrant: 'ambiguous', thetaFrame: 'of_date' })
    expect(parsed({ ...GOOD, theta_frame: '1975' }).thetaFrame).toBe('1975')
    expect(parsed({ epoch: '2026.72', east_arcsec: '−.5', north_arcsec: '+5e-1' })).toMatchObject({ eastArcsec: -0.5, northArcsec: 0.5 })
    expect(Object.is(parsed({ epoch: '2026.72', east_arcsec: '-0', north_arcsec: '1' }).eastArcsec, 0)).toBe(true)
  })
})

describe('the epoch of a row', () => {
  const epochYr = (cells: Record<string, string>) => parsed({ theta_deg: '1', rho_arcsec: '1', ...cells }).epochYr

  it('is Besselian before 1984.0 and Julian from then on, unless a prefix says otherwise', () => {
    expect(epochYr({ epoch: '1984.0' })).toBe(1984)
    expect(epochYr({ epoch: 'J1950' })).toBe(1950)
    // B1950.0 = JD 2433282.4235 (Lieske 1979) = J1949.99979
    expect(epochYr({ epoch: '1950.0' })).toBeCloseTo(2000 + (2433282.4235 - 2451545) / 365.25, 6)
    expect(epochYr({ epoch: 'b 1950.0' })).toBe(epochYr({ epoch: '1950.0' }))
    expect(epochYr({ epoch: 'B2000' })).toBeCloseTo(1999.998722, 5)
  })

  it('is the same by Julian date, modified Julian date and calendar date', () => {
    expect(epochYr({ jd: '2451545.0' })).toBeCloseTo(2000, 5)
    expect(epochYr({ mjd: '51544.5' })).toBe(epochYr({ jd: '2451545.0' }))
    expect(epochYr({ date: '2000-01-01T12:00Z' })).toBeCloseTo(2000, 5)
    expect(epochYr({ date: '2000-01-01T14:00+02:00' })).toBe(epochYr({ date: '2000-01-01T12:00:00' }))
    expect(epochYr({ date: '2024-02-29' })).toBeCloseTo(2024.161, 2)
  })
})
