import { describe, expect, it } from 'vitest'
import { diameterScaleOf, predictedSigmas, sampledEpochsYr, yearsToMark } from '../../../../shared/drawing/prediction-band'
import { residualCsv } from '../../../../shared/drawing/residual-csv'
import { halfHeight, residualChart } from '../../../../shared/drawing/residual-series'
import { axisRange, residualSheet } from '../../../../shared/drawing/residual-sheet'
import { element, pairResult, planeResult, residual } from '../../../builders/fit-result'

const subject = (id: string, epochYr: number | null, phiDeg: number | null = null) => ({ id, observer: `observer of ${id}`, epochYr, phiDeg })
const off = (id: string, acrossArcsec: number | null, alongArcsec: number | null, status: 'used' | 'set-aside' = 'used') =>
  residual(id, {}, { status, observedMinusComputed: { acrossArcsec, alongArcsec } })

describe('residual series', () => {
  it('gives a pair one series across and one along, in milliarcseconds where they are small', () => {
    const chart = residualChart(pairResult({}, { residuals: [off('a', 0.012, -0.004), off('b', null, 0.003)] }), [subject('a', 2001.5), subject('b', 2003)], [])
    expect(chart.series.map(({ name, unit, points }) => [name, unit, points.map(point => point.value)])).toEqual([
      ['across', 'mas', [12]], ['along', 'mas', [-4, 3]],
    ])
    expect(chart.axis).toBe('time')
  })

  it('stays in arcseconds on both axes where a used residual is large on one, so that the two compare', () => {
    const chart = residualChart(pairResult({}, { residuals: [off('a', 2.5, 0.1)] }), [subject('a', 2001)], [])
    expect(chart.series.map(({ unit, points }) => [unit, points.map(point => point.value)])).toEqual([['″', [2.5]], ['″', [0.1]]])
  })

  it('runs over φ for a plane target, and shows a diameter as what was measured', () => {
    const result = planeResult({}, { residuals: [residual('a', {}, { observedMinusComputed: { r: 0.001, diameterArcmin: -0.02 } })] })
    const chart = residualChart(result, [subject('a', null, 140)], [{ at: 10, sigmas: { diameterArcmin: 0.01 } }])
    expect(chart.axis).toBe('direction')
    expect(chart.series).toHaveLength(1)
    expect(chart.series[0]!.points[0]).toMatchObject({ at: 140, value: expect.closeTo(-1.2, 10) })
    expect(chart.series[0]!.band[0]).toEqual({ at: 10, sigma: 0.6 })
    expect(axisRange(chart)).toEqual([0, 360])
  })

  it('does not let a measure set aside press the others flat, and draws it at the edge', () => {
    const chart = residualChart(pairResult({}, { residuals: [off('a', 0.01, null), off('b', 0.9, null, 'set-aside')] }), [subject('a', 2001), subject('b', 2005)], [])
    expect(halfHeight(chart.series[0]!)).toBeCloseTo(12, 10)
    const [row] = residualSheet(chart, 900, 2026).rows
    expect(row!.marks.map(mark => mark.isBeyond)).toEqual([false, true])
    expect(row!.marks[1]!.y).toBe(row!.topPx)
  })

  it('puts later measures further right and positive residuals higher', () => {
    const chart = residualChart(pairResult({}, { residuals: [off('a', 0.01, null), off('b', -0.01, null)] }), [subject('a', 1999), subject('b', 2009)], [])
    const [a, b] = residualSheet(chart, 900, 2026).rows[0]!.marks
    expect(a!.x).toBeLessThan(b!.x)
    expect(a!.y).toBeLessThan(b!.y)
  })

  it('writes one CSV row a point and defuses text that a spreadsheet would run', () => {
    const chart = residualChart(pairResult({}, { residuals: [off('a', 0.012, -0.004)] }), [{ ...subject('a', 2001.5), observer: '=cmd, "x"' }], [])
    expect(residualCsv(chart)).toBe([
      'coordinate,unit,epoch_yr,observed_minus_computed,status,observer,measure',
      `across,mas,2001.5,12,used,"'=cmd, ""x""",a`, `along,mas,2001.5,-4,used,"'=cmd, ""x""",a`, '',
    ].join('\r\n'))
  })
})

describe('the band of the prediction', () => {
  it('turns σ of θ and ρ into across and along', () => {
    const [only] = predictedSigmas([{ at: 2030, values: { thetaDeg: 40, rhoArcsec: 2 }, sigmas: { thetaDeg: 1, rhoArcsec: 0.01 }, correlation: null }])
    expect(only!.sigmas.acrossArcsec).toBeCloseTo(2 * Math.PI / 180, 12)
    expect(only!.sigmas.alongArcsec).toBe(0.01)
  })

  it('is empty where no σ is known', () => {
    expect(predictedSigmas([{ at: 2030, values: { rhoArcsec: 2 }, sigmas: { rhoArcsec: null }, correlation: null }])[0]!.sigmas).toEqual({})
  })

  it('reaches from the first measure past now', () => {
    const epochs = sampledEpochsYr(pairResult(), [subject('a', 1980), subject('b', 2020)], 2026.9)
    expect(epochs[0]).toBe(1980)
    expect(epochs.at(-1)).toBeGreaterThan(2026.9)
  })

  it('marks the coming year and then round ones, closer together for a short period', () => {
    expect(yearsToMark(pairResult({ period: element(62, 1, 'yr') }), 2026.9)).toEqual([2027, 2030, 2035, 2040, 2045])
    expect(yearsToMark(pairResult({ period: element(2.6, 0.1, 'yr') }), 2026.93)).toEqual([2027, 2027.2, 2027.4, 2027.6, 2027.8])
  })
})

describe('the band of measured diameters', () => {
  it('follows from σ of r: σ_d = scale σ_r / r²', () => {
    const result = planeResult({}, { residuals: [residual('a', { r: 0.5, diameterArcmin: 64 })] })
    expect(diameterScaleOf(result)).toBe(32)
    const [only] = predictedSigmas([{ at: 10, values: { r: 0.5 }, sigmas: { r: 0.001 }, correlation: null }], 32)
    expect(only!.sigmas.diameterArcmin).toBeCloseTo(0.128, 12)
  })

  it('has no scale where none was measured', () => {
    expect(diameterScaleOf(planeResult({}, { residuals: [residual('a', { r: 0.5 })] }))).toBeNull()
  })
})
