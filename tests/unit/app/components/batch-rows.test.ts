import { describe, expect, it } from 'vitest'
import { cellProblem, changedCells, filterChoices, groupProblems, mendSentence, rowsText, shownColumns, suggestionOf } from '../../../../app/components/batch/batch-rows'
import type { BatchRowView, CellProblem } from '../../../../shared/schemas/batches'

const problem = (rowNumber: number, column: string | null, severity: CellProblem['severity'] = 'error', reason = 'not a number', remedy = 'Did you mean 0.940?'): CellProblem => ({ rowNumber, column, value: null, reason, remedy, severity })
const row = (rowNumber: number, problems: CellProblem[] = [], state: BatchRowView['state'] = 'good'): BatchRowView => ({
  id: `row${rowNumber}`, rowNumber, state, targetName: null, cells: { epoch: '2026.7', rho_arcsec: '0.94O' }, originalCells: {}, problems,
})

describe('rows of a batch', () => {
  it('only filters that match something are offered, and all is always there', () => {
    const rows = [row(2), row(3, [problem(3, 'rho_arcsec')], 'bad'), row(4, [problem(4, 'theta_deg', 'note')])]
    expect(filterChoices(rows).map(choice => [choice.filter, choice.count])).toEqual([['bad', 1], ['note', 1], ['good', 2], ['all', 3]])
    expect(filterChoices([]).map(choice => choice.filter)).toEqual(['all'])
  })

  it('a column that a problem asks for is shown even where the file has none', () => {
    const reading = { encoding: 'UTF-8', delimiter: 'commas', columns: ['epoch'], unusedColumns: [], headerRow: 1 }
    expect(shownColumns({ reading, items: [row(2, [problem(2, 'rho_arcsec'), problem(2, null)])] })).toEqual(['epoch', 'rho_arcsec'])
  })

  it('of an error and a note in one cell the error is told first', () => {
    expect(cellProblem(row(2, [problem(2, 'epoch', 'note'), problem(2, 'epoch', 'error')]), 'epoch')?.severity).toBe('error')
  })

  it('what the remedy proposes can be taken over; other remedies propose nothing', () => {
    expect(suggestionOf(problem(2, 'rho_arcsec'))).toBe('0.940')
    expect(suggestionOf(problem(2, 'epoch', 'error', 'x', 'Check the year; it may be mistyped.'))).toBeNull()
  })

  it('only cells whose text changed are sent to be mended', () => {
    expect(changedCells(row(2), { epoch: '2026.7', rho_arcsec: '0.940', theta_deg: '' })).toEqual({ rho_arcsec: '0.940' })
  })

  it('after mending it is said whether the row is good, already here, or what is still wrong', () => {
    expect(mendSentence(row(4))).toBe('Row 4 is good now.')
    expect(mendSentence(row(4, [], 'already-here'))).toContain('already here')
    expect(mendSentence(row(4, [problem(4, 'rho_arcsec')], 'bad'))).toBe('Row 4 still has something to mend: not a number. Did you mean 0.940?')
  })
})

describe('problems gathered', () => {
  it('the same problem in several rows is told once, errors before notes', () => {
    const groups = groupProblems([row(2, [problem(2, 'epoch', 'note')]), row(3, [problem(3, 'rho_arcsec')]), row(9, [problem(9, 'rho_arcsec')])])
    expect(groups.map(group => [group.severity, group.rowNumbers])).toEqual([['error', [3, 9]], ['note', [2]]])
  })

  it('that a measure is already here is not told again beside each of its rows', () => {
    const here = row(2, [problem(2, null, 'note')], 'already-here')
    expect(groupProblems([here])).toEqual([])
    expect(filterChoices([here]).map(choice => choice.filter)).toEqual(['already-here', 'all'])
  })

  it.each([[[16], 'row 16'], [[16, 18], 'rows 16 and 18'], [[1, 2, 3, 4], 'rows 1, 2, 3 and 4'], [[1, 2, 3, 4, 5, 6], 'rows 1, 2, 3, 4 and 2 more']])('rows %j are named %s', (rows, text) => {
    expect(rowsText(rows)).toBe(text)
  })
})
