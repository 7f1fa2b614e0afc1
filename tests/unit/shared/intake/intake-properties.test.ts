import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { COLUMNS } from '../../../../shared/intake/columns'
import { decodeText } from '../../../../shared/intake/decode-text'
import { readMeasures, type MeasureReading } from '../../../../shared/intake/read-measures'
import { toFitMeasure } from '../../../../shared/intake/to-fit-measure'

const SEED = 20261201
const kind = fc.constantFrom('relative' as const, 'plane' as const, 'equatorial' as const)

function expectEveryRowReadOrExplained({ rows, fileProblems }: MeasureReading) {
  const refusals = fileProblems.filter(problem => problem.severity === 'error')
  expect(refusals.length > 0).toBe(rows.length === 0)
  for (const row of rows) {
    expect(row.problems.some(problem => problem.severity === 'error')).toBe(row.parsed === null)
    if (row.parsed) expect(JSON.stringify(toFitMeasure(row.parsed, 'id', 'observer'))).not.toMatch(/null|NaN|Infinity/)
  }
  for (const problem of [...fileProblems, ...rows.flatMap(row => row.problems)]) {
    expect(problem.reason.length).toBeGreaterThan(3)
    expect(problem.remedy.length).toBeGreaterThan(3)
  }
}

describe('whatever bytes are sent', () => {
  it('reading them never throws, and each is decoded or refused with a remedy', () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 400 }), kind, (bytes, ofKind) => {
      const decoded = decodeText(bytes)
      if (!decoded.ok) expect(decoded.problem.remedy.length).toBeGreaterThan(3)
      expectEveryRowReadOrExplained(readMeasures(bytes, { kind: ofKind }))
    }), { seed: SEED, numRuns: 2000 })
  })

  it('every row under a good row of names is read or has a reason and a remedy', () => {
    const cell = fc.oneof(
      fc.string({ unit: 'binary', maxLength: 12 }),
      fc.constantFrom('', 'NaN', '1e999', '2026.72', 'B1950', '0', '-0', '361', '62,4', '"', 'stated', '2026-02-30', '2026-03-14.5', '02 46 50.07', '-00 12 57.5', '910', '__proto__'),
      fc.double().map(String),
      fc.double({ min: 0.001, max: 359, noNaN: true }).map(String),
    )
    const table = fc.record({ ofKind: kind, delimiter: fc.constantFrom(',', ';', '\t'), rows: fc.array(fc.array(cell, { minLength: 1, maxLength: 12 }), { minLength: 1, maxLength: 6 }) })
    fc.assert(fc.property(table, ({ ofKind, delimiter, rows }) => {
      const names = COLUMNS[ofKind].map(column => column.name)
      const text = [names, ...rows].map(cells => cells.join(delimiter)).join('\n')
      expectEveryRowReadOrExplained(readMeasures(text, { kind: ofKind, now: 2026.9 }))
    }), { seed: SEED, numRuns: 1500 })
  })

  it('a good row gives back the numbers it was written from', () => {
    const measure = fc.record({ epoch: fc.double({ min: 1984, max: 2500, noNaN: true }), theta: fc.double({ min: 0, max: 359.999, noNaN: true }), rho: fc.double({ min: 1e-4, max: 1e4, noNaN: true }) })
    fc.assert(fc.property(measure, ({ epoch, theta, rho }) => {
      const { rows } = readMeasures(`epoch;theta_deg;rho_arcsec\n${epoch};${theta};${rho}`.replaceAll('.', ','), { kind: 'relative' })
      expect(rows[0]!.parsed).toMatchObject({ epochYr: epoch, thetaDeg: theta === 0 ? 0 : theta, rhoArcsec: rho })
    }), { seed: SEED, numRuns: 500 })
  })
})
