import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { KINDS } from '../../../../fitting/types'
import { readMeasures } from '../../../../shared/intake/read-measures'

describe('the example files that the upload page offers', () => {
  it.each(KINDS)('is read without a remark: %s', (kind) => {
    const { rows, fileProblems } = readMeasures(readFileSync(`public/examples/${kind}.csv`), { kind, now: 2026.95 })
    expect([...fileProblems, ...rows.flatMap(row => row.problems)]).toEqual([])
    expect(rows.length).toBeGreaterThan(3)
  })
})
