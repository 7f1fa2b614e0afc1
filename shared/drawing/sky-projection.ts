import type { Point } from './conic-outline'

const RADIANS_PER_DEGREE = Math.PI / 180

/** A direction on the axes of the ICRS, degrees. */
export interface SkyDirection {
  raDeg: number
  decDeg: number
}

/**
 * Puts the sky on paper about a middle: stereographic, so that angles and small shapes stay true and a path half around the sky still has a place.
 * @param middle what lands at 0, 0.
 * @returns direction → x east, y north, in degrees near the middle.
 */
export function skyProjection(middle: SkyDirection): (direction: SkyDirection) => Point {
  const [sin0, cos0] = [Math.sin(middle.decDeg * RADIANS_PER_DEGREE), Math.cos(middle.decDeg * RADIANS_PER_DEGREE)]
  return ({ raDeg, decDeg }) => {
    const [sinD, cosD] = [Math.sin(decDeg * RADIANS_PER_DEGREE), Math.cos(decDeg * RADIANS_PER_DEGREE)]
    const around = (raDeg - middle.raDeg) * RADIANS_PER_DEGREE
    const toward = sin0 * sinD + cos0 * cosD * Math.cos(around)
    const scale = 2 / (1 + Math.max(-0.999, toward)) / RADIANS_PER_DEGREE
    return { x: scale * cosD * Math.sin(around), y: scale * (cos0 * sinD - sin0 * cosD * Math.cos(around)) }
  }
}

/** The direction in the middle of some directions; null where they cancel out. */
export function middleOf(directions: readonly SkyDirection[]): SkyDirection | null {
  const [x, y, z] = directions.reduce<[number, number, number]>(([sumX, sumY, sumZ], { raDeg, decDeg }) => {
    const [ra, dec] = [raDeg * RADIANS_PER_DEGREE, decDeg * RADIANS_PER_DEGREE]
    return [sumX + Math.cos(dec) * Math.cos(ra), sumY + Math.cos(dec) * Math.sin(ra), sumZ + Math.sin(dec)]
  }, [0, 0, 0])
  if (Math.hypot(x, y, z) < 1e-9) return null
  return { raDeg: Math.atan2(y, x) / RADIANS_PER_DEGREE, decDeg: Math.atan2(z, Math.hypot(x, y)) / RADIANS_PER_DEGREE }
}
