/**
 * Nutation IAU 2000B and the angles of bias and precession IAU 2006.
 *
 * Symbols: t Julian centuries of TT since J2000.0; Δψ, Δε nutation in longitude and obliquity; γ̄, φ̄, ψ̄, ε_A the four angles of the
 * equator of date on the axes of the GCRS, frame bias included; Ω the mean longitude of the Moon's ascending node (all rad).
 * Departure: the P03 adjustments of the nutation (below 1e-4″ between 1900 and 2100) are left out; IAU 2000B is within 1e-3″ of IAU 2000A.
 *
 * Sources: McCarthy & Luzum 2003, Celestial Mechanics and Dynamical Astronomy 85, 37; Hilton et al. 2006, Report of the IAU Division I
 * Working Group on Precession and the Ecliptic, Celestial Mechanics and Dynamical Astronomy 94, 351; Simon et al. 1994, A&A 282, 663.
 */
import { DEG, sinCosInto } from '../elementary'
import { NUTATION_TERMS } from './nutation-terms'

/** Nutation and the arguments that sidereal time needs beside it, rad. */
export interface Nutation {
  /** Δψ. */
  longitudeRad: number
  /** Δε. */
  obliquityRad: number
  /** Ω. */
  moonNodeRad: number
}

/** Angles of the mean equator and equinox of date on the axes of the GCRS, rad. */
export interface PrecessionAngles {
  gammaRad: number
  phiRad: number
  psiRad: number
  /** ε_A, the mean obliquity of date. */
  obliquityRad: number
}

const ARCSEC = DEG / 3600
const UNIT = ARCSEC * 1e-7
/** In place of the planetary terms, rad. */
const PLANETARY_LONGITUDE = -0.000135 * ARCSEC
const PLANETARY_OBLIQUITY = 0.000388 * ARCSEC

const wave = new Float64Array(2)
const delaunay = new Float64Array(5)

/**
 * Nutation of the Earth's axis.
 * @param centuriesTt t, Julian centuries of TT since J2000.0.
 * @returns Δψ, Δε and Ω; within 1e-3″ of IAU 2000A between 1995 and 2050.
 * Source: McCarthy & Luzum 2003, Celestial Mechanics and Dynamical Astronomy 85, 37.
 */
export function nutation(centuriesTt: number): Nutation {
  const t = centuriesTt
  delaunay[0] = ARCSEC * (485868.249036 + 1717915923.2178 * t)
  delaunay[1] = ARCSEC * (1287104.79305 + 129596581.0481 * t)
  delaunay[2] = ARCSEC * (335779.526232 + 1739527262.8478 * t)
  delaunay[3] = ARCSEC * (1072260.70369 + 1602961601.2090 * t)
  delaunay[4] = ARCSEC * (450160.398036 - 6962890.5431 * t)
  let longitude = 0
  let obliquity = 0
  for (let k = NUTATION_TERMS.length - 1; k >= 0; k--) {
    const term = NUTATION_TERMS[k]!
    let argument = 0
    for (let j = 0; j < 5; j++) argument += term[j]! * delaunay[j]!
    sinCosInto(argument, wave)
    longitude += (term[5]! + term[6]! * t) * wave[0]! + term[7]! * wave[1]!
    obliquity += (term[8]! + term[9]! * t) * wave[1]! + term[10]! * wave[0]!
  }
  return {
    longitudeRad: longitude * UNIT + PLANETARY_LONGITUDE,
    obliquityRad: obliquity * UNIT + PLANETARY_OBLIQUITY,
    moonNodeRad: delaunay[4],
  }
}

/**
 * Bias and precession of the equator and equinox.
 * @param centuriesTt t, Julian centuries of TT since J2000.0.
 * @returns γ̄, φ̄, ψ̄ and ε_A.
 * Source: Hilton et al. 2006, Celestial Mechanics and Dynamical Astronomy 94, 351 (Fukushima–Williams angles of the precession P03).
 */
export function precessionAngles(centuriesTt: number): PrecessionAngles {
  const t = centuriesTt
  return {
    gammaRad: ARCSEC * (-0.052928 + t * (10.556378 + t * (0.4932044 + t * (-0.00031238 + t * (-0.000002788 + t * 0.0000000260))))),
    phiRad: ARCSEC * (84381.412819 + t * (-46.811016 + t * (0.0511268 + t * (0.00053289 + t * (-0.000000440 + t * -0.0000000176))))),
    psiRad: ARCSEC * (-0.041775 + t * (5038.481484 + t * (1.5584175 + t * (-0.00018522 + t * (-0.000026452 + t * -0.0000000148))))),
    obliquityRad: ARCSEC * (84381.406 + t * (-46.836769 + t * (-0.0001831 + t * (0.00200340 + t * (-0.000000576 + t * -0.0000000434))))),
  }
}
