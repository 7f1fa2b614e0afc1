import { describe, expect, it } from 'vitest'
import { SKY_SHEET_PX, skySheet } from '../../../../shared/drawing/sky-sheet'
import { pairResult, residual } from '../../../builders/fit-result'

const at = (thetaDeg: number, rhoArcsec: number) => residual(`${thetaDeg}`, { thetaDeg, rhoArcsec }, { observedMinusComputed: { thetaDeg: 0, rhoArcsec: 0 } })
const prediction = (year: number, thetaDeg: number, rhoArcsec: number) => ({ at: year, values: { thetaDeg, rhoArcsec }, sigmas: {}, correlation: null })

describe('the sky drawing', () => {
  it('has north up and east at the left of the primary', () => {
    const { focus, measures } = skySheet(pairResult({}, { residuals: [at(0, 0.5), at(90, 0.5)] }), [])
    expect(measures[0]!.at.y).toBeLessThan(focus.y)
    expect(measures[0]!.at.x).toBeCloseTo(focus.x, 6)
    expect(measures[1]!.at.x).toBeLessThan(focus.x)
    expect(measures[1]!.at.y).toBeCloseTo(focus.y, 6)
  })

  it('keeps the curve, the measures and the labels on the paper', () => {
    const sheet = skySheet(pairResult({}, { residuals: [at(10, 3), at(200, 2.5)] }), [prediction(2030, 12, 2.9)])
    const places = [...sheet.measures.map(measure => measure.at), sheet.periastron!.label.at, ...sheet.predictions.map(one => one.label.at), ...sheet.apsides!]
    for (const { x, y } of places) {
      expect(Math.min(x, y)).toBeGreaterThan(0)
      expect(Math.max(x, y)).toBeLessThan(SKY_SHEET_PX)
    }
  })

  it('draws the line of apsides through the primary', () => {
    const { apsides, focus } = skySheet(pairResult(), [])
    const [periastron, apastron] = apsides!
    const cross = (periastron.x - focus.x) * (apastron.y - focus.y) - (periastron.y - focus.y) * (apastron.x - focus.x)
    expect(Math.abs(cross)).toBeLessThan(1e-6)
  })

  it('leaves out years that would print over each other', () => {
    const crowded = [2030, 2031, 2032, 2033].map((year, index) => prediction(year, 10 + index * 0.5, 1))
    expect(skySheet(pairResult(), crowded).predictions.map(one => one.yearYr)).toEqual([2030])
  })

  it('has grid lines through the primary', () => {
    const { gridX, gridY, focus } = skySheet(pairResult(), [])
    expect(gridX.some(x => Math.abs(x - focus.x) < 1e-9)).toBe(true)
    expect(gridY.some(y => Math.abs(y - focus.y) < 1e-9)).toBe(true)
  })
})
