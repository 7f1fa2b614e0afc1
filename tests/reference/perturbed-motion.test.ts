import { describe, expect, it } from 'vitest'
import { planetMotion } from '../../fitting/models/planet-motion'
import { cell, readFixture } from './published'

const EPOCH_JD_TT = 2455000.5
const ARCSEC = Math.PI / 180 / 3600

/** Integrated by SciPy 1.10's DOP853 at a relative tolerance of 1e-13, with the same planets on a spline of seventh degree. */
describe('motion with the planets, against an independent integration of high order', () => {
  const rows = readFixture('checks/perturbed_years.csv')

  it.each(rows.map((row, i) => [`${i + 1}, ${row.orbit_class!}`, cell(row, 'days'), row] as const))('orbit %s: %s days hold to 0.01″ seen from the Sun', (_, days, row) => {
    const start = Float64Array.from(['x0', 'y0', 'z0', 'vx0', 'vy0', 'vz0'], (name) => cell(row, name))
    const expected = ['x', 'y', 'z', 'vx', 'vy', 'vz'].map((name) => cell(row, name))
    const motion = planetMotion(EPOCH_JD_TT)
    const found = new Float64Array(6)
    expect(motion.begin(start, false) && motion.at(days, found)).toBe(true)
    const apart = Math.hypot(...[0, 1, 2].map((k) => found[k]! - expected[k]!))
    expect(apart / Math.hypot(expected[0]!, expected[1]!, expected[2]!) / ARCSEC).toBeLessThan(0.01)
    expect(Math.hypot(...[3, 4, 5].map((k) => found[k]! - expected[k]!))).toBeLessThan(1e-8)
  })

  it('returns to its start after five years there and back', () => {
    const row = rows[0]!
    const motion = planetMotion(EPOCH_JD_TT)
    const [there, back] = [new Float64Array(6), new Float64Array(6)]
    motion.begin(Float64Array.from(['x0', 'y0', 'z0', 'vx0', 'vy0', 'vz0'], (name) => cell(row, name)), false)
    motion.at(-1826, there)
    const reverse = planetMotion(EPOCH_JD_TT - 1826)
    reverse.begin(there, false)
    reverse.at(1826, back)
    expect(Math.abs(back[0]! - cell(row, 'x0'))).toBeLessThan(1e-8)
  })
})
