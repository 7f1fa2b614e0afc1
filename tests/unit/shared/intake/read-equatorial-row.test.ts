import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { duplicateKey } from '../../../../shared/intake/duplicate-key'
import type { ParsedEquatorialRow } from '../../../../shared/intake/parsed-row'
import { readMeasures } from '../../../../shared/intake/read-measures'
import { readRow } from '../../../../shared/intake/read-row'
import { toFitMeasure } from '../../../../shared/intake/to-fit-measure'
import { HOSTILE_SKY_CELLS } from '../../../fixtures/intake/hostile-cells'

const GOOD = { time_utc: '2026-03-14T20:51:07.5Z', ra_deg: '41.708625', dec_deg: '15.215972', station: '910' }
const read = (cells: Record<string, string>) => readRow(cells, 'equatorial', { rowNumber: 7 })

function parsed(cells: Record<string, string>): ParsedEquatorialRow {
  const { parsed: row, problems } = read(cells)
  expect(problems.filter(problem => problem.severity === 'error')).toEqual([])
  if (row?.kind !== 'equatorial') throw new Error('not read as a place on the sky')
  return row
}

describe('a wrong cell of a place on the sky', () => {
  it.each(HOSTILE_SKY_CELLS)('is named with a reason and a remedy: $column, $says', ({ cells, column, says }) => {
    const { parsed: row, problems } = read(cells)
    expect(row).toBeNull()
    const problem = problems.find(candidate => candidate.severity === 'error')
    expect(problem).toMatchObject({ rowNumber: 7, column })
    expect(`${problem?.reason}. ${problem?.remedy}`).toContain(says)
  })
})

describe('a good place on the sky', () => {
  it('may be written in degrees, or in hours and degrees with minutes and seconds, by blanks, colons or unit signs', () => {
    const { ra_deg: _ra, dec_deg: _dec, ...rest } = GOOD
    for (const [ra_hms, dec_dms] of [['02 46 50.07', '+15 12 57.5'], ['2:46:50.07', '15:12:57.5'], ['02h46m50.07s', '+15°12′57.5″'], ['02h 46m 50.07s', '15d12m57.5s']] as const) {
      const row = parsed({ ...rest, ra_hms, dec_dms })
      expect(row.raDeg).toBeCloseTo(41.708625, 9)
      expect(row.decDeg).toBeCloseTo(15.2159722, 6)
    }
  })

  it.each(['-00 12 57.5', '−00:12:57.5', '–0 12 57.5'])('keeps the sign of a declination of minus zero degrees: %s', (dec_dms) => {
    const { dec_deg: _dec, ...rest } = GOOD
    expect(parsed({ ...rest, dec_dms }).decDeg).toBeCloseTo(-0.2159722, 6)
  })

  it('reads a date with a fraction of the day as the same instant as its time of day', () => {
    const fraction = parsed({ ...GOOD, time_utc: '2026-03-14.868836805' })
    expect(fraction.timeUtc).toBe('2026-03-14T20:51:07.500Z')
    expect(fraction).toEqual(parsed(GOOD))
    expect(toFitMeasure(fraction, 'id', 'T. Orrowin').jdUtc).toBeCloseTo(2461114.368836806, 8)
  })

  it('takes the place of a known station by its code, and coordinates before the code', () => {
    expect(parsed(GOOD).site).toEqual({ longitudeEastDeg: 6.9267, rhoCosPhi: 0.72368, rhoSinPhi: 0.68811 })
    expect(parsed({ ...GOOD, lon_deg: '10.9', lat_deg: '50.7', height_m: '500' }).site).toEqual({ longitudeEastDeg: 10.9, latitudeDeg: 50.7, heightM: 500 })
  })

  it('keeps the place of a station to 0.01° and 100 m and says so', () => {
    const { parsed: row, problems } = read({ ...GOOD, lon_deg: '-10.91234', lat_deg: '50.68771', height_m: '487' })
    expect(row).toMatchObject({ site: { longitudeEastDeg: -10.91, latitudeDeg: 50.69, heightM: 500 } })
    expect(problems).toMatchObject([{ severity: 'note', column: 'lon_deg', reason: expect.stringContaining('0.01°') }])
  })

  it('may give both forms of a coordinate where they agree within an arcsecond', () => {
    expect(parsed({ ...GOOD, ra_hms: '02 46 50.07', dec_dms: '+15 12 57.5' }).raDeg).toBeCloseTo(41.708625, 9)
  })

  it('goes to the engine in radians, without what was not given', () => {
    const measure = toFitMeasure(parsed({ ...GOOD, sigma_ra_cosdec_arcsec: '0.5', sigma_dec_arcsec: '0.4', corr_ra_dec: '0.1', sigma_time_s: '0.2', mag: '14.1', band: 'G', tracklet: 'a1' }), 'id', 'T. Orrowin')
    expect(measure).toEqual({
      id: 'id', observer: 'T. Orrowin', station: '910', jdUtc: expect.closeTo(2461114.368836806, 8) as number, raRad: 41.708625 * (Math.PI / 180), decRad: 15.215972 * (Math.PI / 180),
      site: { longitudeEastDeg: 6.9267, rhoCosPhi: 0.72368, rhoSinPhi: 0.68811 },
      sigmaRaCosDecArcsec: 0.5, sigmaDecArcsec: 0.4, correlation: 0.1, sigmaTimeS: 0.2, magnitude: 14.1, band: 'G', tracklet: 'a1',
    })
    expect(toFitMeasure(parsed(GOOD), 'id', 'T. Orrowin')).not.toHaveProperty('magnitude')
  })

  it('is known again however time and place are written, and told from one a few seconds later', () => {
    const key = (cells: Record<string, string>) => duplicateKey(parsed(cells), 'T. Orrowin')
    const { ra_deg: _ra, ...noRa } = GOOD
    expect(key({ ...noRa, ra_hms: '02 46 50.07', time_utc: '2026-03-14.868836805' })).toBe(key(GOOD))
    expect(key({ ...GOOD, time_utc: '2026-03-14T20:51:11Z' })).not.toBe(key(GOOD))
    expect(key({ ...GOOD, dec_deg: '15.21608' })).not.toBe(key(GOOD))
  })
})

describe('a table of places on the sky', () => {
  it('reads published astrometry with its time column renamed', () => {
    const text = readFileSync('tests/fixtures/checks/astrometry_12893_1998.csv', 'utf8').replace('date_utc', 'time_utc')
    const { rows, fileProblems } = readMeasures(text, { kind: 'equatorial' })
    expect(fileProblems).toMatchObject([{ severity: 'note', column: 'jd_utc' }])
    expect(rows).toHaveLength(24)
    const jds = text.trim().split('\n').slice(1).map(line => Number(line.split(',')[6]))
    rows.forEach(({ parsed: row }, i) => {
      if (row?.kind !== 'equatorial') throw new Error(`row ${i} was not read`)
      expect(toFitMeasure(row, 'id', 'archive').jdUtc).toBeCloseTo(jds[i]!, 5)
    })
  })
})
