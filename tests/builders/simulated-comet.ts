import { observerHeliocentric } from '../../fitting/earth'
import { stateFromPerihelion } from '../../fitting/models/perihelion'
import { planetMotion } from '../../fitting/models/planet-motion'
import { emptyLineOfSight, lineOfSightInto } from '../../fitting/models/line-of-sight'
import { randomStream } from '../../fitting/random'
import type { MeasureSite } from '../../fitting/types'
import { formatDeclination, formatRightAscension } from '../../shared/units/sexagesimal'
import { tableText } from './measure-files'

/** A stated true orbit about the Sun, osculating at its epoch; the planets pull on it. */
export interface TrueComet {
  perihelionDistanceAu: number
  eccentricity: number
  inclinationDeg: number
  nodeDeg: number
  argumentOfPerihelionDeg: number
  perihelionTimeJdTt: number
  epochJdTt: number
}

export interface Sighting {
  jdUtc: number
  raDeg: number
  decDeg: number
  distanceAu: number
  sunDistanceAu: number
}

export interface ObservingPlace {
  longitudeEastDeg: number
  latitudeDeg: number
  heightM: number
}

const RADIANS_PER_DEGREE = Math.PI / 180
const UNIX_EPOCH_JD = 2_440_587.5
const DAY_MS = 86_400_000

/** Where the comet truly stands, seen from a place, in the order of the times given. */
export function trueSightings(comet: TrueComet, site: MeasureSite, jdsUtc: readonly number[]): Sighting[] {
  const motion = planetMotion(comet.epochJdTt)
  motion.begin(stateFromPerihelion({
    perihelionDistanceAu: comet.perihelionDistanceAu,
    eccentricity: comet.eccentricity,
    inclinationRad: comet.inclinationDeg * RADIANS_PER_DEGREE,
    nodeRad: comet.nodeDeg * RADIANS_PER_DEGREE,
    argumentOfPerihelionRad: comet.argumentOfPerihelionDeg * RADIANS_PER_DEGREE,
    perihelionTimeJdTt: comet.perihelionTimeJdTt,
  }, comet.epochJdTt), false)
  return jdsUtc.map((jdUtc) => {
    const { jdTt, place, sunVelocity } = observerHeliocentric(site, jdUtc)
    const found = emptyLineOfSight()
    const isFollowed = lineOfSightInto({ jdTt, observer: Float64Array.from(place), sunVelocity: Float64Array.from(sunVelocity) }, motion, 0.01, found, false)
    if (!isFollowed) throw new Error(`The comet cannot be followed to JD ${jdUtc}.`)
    const [x, y, z] = [found.line[0]!, found.line[1]!, found.line[2]!]
    return {
      jdUtc,
      raDeg: (Math.atan2(y, x) / RADIANS_PER_DEGREE + 360) % 360,
      decDeg: Math.asin(z / found.distance) / RADIANS_PER_DEGREE,
      distanceAu: found.distance,
      sunDistanceAu: Math.hypot(found.state[0]!, found.state[1]!, found.state[2]!),
    }
  })
}

export interface CometSeason {
  site: ObservingPlace
  station: string
  observer?: string
  /** JD of UTC of the first night's first exposure; the nights follow about `stepDays` apart. */
  fromJdUtc: number
  nights: number
  stepDays: number
  exposuresANight: number
  sigmaArcsec: number
  seed: number
}

/** A file of one observer's season on a comet, as an observer would write it, with normal errors. */
export function cometFile(comet: TrueComet, season: CometSeason): string {
  const random = randomStream(season.seed)
  const jdsUtc = Array.from({ length: season.nights }, (_, night) => Math.floor(season.stepDays * night + 0.6 * random.uniform()))
    .flatMap(day => Array.from({ length: season.exposuresANight }, (_, k) => toSecond(season.fromJdUtc + day + (k * 20 + 8 * random.uniform()) / 1440)))
  return tableText(trueSightings(comet, season.site, jdsUtc).map((sighting) => {
    const decDeg = sighting.decDeg + season.sigmaArcsec / 3600 * random.normal()
    const raDeg = sighting.raDeg + season.sigmaArcsec / 3600 / Math.cos(decDeg * RADIANS_PER_DEGREE) * random.normal()
    return {
      time_utc: new Date(Math.round((sighting.jdUtc - UNIX_EPOCH_JD) * DAY_MS)).toISOString().replace('.000Z', 'Z'),
      ra_hms: formatRightAscension(raDeg),
      dec_dms: formatDeclination(decDeg),
      station: season.station,
      lon_deg: String(season.site.longitudeEastDeg),
      lat_deg: String(season.site.latitudeDeg),
      height_m: String(season.site.heightM),
      sigma_ra_cosdec_arcsec: String(season.sigmaArcsec),
      sigma_dec_arcsec: String(season.sigmaArcsec),
      mag: (9.2 + 5 * Math.log10(sighting.distanceAu) + 10 * Math.log10(sighting.sunDistanceAu) + 0.1 * random.normal()).toFixed(1),
      band: 'G',
      ...(season.observer === undefined ? {} : { observer: season.observer }),
    }
  }))
}

function toSecond(jdUtc: number): number {
  return UNIX_EPOCH_JD + Math.round((jdUtc - UNIX_EPOCH_JD) * 86_400) / 86_400
}
