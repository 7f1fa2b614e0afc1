import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { linearTurnToJ2000Rad, positionAngleBetweenRad, separationRad, turnByProperMotionRad, turnToJ2000Rad } from '../../../../fitting/time'

const DEG = Math.PI / 180
const runs = { seed: 10, numRuns: 2000 }
const direction = fc.record({ rightAscensionRad: fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }), declinationRad: fc.double({ min: -1.5, max: 1.5, noNaN: true }) })

describe('directions on the sky', () => {
  it('are as far from each other both ways, and 0 from themselves', () => {
    fc.assert(fc.property(direction, direction, (a, b) => {
      expect(separationRad(a, b)).toBeCloseTo(separationRad(b, a), 13)
      expect(separationRad(a, a)).toBeLessThanOrEqual(3e-16)
    }), runs)
  })

  it('a step north has position angle 0, east 90, south 180', () => {
    const star = { rightAscensionRad: 1, declinationRad: 0.5 }
    expect(positionAngleBetweenRad(star, { ...star, declinationRad: 0.5001 })).toBe(0)
    expect(positionAngleBetweenRad(star, { ...star, rightAscensionRad: 1.00001 })).toBeCloseTo(Math.PI / 2, 4)
    expect(Math.abs(positionAngleBetweenRad(star, { ...star, declinationRad: 0.4999 }))).toBeCloseTo(Math.PI, 10)
    expect(positionAngleBetweenRad(star, star)).toBe(0)
  })
})

describe('the turn of position angles to J2000.0', () => {
  it('is nothing from 2000, and nearly the linear rule within a century below 60 degrees', () => {
    fc.assert(fc.property(direction, fc.double({ min: 1900, max: 2100, noNaN: true }), (star, equinoxYr) => {
      expect(Math.abs(turnToJ2000Rad(star, 2000))).toBeLessThanOrEqual(2e-7)
      fc.pre(Math.abs(star.declinationRad) < 60 * DEG)
      expect(Math.abs(turnToJ2000Rad(star, equinoxYr) - linearTurnToJ2000Rad(star, equinoxYr))).toBeLessThanOrEqual(0.03 * DEG)
    }), runs)
  })

  it('by proper motion grows with declination and time, and changes sign with either', () => {
    // 61 Cygni: 4.1″ a year eastward at δ = 38.75°: 0.0915° a century.
    expect(turnByProperMotionRad(4.1, 38.75 * DEG, 100) / DEG).toBeCloseTo(4.1 / 3600 * Math.tan(38.75 * DEG) * 100, 12)
    expect(turnByProperMotionRad(4.1, -38.75 * DEG, 100)).toBeCloseTo(-turnByProperMotionRad(4.1, 38.75 * DEG, 100), 15)
    expect(turnByProperMotionRad(4.1, 0, 100)).toBe(0)
  })
})
