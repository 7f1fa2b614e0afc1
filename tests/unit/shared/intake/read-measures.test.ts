import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { readMeasures } from '../../../../shared/intake/read-measures'
import { UPLOAD_CAP_ROWS } from '../../../../shared/schemas/batches'

const relative = (text: string) => readMeasures(text, { kind: 'relative' })

describe('reading a file of pair measures', () => {
  it('keeps the original text beside the values and knows the columns it used', () => {
    const { reading, fileProblems, rows } = relative('epoch,Theta Deg,rho_arcsec,target\n2026.712,78.40,0.941,Linden 12 AB\n')
    expect(fileProblems).toEqual([])
    expect(reading).toEqual({ encoding: 'UTF-8', delimiter: 'comma', columns: ['epoch', 'theta_deg', 'rho_arcsec', 'target'], unusedColumns: [], headerRow: 1 })
    expect(rows).toHaveLength(1)
    expect(rows[0]).toMatchObject({ rowNumber: 2, cells: { epoch: '2026.712', theta_deg: '78.40' }, problems: [], parsed: { kind: 'relative', epochYr: 2026.712, thetaDeg: 78.4, rhoArcsec: 0.941, targetName: 'Linden 12 AB' } })
  })

  it('counts rows as a spreadsheet does, past blank rows, comments and quoted line breaks', () => {
    const { reading, rows } = relative('# from the notebook\n\nepoch,theta_deg,rho_arcsec,remarks\n2026.1,1,1,"two\nlines"\n,,,\n2026.2,2,1,\n')
    expect(reading.headerRow).toBe(3)
    expect(rows.map(row => row.rowNumber)).toEqual([4, 6])
    expect(rows[0]!.parsed).toMatchObject({ remarks: 'two\nlines' })
  })

  it('takes decimal commas where semicolons or tabs separate the columns', () => {
    for (const delimiter of [';', '\t']) {
      const { rows } = relative(['epoch', 'theta_deg', 'rho_arcsec'].join(delimiter) + '\n' + ['2026,712', '78,4', '0,941'].join(delimiter))
      expect(rows[0]!.parsed).toMatchObject({ epochYr: 2026.712, thetaDeg: 78.4, rhoArcsec: 0.941 })
    }
  })

  it('keeps text that looks like a formula as the text it is', () => {
    const { rows } = relative('epoch,theta_deg,rho_arcsec,remarks\n2026.1,1,1,"=HYPERLINK(""x"")"\n2026.2,1,1,-2+3\n')
    expect(rows.map(row => row.parsed?.remarks)).toEqual(['=HYPERLINK("x")', '-2+3'])
  })

  it('lists columns it does not use and suggests the nearest known name', () => {
    const { reading, fileProblems, rows } = relative('epoch,theta_deg,rho_arcsc,seeing,phi_deg\n2026.1,1,1,3,1\n')
    expect(reading.unusedColumns).toEqual(['rho_arcsc', 'seeing', 'phi_deg'])
    expect(fileProblems.map(problem => [problem.severity, problem.column])).toEqual([['note', 'rho_arcsc'], ['note', 'seeing'], ['note', 'phi_deg']])
    expect(fileProblems[0]!.remedy).toContain('rho_arcsec')
    expect(fileProblems[1]!.remedy).not.toContain('Did you mean')
    expect(fileProblems[2]!.reason).toContain('plane')
    expect(rows[0]!.parsed).not.toBeNull()
  })

  it('marks a measure that stands in the file twice, however its numbers are written', () => {
    const { rows } = relative('epoch,theta_deg,rho_arcsec,observer\n2026.10,62.40,0.9,T. Orrowin\n2026.1,62.4,0.90,t.  orrowin\n2026.1,62.4,0.90,Ilka Soundraven\n')
    expect(rows.map(row => row.duplicateOfRow)).toEqual([null, 2, null])
    expect(rows[1]!.problems).toMatchObject([{ severity: 'note', reason: expect.stringContaining('row 2') }])
  })

  it('says once for the file what most of its rows share, and keeps the other notes with their rows', () => {
    const both = Array.from({ length: 9 }, (_, i) => `2026.${i},90,0.5,0.5,0\n`).join('')
    const { rows, fileProblems } = relative(`epoch,theta_deg,rho_arcsec,east_arcsec,north_arcsec\n${both}2026.95,360,1,,\n`)
    expect(fileProblems).toMatchObject([{ severity: 'note', column: 'theta_deg', reason: expect.stringMatching(/^In 9 rows: θ, ρ and east, north say the same position/) }])
    expect(rows.map(row => row.problems.length)).toEqual([0, 0, 0, 0, 0, 0, 0, 0, 0, 1])
    expect(rows.every(row => row.parsed !== null)).toBe(true)
  })

  it('says where rows are longer or shorter than the row of names', () => {
    const { rows } = relative('epoch,theta_deg,rho_arcsec,remarks\n2026.1,1,1,a,b\n2026.2,1,1\n2026.3,1,1,,,\n')
    expect(rows[0]).toMatchObject({ parsed: null, problems: [{ severity: 'error', value: 'b' }] })
    expect(rows[1]!.parsed).not.toBeNull()
    expect(rows[1]!.problems).toMatchObject([{ severity: 'note' }])
    expect(rows[2]!.problems).toEqual([])
  })

  it('names a row that is separated otherwise than the first one, and keeps the others', () => {
    const { rows, fileProblems } = relative('epoch,theta_deg,rho_arcsec\n2026.1,1,1\n2026.2;2;1\n')
    expect(fileProblems).toEqual([])
    expect(rows[0]!.parsed).not.toBeNull()
    expect(rows[1]).toMatchObject({ parsed: null, problems: [{ rowNumber: 3, reason: expect.stringContaining('semicolons') }] })
  })
})

describe('a cell as long as a book', () => {
  it.each([
    ['blanks inside a number', `1${' '.repeat(1_000_000)}x`],
    ['digits', '1'.repeat(1_000_000)],
    ['quotation marks', '""'.repeat(500_000)],
  ])('is complained of like any other: %s', (_what, cell) => {
    const { rows } = relative(`epoch,theta_deg,rho_arcsec\n2026.1,1,"${cell}"\n2026.2,2,1\n`)
    expect(rows.map(row => row.parsed === null)).toEqual([true, false])
    expect(rows[0]!.problems[0]!.value!.length).toBeLessThan(100)
  })
})

describe('a file that cannot be read as measures', () => {
  const header = 'epoch,theta_deg,rho_arcsec\n'
  it.each([
    ['an empty file', '', 'empty'],
    ['blank lines only', ' \n\n  \n', 'empty'],
    ['a row of names only', header, 'no row below'],
    ['a missing row of names', '2026.1,1.0,0.9\n2026.2,1.1,0.9\n', 'numbers, not column names'],
    ['no column of time', 'theta_deg,rho_arcsec\n1,1\n', 'when it was measured'],
    ['no column of position', 'epoch,nights\n2026,1\n', 'what was measured'],
    ['a name that stands twice', 'epoch,theta_deg,theta_deg\n2026,1,1\n', 'theta_deg stands twice'],
    ['mixed separators in the row of names', 'epoch,theta_deg;rho_arcsec\n2026,1;1\n', 'different ways'],
    ['mixed separators below it', 'epoch,theta_deg,rho_arcsec\n2026;1;1\n2027;2;1\n', 'different ways'],
    ['columns separated by blanks', 'epoch theta_deg rho_arcsec\n2026 1 1\n', 'single column'],
    ['a quotation mark without a partner', 'epoch,theta_deg,remarks\n2026,1,"open\n2027,1,x\n', 'row 2'],
    ['more columns than are read at most', `epoch,theta_deg,rho_arcsec${',epoch'.repeat(100_000)}\n2026,1,1\n`, 'columns'],
    ['more rows than are read at once', header + '2026,1,1\n'.repeat(UPLOAD_CAP_ROWS + 1), 'are read at once'],
  ])('is refused with a reason and a remedy: %s', (_what, text, reason) => {
    const { fileProblems, rows } = relative(text)
    expect(rows).toEqual([])
    const [first] = fileProblems.filter(problem => problem.severity === 'error')
    expect(first?.reason).toContain(reason)
    expect(first?.remedy).toMatch(/\w{3}/)
  })
})

describe('reading positions in the plane of an orbit', () => {
  it('reads a year of solar diameters', () => {
    const text = readFileSync('tests/fixtures/checks/polar_sun_diameter.csv', 'utf8').replace('sun_longitude_deg_of_date', 'phi_deg').replace('apparent_diameter_arcmin', 'diameter_arcmin')
    const { rows, fileProblems } = readMeasures(text, { kind: 'plane' })
    expect(fileProblems.every(problem => problem.severity === 'note')).toBe(true)
    expect(rows.every(row => row.parsed?.kind === 'plane' && row.parsed.diameterArcmin! > 31)).toBe(true)
    expect(rows[0]!.parsed).toMatchObject({ phiDeg: 295.5678, diameterArcmin: 32.52, r: null })
  })

  it('asks for exactly one of radius and diameter, and for the direction', () => {
    const { rows } = readMeasures('phi_deg,r,diameter_arcmin,time_utc\n1,1,32,\n1,,,\n,1,,\n360,1,,2026-11-28T21:30Z\n', { kind: 'plane' })
    expect(rows.map(row => row.problems.map(problem => problem.column))).toEqual([['diameter_arcmin'], ['r'], ['phi_deg'], []])
    expect(rows[3]!.parsed).toMatchObject({ phiDeg: 0, timeUtc: '2026-11-28T21:30:00.000Z' })
  })
})

describe('a file sent as the wrong kind', () => {
  it('is told so in one sentence, with the kind it belongs to, where its columns are all that the other kind needs', () => {
    const { fileProblems } = relative('target,date,phi_deg,diameter_arcmin\nSun 2026,2026-01-04,104,32.5\n')
    expect(fileProblems.filter(({ severity }) => severity === 'error')).toEqual([expect.objectContaining({
      reason: expect.stringContaining('kind "in the plane of the orbit"') as string, remedy: 'Send the file again as "in the plane of the orbit".',
    })])
  })

  it('still names every missing column where it fits no kind at all', () => {
    const { fileProblems } = relative('foo,bar\n1,2\n')
    expect(fileProblems.map(({ reason }) => reason)).toEqual([expect.stringMatching(/when it was measured/), expect.stringMatching(/what was measured/), expect.any(String), expect.any(String)])
  })

  it('is asked whether its date is the time of the other kind, rather than being sent elsewhere', () => {
    const { fileProblems } = readMeasures('date,phi_deg,diameter_arcmin\n2026-01-04,104,32.5\n', { kind: 'plane' })
    expect(fileProblems).toEqual([expect.objectContaining({ column: 'date', severity: 'note', remedy: 'Did you mean time_utc? Rename the column if so.' })])
  })
})
