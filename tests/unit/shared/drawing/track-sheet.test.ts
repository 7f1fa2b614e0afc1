import { describe, expect, it } from 'vitest'
import { comesNearSun } from '../../../../shared/drawing/near-sun'
import { graticule } from '../../../../shared/drawing/sky-graticule'
import { middleOf, skyProjection } from '../../../../shared/drawing/sky-projection'
import { SKY_SHEET_PX } from '../../../../shared/drawing/sky-sheet'
import { markedDays, trackDates, trackSpan } from '../../../../shared/drawing/track-dates'
import { trackSheet } from '../../../../shared/drawing/track-sheet'
import { distanceSheet } from '../../../../shared/drawing/distance-sheet'
import { residual, solarResult } from '../../../builders/fit-result'

const SPAN = { fromJd: 2461100, lastMeasureJd: 2461140, toJd: 2461164 }
const prediction = (at: number, raDeg: number, decDeg: number, distanceAu = 1, sunDistanceAu = 1.5) => ({ at, values: { raDeg, decDeg, distanceAu, sunDistanceAu }, sigmas: {}, correlation: null })

describe('the sky on paper', () => {
  it('has east on the positive side, and degrees near the middle', () => {
    const project = skyProjection({ raDeg: 359.5, decDeg: 60 })
    expect(project({ raDeg: 0.5, decDeg: 60 }).x).toBeCloseTo(0.5, 3)
    expect(project({ raDeg: 359.5, decDeg: 61 })).toMatchObject({ x: expect.closeTo(0, 9) as number, y: expect.closeTo(1, 3) as number })
  })

  it('has its middle across 0 h where the directions lie on both sides of it', () => {
    const middle = middleOf([{ raDeg: 350, decDeg: 0 }, { raDeg: 10, decDeg: 0 }])
    expect(middle?.raDeg).toBeCloseTo(0, 9)
    expect(middleOf([{ raDeg: 0, decDeg: 0 }, { raDeg: 180, decDeg: 0 }])).toBeNull()
  })

  it('is ruled by round hours and degrees with their labels at two edges', () => {
    const project = skyProjection({ raDeg: 41, decDeg: 15 })
    const toPx = (direction: { raDeg: number, decDeg: number }) => ({ x: 280 - 28 * project(direction).x, y: 280 - 28 * project(direction).y })
    const { labels, grid } = graticule({ middle: { raDeg: 41, decDeg: 15 }, toPx, fieldDeg: 20, sizePx: SKY_SHEET_PX })
    const texts = labels.map(label => label.text)
    expect(texts).toEqual(expect.arrayContaining(['+15°', '+20°', '2ʰ 40ᵐ', '3ʰ 00ᵐ']))
    expect(grid.length).toBeGreaterThan(labels.length - 1)
  })
})

describe('the path of a body', () => {
  const path = [0, 10, 20, 30, 40, 50, 60].map(days => prediction(2461100 + days, 40 + days * 0.3, 10 + days * 0.1))
  const seen = residual('m1', { raDeg: 43, decDeg: 11 }, { observedMinusComputed: { raCosDecArcsec: 3600, decArcsec: 0 } })
  const sheet = trackSheet({ result: solarResult({}, { residuals: [seen] }), span: SPAN, path, marked: [prediction(2461110, 43, 11), prediction(2461150, 55, 15)] })!

  it('runs with right ascension growing to the left, and is parted at the last measure', () => {
    const xs = (d: string) => [...d.matchAll(/[ML]([\d.]+) /g)].map(match => Number(match[1]))
    const measured = xs(sheet.measured)
    expect(measured).toHaveLength(5)
    expect(measured[0]).toBeGreaterThan(measured[4]!)
    expect(xs(sheet.coming)[0]).toBe(measured[4])
  })

  it('puts a measure east of its computed place to the left of it, and marks dates by whether they are to come', () => {
    expect(sheet.measures[0]!.at.x).toBeLessThan(sheet.measures[0]!.computedAt.x)
    expect(sheet.dates.map(date => date.isComing)).toEqual([false, true])
  })

  it('is not drawn where nothing can be predicted', () => {
    expect(trackSheet({ result: solarResult(), span: SPAN, path: [], marked: [] })).toBeNull()
  })

  it('has distances from Earth and Sun whose labels keep apart', () => {
    const drawn = distanceSheet(path, SPAN)!
    expect(Math.abs(drawn.fromEarth.label.y - drawn.fromSun.label.y)).toBeGreaterThanOrEqual(16)
    expect(distanceSheet(path.map(one => ({ ...one, values: { ...one.values, sunDistanceAu: 1 } })), SPAN)!.fromSun.label.y - drawn.bottomPx).toBeLessThan(0)
  })
})

describe('the dates of a drawing', () => {
  it('reach from a little before the first measure to some weeks past the last', () => {
    const { statistics } = solarResult()
    const result = solarResult({}, { statistics: { ...statistics, arc: { ...statistics.arc, firstEpochYr: 2026, lastEpochYr: 2026.1 } } })
    const span = trackSpan(result)!
    expect(span.toJd - span.lastMeasureJd).toBeCloseTo(36.525 * 0.6, 3)
    expect(trackDates(span)).toContain(span.lastMeasureJd)
    expect(trackSpan(solarResult())).toBeNull()
  })

  it('are marked at round days, few enough to be read', () => {
    expect(markedDays(2461100.2, 2461104.9)).toEqual([2461100.5, 2461101.5, 2461102.5, 2461103.5, 2461104.5])
    expect(markedDays(2461000, 2461365).length).toBeLessThanOrEqual(10)
  })
})

describe('a place near the Sun', () => {
  it('is one within 20°, wherever along the path', () => {
    const at = (elongationDeg: number) => ({ ...prediction(2461100, 1, 1), values: { elongationDeg } })
    expect(comesNearSun([at(88), at(19.9), at(30)])).toBe(true)
    expect(comesNearSun([at(88), at(20)])).toBe(false)
    expect(comesNearSun([prediction(2461100, 1, 1)])).toBe(false)
  })
})
