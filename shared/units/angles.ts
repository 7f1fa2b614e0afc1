import { formatNumber, formatSigned } from './number-text'

/** Angles and separations at the edge: the engine speaks radians and arcseconds, people degrees and milliarcseconds. */

const RAD_A_DEG = Math.PI / 180
const MAS_AN_ARCSEC = 1000
const FULL_TURN_DEG = 360

/**
 * Degrees to radians.
 * @param angleDeg degrees
 * @returns radians
 */
export function radFromDeg(angleDeg: number): number {
  return angleDeg * RAD_A_DEG
}

/**
 * Radians to degrees.
 * @param angleRad radians
 * @returns degrees
 */
export function degFromRad(angleRad: number): number {
  return angleRad / RAD_A_DEG
}

/**
 * Arcseconds to milliarcseconds.
 * @param arcsec arcseconds
 * @returns milliarcseconds
 */
export function masFromArcsec(arcsec: number): number {
  return arcsec * MAS_AN_ARCSEC
}

/**
 * Writes a direction in degrees, without its sign.
 * @param angleDeg degrees; any turn
 * @param decimals 0 to 15, default 2
 * @returns 0 to below 360, such as "146.65"; "—" where it was not measured
 */
export function formatDirection(angleDeg: number | null, decimals = 2): string {
  if (angleDeg === null) return '—'
  const turned = angleDeg - FULL_TURN_DEG * Math.floor(angleDeg / FULL_TURN_DEG)
  const text = formatNumber(turned, decimals)
  return Number(text) === FULL_TURN_DEG ? formatNumber(0, decimals) : text
}

/**
 * Writes a position angle with its sign, such as "78.4°".
 * @param angleDeg degrees; any turn
 * @param decimals 0 to 15, default 1
 * @returns 0 to below 360 with the degree sign
 */
export function formatPositionAngle(angleDeg: number, decimals = 1): string {
  return `${formatDirection(angleDeg, decimals)}°`
}

/**
 * Writes a separation in arcseconds, without its sign.
 * @param separationArcsec arcseconds
 * @param decimals 0 to 15, default 3
 * @returns such as "0.238"; "—" where it was not measured
 */
export function formatArcsec(separationArcsec: number | null, decimals = 3): string {
  return separationArcsec === null ? '—' : formatNumber(separationArcsec, decimals)
}

/**
 * Writes a separation with its unit: in milliarcseconds below a tenth of an arcsecond.
 * @param separationArcsec arcseconds, ≥ 0
 * @returns such as "0.861″" or "38.2 mas"
 */
export function formatSeparation(separationArcsec: number): string {
  const isSmall = Math.abs(separationArcsec) < 0.1
  return isSmall ? `${formatNumber(masFromArcsec(separationArcsec), 1)} mas` : `${formatNumber(separationArcsec, 3)}″`
}

/**
 * Writes a residual of a separation in milliarcseconds, without the unit.
 * @param residualArcsec arcseconds; null where the coordinate was not measured
 * @param decimals 0 to 15, default 0
 * @returns such as "+3" or "−7"; "—" where there is none
 */
export function formatResidualMas(residualArcsec: number | null, decimals = 0): string {
  return residualArcsec === null ? '—' : formatSigned(masFromArcsec(residualArcsec), decimals)
}

/**
 * Writes a residual in its own unit, without the unit.
 * @param residual degrees, arcminutes or a target's unit of length; null where the coordinate was not measured
 * @param decimals 0 to 15, default 2
 * @returns such as "−4.66"; "—" where there is none
 */
export function formatResidual(residual: number | null, decimals = 2): string {
  return residual === null ? '—' : formatSigned(residual, decimals)
}

/**
 * Writes an epoch.
 * @param epochYr Julian year; null where no time was given
 * @param decimals 0 to 15, default 3
 * @returns such as "2012.258"; "—" where there is none
 */
export function formatEpoch(epochYr: number | null, decimals = 3): string {
  return epochYr === null ? '—' : formatNumber(epochYr, decimals)
}
