import { describe, expect, it } from 'vitest'
import { frameAround } from '../../../../shared/drawing/drawing-frame'
import { thumbnailSvg } from '../../../../shared/drawing/thumbnail-svg'
import { element, pairResult, planeResult } from '../../../builders/fit-result'

describe('thumbnailSvg', () => {
  it('carries no style attribute, no script and no colour of its own', () => {
    const svg = thumbnailSvg(pairResult())!
    expect(svg).not.toMatch(/style=|<script|#[0-9a-f]{3}/i)
    expect(svg).toContain('stroke="currentColor"')
  })

  it('keeps the whole curve inside the picture, however long the ellipse', () => {
    for (const e of [0, 0.5, 0.99]) {
      const svg = thumbnailSvg(planeResult({ eccentricity: element(e, 0.01, '') }))!
      const numbers = svg.match(/ d="M([^"Z]+)Z?"/)![1]!.split(/[L ]/).map(Number)
      numbers.forEach((value, k) => {
        expect(value).toBeGreaterThanOrEqual(0)
        expect(value).toBeLessThanOrEqual(k % 2 === 0 ? 84 : 64)
      })
    }
  })

  it('gives nothing rather than a broken picture where the numbers are not finite', () => {
    expect(thumbnailSvg(pairResult({ semiMajorAxis: element(NaN, null, 'arcsec') }))).toBeNull()
    expect(thumbnailSvg(planeResult({ semiLatusRectum: element(Infinity, null, 'au') }))).toBeNull()
  })
})

describe('frameAround', () => {
  it('puts east at the left and north at the top of a sky drawing', () => {
    const frame = frameAround([{ x: -1, y: -1 }, { x: 1, y: 1 }], { widthPx: 100, heightPx: 100, marginPx: 10, isEastLeft: true })
    const eastNorth = frame.toPx({ x: 1, y: 1 })
    expect(eastNorth).toEqual({ x: 10, y: 10 })
  })

  it('keeps one scale in both directions', () => {
    const frame = frameAround([{ x: 0, y: 0 }, { x: 4, y: 1 }], { widthPx: 100, heightPx: 100, marginPx: 10, isEastLeft: false })
    const a = frame.toPx({ x: 0, y: 0 })
    const b = frame.toPx({ x: 1, y: 1 })
    expect(b.x - a.x).toBeCloseTo(a.y - b.y, 12)
    expect(frame.pxPerUnit).toBeCloseTo(20, 12)
  })

  it('keeps a single place in the middle', () => {
    const frame = frameAround([{ x: 3, y: 3 }], { widthPx: 80, heightPx: 60, marginPx: 5, isEastLeft: false })
    expect(frame.toPx({ x: 3, y: 3 })).toEqual({ x: 40, y: 30 })
  })
})
