/**
 * Position angles at another equinox, and the spherical angles they rest on.
 *
 * Symbols: α, δ right ascension and declination (rad), θ position angle from north through east (rad). Precession turns the direction of
 * north at a star; θ of a pair changes by the angle between the two norths. Rigorous: the place of the earlier pole is carried to the later
 * equinox by the IAU 2006 angles ζ, z, θ_A and its direction seen from the star is the turn.
 *
 * Sources: Capitaine, Wallace & Chapront 2003, Expressions for IAU 2000 precession quantities, A&A 412, 567 (eq. 40); van den Bos in
 * Heintz 1978, Double Stars (linear rule).
 */
import { atan2, cos, DEG, hypot, sin } from '../elementary'

/** A direction on the sky, rad. */
export interface SkyDirection {
  rightAscensionRad: number
  declinationRad: number
}

const ARCSEC = DEG / 3600
/** n = 20.0431″ a year in degrees (Lieske 1979, A&A 73, 282). */
const LINEAR_DEG_PER_YR = 0.005567
const PER_CENTURY = 0.01

/**
 * Separation of two directions.
 * @param a first direction.
 * @param b second direction.
 * @returns rad, 0 to π.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 17, in the form that holds at all separations.
 */
export function separationRad(a: SkyDirection, b: SkyDirection): number {
  const { across, along, depth } = offset(a, b)
  return atan2(hypot(across, along), depth)
}

/**
 * Position angle of a second direction seen from a first.
 * @param a first direction.
 * @param b second direction.
 * @returns rad from north through east, −π to π; 0 where they coincide.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 17.
 */
export function positionAngleBetweenRad(a: SkyDirection, b: SkyDirection): number {
  const { across, along } = offset(a, b)
  return across === 0 && along === 0 ? 0 : atan2(across, along)
}

/** Components of b east, north and towards a. */
function offset(a: SkyDirection, b: SkyDirection): { across: number, along: number, depth: number } {
  const turn = b.rightAscensionRad - a.rightAscensionRad
  const sinA = sin(a.declinationRad)
  const cosA = cos(a.declinationRad)
  const sinB = sin(b.declinationRad)
  const cosB = cos(b.declinationRad)
  const cosTurn = cos(turn)
  return { across: cosB * sin(turn), along: sinB * cosA - cosB * sinA * cosTurn, depth: sinA * sinB + cosA * cosB * cosTurn }
}

/**
 * Turn of position angles from the mean equinox of one epoch to J2000.0, by the IAU 2006 precession.
 * @param star direction at J2000.0.
 * @param equinoxYr equinox of the position angle, Julian year, 1600 to 2500.
 * @returns rad; add it to θ of that equinox for θ at J2000.0.
 * Source: Capitaine, Wallace & Chapront 2003, Expressions for IAU 2000 precession quantities, A&A 412, 567, eq. 40.
 */
export function turnToJ2000Rad(star: SkyDirection, equinoxYr: number): number {
  const { zetaRad, thetaRad } = precessionAngles(equinoxYr)
  // The pole of date, in J2000.0 coordinates: α = −ζ, δ = 90° − θ_A. Its position angle at the star is that of the north of date.
  return positionAngleBetweenRad(star, { rightAscensionRad: -zetaRad, declinationRad: 90 * DEG - thetaRad })
}

/** ζ_A and θ_A from J2000.0 to the equinox of date, rad. */
function precessionAngles(equinoxYr: number): { zetaRad: number, thetaRad: number } {
  const t = (equinoxYr - 2000) * PER_CENTURY
  return {
    zetaRad: ARCSEC * (2.650545 + t * (2306.083227 + t * (0.2988499 + t * (0.01801828 + t * (-0.000005971 + t * -0.0000003173))))),
    thetaRad: ARCSEC * t * (2004.191903 + t * (-0.4294934 + t * (-0.04182264 + t * (-0.000007089 + t * -0.0000001274)))),
  }
}

/**
 * The same turn by the linear rule, for comparison and hand calculation.
 * @param star direction at J2000.0.
 * @param equinoxYr equinox of the position angle, Julian year.
 * @returns rad; add it to θ of that equinox for θ at J2000.0. Within 0.02° since 1900 below δ = 60°; useless near the pole.
 * Source: van den Bos, in Heintz 1978, Double Stars.
 */
export function linearTurnToJ2000Rad(star: SkyDirection, equinoxYr: number): number {
  return LINEAR_DEG_PER_YR * DEG * sin(star.rightAscensionRad) / cos(star.declinationRad) * (2000 - equinoxYr)
}

/**
 * Turn of a position angle by the proper motion of the pair between two epochs.
 * @param properMotionRaCosDecArcsecPerYr μ_α cos δ, ″ a year.
 * @param declinationRad δ, rad.
 * @param years from the epoch of the measure to the epoch wanted, Julian years.
 * @returns rad; add it to θ.
 * Source: van den Bos, in Heintz 1978, Double Stars: μ_α·sin δ, here from μ_α cos δ.
 */
export function turnByProperMotionRad(properMotionRaCosDecArcsecPerYr: number, declinationRad: number, years: number): number {
  return properMotionRaCosDecArcsecPerYr * ARCSEC * sin(declinationRad) / cos(declinationRad) * years
}
