/**
 * Stations on the Earth: geodetic places, parallax constants and vectors.
 *
 * Symbols: φ geodetic latitude, φ′ geocentric latitude, h height above the ellipsoid; ρ distance from the Earth's centre in equatorial radii.
 *
 * Source: Meeus 1998, Astronomical Algorithms, 2nd ed., chs. 11 and 40.
 */
import { cos, DEG, sin } from '../elementary'
import { AU_KM } from './constants'
import type { EarthOrientation } from './earth-rotation'
import { earthOrientation, toIcrsAxes } from './earth-rotation'

/** A station by its longitude and its published parallax constants ρ·cos φ′ and ρ·sin φ′, in equatorial radii. Both 0: the Earth's centre. */
export interface ParallaxPlace {
  longitudeEastDeg: number
  rhoCosPhi: number
  rhoSinPhi: number
}

/** A station by longitude, latitude (north positive) and height above the ellipsoid. */
export interface GeodeticPlace {
  longitudeEastDeg: number
  latitudeDeg: number
  heightM: number
}

export type StationPlace = ParallaxPlace | GeodeticPlace

/** An ellipsoid of revolution by its equatorial radius and flattening. */
export interface Ellipsoid {
  equatorialRadiusM: number
  flattening: number
}

/** The ellipsoid of satellite positioning. Source: NIMA 2000, Department of Defense World Geodetic System 1984, TR8350.2. */
export const WGS84: Ellipsoid = { equatorialRadiusM: 6378137, flattening: 1 / 298.257223563 }

const EQUATORIAL_RADIUS_AU = WGS84.equatorialRadiusM / 1000 / AU_KM

/**
 * Parallax constants of a geodetic place.
 * @param place longitude, latitude, height.
 * @param ellipsoid by default WGS 84.
 * @returns the longitude, ρ·cos φ′ (≥ 0) and ρ·sin φ′ in equatorial radii of the ellipsoid.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 11.
 */
export function parallaxPlace(place: GeodeticPlace, ellipsoid: Ellipsoid = WGS84): ParallaxPlace {
  const sine = sin(place.latitudeDeg * DEG)
  const cosine = cos(place.latitudeDeg * DEG)
  const axisRatio = 1 - ellipsoid.flattening
  const height = place.heightM / ellipsoid.equatorialRadiusM
  const curvature = 1 / Math.sqrt(cosine * cosine + axisRatio * axisRatio * sine * sine)
  return {
    longitudeEastDeg: place.longitudeEastDeg,
    rhoCosPhi: (curvature + height) * cosine,
    rhoSinPhi: (axisRatio * axisRatio * curvature + height) * sine,
  }
}

/**
 * Geocentric vector of a station on the axes of the ICRS.
 * @param station parallax constants, or a geodetic place on WGS 84.
 * @param jdUtc JD of UTC (before 1972 of UT), d; taken as UT1.
 * @param jdTt JD of TT of the same instant, d.
 * @param out receives x, y, z, au, at [0] to [2].
 * Source: Meeus 1998, Astronomical Algorithms, chs. 11 and 40; precession and nutation as toIcrsAxes.
 */
export function stationVector(station: StationPlace, jdUtc: number, jdTt: number, out: Float64Array): void {
  const orientation = earthOrientation(jdUtc, jdTt)
  stationOfDateInto(station, orientation, out)
  toIcrsAxes(orientation, out)
}

/**
 * Geocentric vector of a station on the true equator and equinox of date.
 * @param station parallax constants, or a geodetic place on WGS 84.
 * @param orientation of which only the sidereal time is used.
 * @param out receives x, y, z, au, at [0] to [2].
 * Source: Meeus 1998, Astronomical Algorithms, ch. 40.
 */
export function stationOfDateInto(station: StationPlace, orientation: Pick<EarthOrientation, 'siderealRad'>, out: Float64Array): void {
  const { longitudeEastDeg, rhoCosPhi, rhoSinPhi } = 'latitudeDeg' in station ? parallaxPlace(station) : station
  const localSiderealRad = orientation.siderealRad + longitudeEastDeg * DEG
  out[0] = EQUATORIAL_RADIUS_AU * rhoCosPhi * cos(localSiderealRad)
  out[1] = EQUATORIAL_RADIUS_AU * rhoCosPhi * sin(localSiderealRad)
  out[2] = EQUATORIAL_RADIUS_AU * rhoSinPhi
}
