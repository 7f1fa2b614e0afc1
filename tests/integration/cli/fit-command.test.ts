import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { predict, type FitResult } from '../../../fitting'

const ROOT = fileURLToPath(new URL('../../..', import.meta.url))
const CHECKS = join(ROOT, 'tests/fixtures/checks')
let folder: string

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'fit-command-'))
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

/** Runs the command as npm does for somebody who typed it in another folder. */
function fit(...words: string[]) {
  const { status, stdout, stderr } = spawnSync('npm', ['--prefix', ROOT, 'run', '--silent', 'fit', '--', ...words], { cwd: folder, encoding: 'utf8', env: { ...process.env, INIT_CWD: undefined } })
  return { status, stdout, stderr, result: status === 0 ? JSON.parse(stdout) as FitResult : null }
}

function write(name: string, content: string | Uint8Array): string {
  writeFileSync(join(folder, name), content)
  return name
}

/** The table of the 38 epochs of S2 in the canonical columns: milliarcseconds become arcseconds. */
function s2InArcsec(): string {
  const [, ...lines] = readFileSync(join(CHECKS, 'measures_s2_boehle2016.csv'), 'utf8').trim().split(/\r?\n/)
  const rows = lines.map((line) => {
    const [epoch, ...mas] = line.split(',')
    return [epoch, ...mas.slice(0, 4).map(value => Number(value) / 1000)].join(',')
  })
  return ['epoch,east_arcsec,sigma_east_arcsec,north_arcsec,sigma_north_arcsec', ...rows].join('\n')
}

describe('npm run fit', () => {
  it('fits a file named relative to the folder it was typed in and prints only the result', () => {
    const { status, result } = fit(write('s2.csv', s2InArcsec()))
    expect(status).toBe(0)
    // V09: Boehle et al. 2016, ApJ 830, 17, Table 7; seven elements by weighted least squares in east and north.
    const value = (name: string) => result!.elements[name]!.value
    expect(Math.abs(value('period') - 16.2825)).toBeLessThan(6e-5)
    expect(Math.abs(value('periastronTime') - 2002.2809)).toBeLessThan(6e-5)
    expect(Math.abs(value('eccentricity') - 0.8732)).toBeLessThan(6e-5)
    expect(Math.abs(value('semiMajorAxis') * 1000 - 120.08)).toBeLessThan(0.006)
    expect(Math.abs(value('inclination') - 138.299)).toBeLessThan(6e-4)
    expect(result!.statistics).toMatchObject({ measures: 38, degreesOfFreedom: 69 })
    expect(Math.abs(result!.statistics.chiSquare - 309.378)).toBeLessThan(6e-4)
  })

  it('gives the same bytes each time', () => {
    const file = write('again.csv', s2InArcsec())
    expect(fit(file).stdout).toBe(fit(file).stdout)
  })

  it('knows positions in the plane of an orbit by their columns', () => {
    const text = readFileSync(join(CHECKS, 'polar_mars_vsop.csv'), 'utf8').replace('r_au', 'r')
    const { status, result } = fit(write('mars.csv', text), '--settings', write('settings.json', '{"radiusUnit":"au"}'))
    expect(status).toBe(0)
    expect(result!.kind).toBe('plane')
    expect(result!.conic!.semiLatusRectum.unit).toBe('au')
    expect(predict(result!, [0])[0]!.values.r).toBeGreaterThan(1.3)
  })

  it('knows places of comets and minor planets by their columns', () => {
    const text = readFileSync(join(CHECKS, 'astrometry_12893_1998.csv'), 'utf8').replace('date_utc', 'time_utc')
    const { status, result } = fit(write('planet.csv', text), '--settings', write('sun.json', '{"forces":"sun"}'))
    expect(status).toBe(0)
    expect(result).toMatchObject({ kind: 'equatorial', honestArc: { standing: 'strained' }, statistics: { used: 24 } })
    // An independent two-body solution of the same positions: a 2.828823 au, e 0.069146, i 2.324001°.
    const off = (name: string, expected: number) => Math.abs(result!.elements[name]!.value - expected)
    expect(off('semiMajorAxis', 2.828823)).toBeLessThan(1e-5)
    expect(off('eccentricity', 0.069146)).toBeLessThan(1.5e-5)
    expect(off('inclination', 2.324001)).toBeLessThan(3e-5)
  })

  it('takes one target of several by name, and asks for it where none was named', () => {
    const rows = s2InArcsec().split('\n')
    const named = [`target,components,${rows[0]}`, ...rows.slice(1).map(row => `Linden 12,AB,${row}`), ...rows.slice(1, 9).map(row => `Linden 12,AC,${row}`), 'Hazel 3,,2026.1,0.1,,0.1,x'].join('\n')
    const file = write('several.csv', named)
    const without = fit(file)
    expect(without.status).toBe(2)
    expect(JSON.parse(without.stderr).problems[0].reason).toContain('Linden 12 AB, Linden 12 AC, Hazel 3')
    expect(fit(file, '--target', 'Linden 12').status).toBe(2)
    expect(fit(file, '--target', 'linden 12  ab').result?.statistics.measures).toBe(38)
    expect(fit(file, '--target', 'Hazel 4').status).toBe(2)
  })

  it('counts a repeated row once and remarks on it', () => {
    const rows = s2InArcsec().split('\n')
    const { result, stderr } = fit(write('repeated.csv', [...rows, rows[5]].join('\n')))
    expect(result!.statistics.measures).toBe(38)
    expect(JSON.parse(stderr).notes).toMatchObject([{ rowNumber: 40, reason: expect.stringContaining('row 6') }])
  })

  it('says with exit code 3 that measures were read but no fit can be made', () => {
    const { status, stdout, stderr } = fit(write('two.csv', 'epoch,theta_deg,rho_arcsec\n2026.1,10,1\n2026.9,12,1\n'))
    expect(status).toBe(3)
    expect(stdout).toBe('')
    expect(JSON.parse(stderr).refusal).toMatchObject({ code: 'too-few-measures', sentence: expect.any(String), remedy: expect.any(String) })
  })
})

describe('npm run fit refuses with exit code 2 and problems as JSON', () => {
  it.each([
    ['a file that is not there', () => ['missing.csv'], 'There is no file'],
    ['a folder', () => ['.'], 'not a file'],
    ['no file at all', () => [], 'No file was named'],
    ['an empty file', () => [write('empty.csv', '')], 'empty'],
    ['a binary file', () => [write('zip.csv', Uint8Array.from([0x50, 0x4B, 3, 4, 0, 0]))], 'spreadsheet'],
    ['a file with one bad cell', () => [write('bad.csv', 'epoch,theta_deg,rho_arcsec\n2026.1,10,1\n2026.9,361,1\n')], '0 to 360'],
    ['places from a station that nobody knows', () => [write('comet.csv', 'time_utc,ra_deg,dec_deg,station\n2026-11-28T21:30Z,1,2,hill\n')], 'not a station whose place is known'],
    ['an unknown kind', () => [write('k.csv', 'epoch'), '--kind', 'spectroscopic'], 'no kind of measure'],
    ['an unknown option', () => [write('o.csv', 'epoch'), '--fast'], '--fast'],
    ['settings that are no JSON', () => [write('s.csv', s2InArcsec()), '--settings', write('broken.json', '{')], 'settings'],
    ['settings that are no object', () => [write('s.csv', s2InArcsec()), '--settings', write('list.json', '[1]')], 'not an object'],
  ])('%s', (_what, words, says) => {
    const { status, stdout, stderr } = fit(...words())
    expect(status).toBe(2)
    expect(stdout).toBe('')
    const { problems } = JSON.parse(stderr) as { problems: { reason: string, remedy: string }[] }
    expect(problems.some(problem => problem.reason.includes(says))).toBe(true)
    expect(problems.every(problem => problem.remedy.length > 3)).toBe(true)
  })
})
