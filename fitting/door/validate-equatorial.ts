/** The values of equatorial measures, checked once. */
import { DEG, TWO_PI } from '../elementary'
import { jdFromCalendar } from '../time'
import type { EquatorialMeasure } from '../types'
import { refuse } from './refusal'

interface Bounds {
  name: string
  from: number
  to: number
  words: string
}

const FIRST_JD = jdFromCalendar({ year: 1620, month: 1, day: 2 })
const LAST_JD = jdFromCalendar({ year: 2500, month: 12, day: 31 })

const TIME: Bounds = { name: 'time', from: FIRST_JD, to: LAST_JD, words: 'of a Julian date (UTC) from 1620 to 2500' }
/** 24h is 0h. */
const RIGHT_ASCENSION: Bounds = { name: 'right ascension', from: 0, to: TWO_PI * (1 + 1e-15), words: 'from 0 to 24 hours (0 to 2π rad)' }
const DECLINATION: Bounds = { name: 'declination', from: -90 * DEG * (1 + 1e-15), to: 90 * DEG * (1 + 1e-15), words: 'from −90° to 90° (rad)' }
const SIGMA: Bounds = { name: 'standard error', from: 1e-6, to: 1e5, words: 'above 0 and up to 100000 arcsec' }
const SIGMA_TIME: Bounds = { name: 'standard error of the time', from: 0, to: 1e5, words: 'of 0 or more seconds, up to 100000' }
const CORRELATION: Bounds = { name: 'correlation', from: -1 + 1e-9, to: 1 - 1e-9, words: 'between −1 and 1' }
const LONGITUDE: Bounds = { name: 'longitude of the station', from: -360, to: 360, words: 'between −360 and 360 degrees' }
const LATITUDE: Bounds = { name: 'latitude of the station', from: -90, to: 90, words: 'between −90 and 90 degrees' }
const HEIGHT: Bounds = { name: 'height of the station', from: -12_000, to: 100_000, words: 'between −12000 and 100000 m' }
const RHO_COS: Bounds = { name: 'parallax constant ρ cos φ′', from: 0, to: 1.02, words: 'between 0 and 1.02 equatorial radii' }
const RHO_SIN: Bounds = { name: 'parallax constant ρ sin φ′', from: -1.02, to: 1.02, words: 'between −1.02 and 1.02 equatorial radii' }
const MAGNITUDE: Bounds = { name: 'magnitude', from: -60, to: 60, words: 'between −60 and 60' }

function check(measure: EquatorialMeasure, value: unknown, bounds: Bounds): void {
  if (typeof value === 'number' && value >= bounds.from && value <= bounds.to) return
  refuse('value-out-of-range', `The ${bounds.name} in measure ${measure.id.slice(0, 60)} is not a number ${bounds.words}.`, 'Correct the value, or leave the measure out.')
}

function checkOptional(measure: EquatorialMeasure, value: unknown, bounds: Bounds): void {
  if (value !== undefined) check(measure, value, bounds)
}

function checkSite(measure: EquatorialMeasure): void {
  const site: unknown = measure.site
  if (typeof site !== 'object' || site === null) {
    refuse('value-out-of-range', `No place of observation stands in measure ${measure.id.slice(0, 60)}.`, 'Give longitude, latitude and height, or longitude and parallax constants; constants of 0 are the Earth’s centre.')
  }
  check(measure, measure.site.longitudeEastDeg, LONGITUDE)
  if ('latitudeDeg' in measure.site) {
    check(measure, measure.site.latitudeDeg, LATITUDE)
    check(measure, measure.site.heightM, HEIGHT)
    return
  }
  check(measure, measure.site.rhoCosPhi, RHO_COS)
  check(measure, measure.site.rhoSinPhi, RHO_SIN)
}

/**
 * Checks the values of equatorial measures.
 * @param measures with checked base.
 * @throws RefusedRequest 'value-out-of-range'.
 */
export function validateEquatorial(measures: readonly EquatorialMeasure[]): void {
  for (const measure of measures) {
    check(measure, measure.jdUtc, TIME)
    check(measure, measure.raRad, RIGHT_ASCENSION)
    check(measure, measure.decRad, DECLINATION)
    checkSite(measure)
    checkOptional(measure, measure.sigmaRaCosDecArcsec, SIGMA)
    checkOptional(measure, measure.sigmaDecArcsec, SIGMA)
    checkOptional(measure, measure.correlation, CORRELATION)
    checkOptional(measure, measure.sigmaTimeS, SIGMA_TIME)
    checkOptional(measure, measure.magnitude, MAGNITUDE)
    if (measure.band !== undefined && typeof measure.band !== 'string') refuse('value-out-of-range', `The band in measure ${measure.id.slice(0, 60)} is not a name.`, 'Name the band, or leave it out.')
  }
}
