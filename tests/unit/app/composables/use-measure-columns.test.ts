import { describe, expect, it } from 'vitest'
import type { MeasureView } from '#shared/schemas/targets'
import { useMeasureColumns } from '../../../../app/composables/useMeasureColumns'
import { pairResult, residual, solarResult } from '../../../builders/fit-result'

const EMPTY: MeasureView = {
  id: '', observer: 'T. Orrowin', batchNumber: 1, epochYr: null, timeUtc: null, thetaDeg: null, rhoArcsec: null, rhoLimitArcsec: null,
  sigmaThetaDeg: null, sigmaRhoArcsec: null, eastArcsec: null, northArcsec: null, sigmaEastArcsec: null, sigmaNorthArcsec: null, phiDeg: null, r: null,
  sigmaR: null, diameterArcmin: null, sigmaDiameterArcmin: null, nights: null, method: null, remarks: null,
}
const pair = (id: string, epochYr: number, thetaDeg: number, rhoArcsec: number): MeasureView => ({ ...EMPTY, id, epochYr, thetaDeg, rhoArcsec })
const ids = (measures: MeasureView[], key: string, times: number) => {
  const table = useMeasureColumns(() => measures, () => null)
  for (let time = 0; time < times; time++) table.sortBy(key)
  return table.rows.value.map(row => row.measure.id)
}

describe('the table of measures', () => {
  it('has the columns that the measures fill, and no others', () => {
    const keys = (measures: MeasureView[]) => useMeasureColumns(() => measures, () => null).columns.value.map(column => column.key)
    expect(keys([pair('a', 2001, 40, 0.5)])).toEqual(['epoch', 'theta', 'rho', 'observer'])
    expect(keys([{ ...EMPTY, id: 'a', phiDeg: 12, diameterArcmin: 32.1 }])).toEqual(['phi', 'diameter', 'observer'])
  })

  it('shows O−C of ρ in milliarcseconds beside the measure', () => {
    const result = pairResult({}, { residuals: [residual('a', { thetaDeg: 40, rhoArcsec: 0.5 }, { observedMinusComputed: { thetaDeg: -1.254, rhoArcsec: 0.0123 }, normalised: 1.26 })] })
    const [row] = useMeasureColumns(() => [pair('a', 2001.5, 40, 0.512)], () => result).rows.value
    expect(row!.cells).toEqual(['2001.500', '40.00', '0.512', '−1.25', '+12', '1.3', 'T. Orrowin'])
  })

  it('gives a comet by time, place and residuals in both coordinates and along its motion', () => {
    const site = { longitudeEastDeg: -2.52, latitudeDeg: 53.63, heightM: 500 }
    const sky = { raDeg: 41.708625, decDeg: -0.2159722, sigmaRaCosDecArcsec: 0.5, sigmaDecArcsec: 0.5, correlation: null, sigmaTimeS: null, station: 'Winter Hill', site, starCatalogue: null, tracklet: null, mag: 12.14, band: 'G' }
    const seen: MeasureView = { ...EMPTY, id: 'a', epochYr: 2026.2, timeUtc: '2026-03-14T20:51:07.500Z', sky }
    const observedMinusComputed = { raCosDecArcsec: 0.5, decArcsec: -0.25, alongArcsec: 0.1, acrossArcsec: 0.55, sunwardArcsec: 0 }
    const { columns, rows } = useMeasureColumns(() => [seen], () => solarResult({}, { residuals: [residual('a', {}, { observedMinusComputed, normalised: 1.2 })] }))
    expect(columns.value.map(column => column.key)).toEqual(['time', 'ra', 'dec', 'mag', 'oc-ra', 'oc-dec', 'oc-along', 'oc-across', 'sigmas', 'observer', 'station'])
    expect(rows.value[0]!.cells).toEqual(['2026-03-14 20:51:08', '02 46 50.07', '−00 12 57.5', '12.1', '+0.50', '−0.25', '+0.10', '+0.55', '1.2', 'T. Orrowin', 'Winter Hill'])
  })

  it('stands in the order of time, and turns round on a second press', () => {
    const measures = [pair('b', 2010, 10, 0.9), pair('a', 2001, 40, 0.5), pair('c', 2020, 20, 0.7)]
    expect(ids(measures, 'epoch', 0)).toEqual(['a', 'b', 'c'])
    expect(ids(measures, 'epoch', 1)).toEqual(['c', 'b', 'a'])
    expect(ids(measures, 'rho', 1)).toEqual(['a', 'c', 'b'])
    expect(ids(measures, 'rho', 2)).toEqual(['b', 'c', 'a'])
  })

  it('keeps what has no value last in either direction', () => {
    const measures = [{ ...pair('none', 2005, 1, 1), thetaDeg: null }, pair('b', 2010, 30, 0.9), pair('a', 2001, 40, 0.5)]
    expect(ids(measures, 'theta', 1)).toEqual(['b', 'a', 'none'])
    expect(ids(measures, 'theta', 2)).toEqual(['a', 'b', 'none'])
  })

  it('writes a limit as a limit', () => {
    const [row] = useMeasureColumns(() => [{ ...EMPTY, id: 'a', epochYr: 2001, rhoLimitArcsec: 0.2 }], () => null).rows.value
    expect(row!.cells).toContain('< 0.200')
  })
})
