import { describe, expect, it } from 'vitest'
import { elementsCsv, ephemerisCsv, measuresCsv, setAsideCsv } from '../../../../server/domain/edition-tables'
import { readMeasures } from '../../../../shared/intake/read-measures'
import { pairSnapshot, snapshotMeasure } from '../../../builders/edition-snapshot'

const polar = snapshotMeasure('polar', { epochYr: 1979.25, thetaDeg: 348.1, rhoArcsec: 0.93, sigmaThetaDeg: 0.5, sigmaRhoArcsec: 0.01, nights: 2 })
const rectangular = snapshotMeasure('rectangular', { epochYr: 2012.125, eastArcsec: -0.25, northArcsec: 0.31, sigmaEastArcsec: 0.002, sigmaNorthArcsec: 0.003 })
const limit = snapshotMeasure('limit', { epochYr: 1990.5, rhoLimitArcsec: 0.4, role: 'not-fitted' })
const left = snapshotMeasure('left', { epochYr: 2001.5, thetaDeg: 12, rhoArcsec: 0.5, role: 'set-aside', reason: '-5 magnitudes off', decidedBy: 'Mirelle Tasque' })
const snapshot = pairSnapshot([polar, rectangular, limit, left], [
  { id: 'polar', observer: 'x', epochYr: 1979.25, position: { form: 'polar', thetaRad: 1, rhoArcsec: 0.93, quadrant: 'ambiguous' } },
  { id: 'rectangular', observer: 'x', epochYr: 2012.125, position: { form: 'rectangular', eastArcsec: -0.25, northArcsec: 0.31, correlation: -0.4 } },
])

describe('the table of measures', () => {
  it('is read back by the upload with every value, epoch, correlation and quadrant as they were', () => {
    const { rows, fileProblems } = readMeasures(measuresCsv(snapshot), { kind: 'relative' })
    expect(fileProblems).toEqual([])
    expect(rows.flatMap(row => row.problems)).toEqual([])
    expect(rows.map(row => row.parsed)).toMatchObject([
      { targetName: 'Linden 12 AB', epochYr: 1979.25, thetaDeg: 348.1, rhoArcsec: 0.93, sigmaThetaDeg: 0.5, sigmaRhoArcsec: 0.01, nights: 2, quadrant: 'ambiguous', observerName: 'Ossian Brandvik' },
      { epochYr: 2012.125, eastArcsec: -0.25, northArcsec: 0.31, sigmaEastArcsec: 0.002, sigmaNorthArcsec: 0.003, correlation: -0.4 },
      { epochYr: 1990.5, rhoLimitArcsec: 0.4 },
    ])
  })

  it('leaves out the columns in which nothing stands', () => {
    expect(measuresCsv(pairSnapshot([polar])).split('\r\n')[0]).toBe('target,epoch,theta_deg,rho_arcsec,sigma_theta_deg,sigma_rho_arcsec,nights,observer')
  })

  it('holds nothing that was set aside; that is another table, with the reason as text and the name', () => {
    expect(measuresCsv(snapshot)).not.toContain('2001.5')
    const [heading, row] = setAsideCsv(snapshot).split('\r\n')
    expect(heading).toMatch(/set_aside_reason,set_aside_by$/)
    expect(row).toMatch(/J2001\.5,12,0\.5.*'-5 magnitudes off,Mirelle Tasque$/)
  })
})

describe('the tables of results', () => {
  it('gives elements in the order in which they are read, with all three errors and the unit', () => {
    const lines = elementsCsv(snapshot).trimEnd().split('\r\n')
    expect(lines[0]).toBe('element,value,sigma,sigma_formal,sigma_scaled,unit')
    expect(lines.slice(1).map(line => line.split(',')[0])).toEqual(['period', 'periastron_time', 'eccentricity', 'semi_major_axis', 'inclination', 'node', 'argument_of_periastron'])
    expect(lines[1]).toBe('period,62.41,0.38,0.38,0.38,yr')
  })

  it('gives predictions over Julian years with σ and correlation, a missing σ as an empty cell', () => {
    const prediction = { at: 2026, values: { eastArcsec: 1, northArcsec: 2, rhoArcsec: 2.2, thetaDeg: 26.6 }, sigmas: { eastArcsec: 0.1, northArcsec: null, rhoArcsec: 0.2, thetaDeg: 0.5 }, correlation: 0.1 }
    expect(ephemerisCsv({ ...snapshot, predictions: [prediction] }).trimEnd().split('\r\n')).toEqual([
      'julian_year,theta_deg,sigma_theta_deg,rho_arcsec,sigma_rho_arcsec,east_arcsec,sigma_east_arcsec,north_arcsec,sigma_north_arcsec,corr_theta_rho',
      '2026,26.6,0.5,2.2,0.2,1,0.1,2,,0.1',
    ])
  })
})

describe('the tables of a comet', () => {
  const sky = {
    raDeg: 41.708625, decDeg: -0.215972, sigmaRaCosDecArcsec: 0.5, sigmaDecArcsec: 0.4, correlation: 0.1, sigmaTimeS: 0.2, station: '910',
    site: { longitudeEastDeg: 6.9267, rhoCosPhi: 0.72368, rhoSinPhi: 0.68811 }, starCatalogue: null, tracklet: 'a1', mag: 14.1, band: 'G',
  }
  const known = snapshotMeasure('known', { timeUtc: '2026-03-14T20:51:07.500Z', epochYr: 2026.2, sky })
  const placed = snapshotMeasure('placed', { timeUtc: '2026-03-15T20:51:07.500Z', epochYr: 2026.2, sky: { ...sky, station: 'hill', site: { longitudeEastDeg: 10.9, latitudeDeg: 50.7, heightM: 500 } } })
  const base = pairSnapshot([known, placed])
  const comet = { ...base, target: { ...base.target, kind: 'equatorial' as const } }

  it('give measures that the upload reads back, a known station by its code and another by its place', () => {
    const { rows, fileProblems } = readMeasures(measuresCsv(comet), { kind: 'equatorial' })
    expect([...fileProblems, ...rows.flatMap(row => row.problems)]).toEqual([])
    const { station: _station, ...rest } = sky
    expect(rows.map(row => row.parsed)).toMatchObject([
      { ...rest, stationText: '910', timeUtc: '2026-03-14T20:51:07.500Z' },
      { stationText: 'hill', site: { longitudeEastDeg: 10.9, latitudeDeg: 50.7, heightM: 500 } },
    ])
  })

  it('give predictions over Julian dates, with σ only of what has one', () => {
    const prediction = { at: 2461114.5, values: { raDeg: 41.7, decDeg: -0.2, distanceAu: 0.9, elongationDeg: 71 }, sigmas: { raDeg: 1e-4, decDeg: 1e-4, distanceAu: 1e-3, elongationDeg: null }, correlation: 0.3 }
    expect(ephemerisCsv({ ...comet, predictions: [prediction] }).trimEnd().split('\r\n')).toEqual([
      'jd_tt,ra_deg,sigma_ra_deg,dec_deg,sigma_dec_deg,distance_au,sigma_distance_au,elongation_deg,corr_ra_dec',
      '2461114.5,41.7,0.0001,-0.2,0.0001,0.9,0.001,71,0.3',
    ])
  })
})
