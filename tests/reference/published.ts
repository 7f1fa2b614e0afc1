import { readFileSync } from 'node:fs'
import Papa from 'papaparse'
import { expect, it } from 'vitest'

/** How an expected number was come by: printed in the source, or an independent solution of published data that we compare with. */
export type Standing = 'published' | 'own'

export interface Check {
  quantity: string
  expected: number
  tolerance: number
  standing?: Standing
  computed: () => number
}

/** One test a check; the source stands in the test's name. */
export function checkAgainst(source: string, checks: Check[]): void {
  for (const { quantity, expected, tolerance, standing = 'published', computed } of checks) {
    const origin = standing === 'published' ? source : `an independent solution after ${source}`
    it(`gives ${quantity} = ${expected} as ${origin}`, () => {
      const difference = Math.abs(computed() - expected)
      expect(difference, `computed ${computed()}`).toBeLessThanOrEqual(tolerance)
    })
  }
}

/** Rows of a file of tests/fixtures, by column name; numbers as text. */
export function readFixture(name: string): Record<string, string>[] {
  const text = readFileSync(new URL(`../fixtures/${name}`, import.meta.url), 'utf8')
  const { data, errors } = Papa.parse<Record<string, string>>(text, { header: true, skipEmptyLines: true })
  if (errors.length > 0) throw new Error(`${name}: ${errors[0]!.message} at row ${errors[0]!.row}`)
  return data
}

/** A cell as a number; a cell that is none is an error of the fixture. */
export function cell(row: Record<string, string>, column: string): number {
  const value = Number(row[column])
  if (row[column] === undefined || row[column] === '' || Number.isNaN(value)) throw new Error(`no number in column ${column}`)
  return value
}

/** Difference of two angles in degrees, −180 to 180. */
export function turnDeg(a: number, b: number): number {
  return ((a - b + 540) % 360 + 360) % 360 - 180
}
