/** Every number that enters the engine is checked here, once; what is behind the door may rely on it. */
import { PI } from '../elementary'
import type { MeasureBase, PlaneMeasure, RelativeMeasure } from '../types'
import { refuse } from './refusal'

/** More measures than this are refused: no target has so many, and time and memory stay bounded. */
export const LARGEST_MEASURES = 20_000
const LARGEST_ANGLE_RAD = 4 * PI

/** Inclusive range of a number, with its words. */
interface Bounds {
  name: string
  from: number
  to: number
  words: string
}

function where(measure: { id: string }): string {
  return `in measure ${measure.id.slice(0, 60)}`
}

function checkNumber(measure: { id: string }, value: unknown, bounds: Bounds): void {
  if (typeof value === 'number' && value >= bounds.from && value <= bounds.to) return
  refuse('value-out-of-range', `The ${bounds.name} ${where(measure)} is not a number ${bounds.words}.`, 'Correct the value, or leave the measure out.')
}

function checkOptional(measure: { id: string }, value: unknown, bounds: Bounds): void {
  if (value !== undefined) checkNumber(measure, value, bounds)
}

const EPOCH: Bounds = { name: 'epoch', from: 1600, to: 2500, words: 'from 1600 to 2500 (Julian year)' }
const PLANE_EPOCH: Bounds = { name: 'epoch', from: -1e5, to: 1e5, words: 'between −100000 and 100000 (Julian year)' }
const THETA: Bounds = { name: 'position angle', from: -LARGEST_ANGLE_RAD, to: LARGEST_ANGLE_RAD, words: 'within two turns (rad)' }
const RHO: Bounds = { name: 'separation', from: 1e-6, to: 1e6, words: 'above 0 and up to 1000000 arcsec' }
const OFFSET: Bounds = { name: 'offset', from: -1e6, to: 1e6, words: 'between −1000000 and 1000000 arcsec' }
const SIGMA_ARCSEC: Bounds = { name: 'standard error', from: 1e-9, to: 1e6, words: 'above 0 and up to 1000000 arcsec' }
const SIGMA_THETA: Bounds = { name: 'standard error of the position angle', from: 1e-9, to: 100, words: 'above 0 and up to 100 rad' }
const CORRELATION: Bounds = { name: 'correlation', from: -1 + 1e-9, to: 1 - 1e-9, words: 'between −1 and 1' }
const WEIGHT: Bounds = { name: 'weight factor', from: 1e-12, to: 1e12, words: 'above 0' }
const NIGHTS: Bounds = { name: 'number of nights', from: 1, to: 1e6, words: 'of 1 or more' }
const RADIUS: Bounds = { name: 'distance', from: 1e-12, to: 1e12, words: 'above 0 and up to 1e12' }
const SIGMA_RADIUS: Bounds = { name: 'standard error of the distance', from: 1e-15, to: 1e12, words: 'above 0 and up to 1e12' }
const DIAMETER: Bounds = { name: 'apparent diameter', from: 1e-9, to: 1e6, words: 'above 0 and up to 1000000 arcmin' }

function checkBase(measure: MeasureBase, index: number, ids: Set<string>): void {
  if (typeof measure !== 'object' || measure === null || typeof measure.id !== 'string' || measure.id === '') {
    refuse('value-out-of-range', `Measure ${index + 1} has no identifier.`, 'Give every measure its own identifier.')
  }
  if (ids.has(measure.id)) refuse('duplicate-id', `The identifier ${measure.id.slice(0, 60)} stands for two measures.`, 'Give every measure its own identifier.')
  ids.add(measure.id)
  if (typeof measure.observer !== 'string') refuse('value-out-of-range', `The observer ${where(measure)} is not a name.`, 'Credit every measure to an observer.')
  if (measure.station !== undefined && typeof measure.station !== 'string') refuse('value-out-of-range', `The station ${where(measure)} is not a name.`, 'Name the station, or leave it out.')
  checkOptional(measure, measure.weightFactor, WEIGHT)
}

/**
 * Checks what all measures share and their number.
 * @param measures as given.
 * @throws RefusedRequest 'no-measures', 'too-many-measures', 'duplicate-id' or 'value-out-of-range'.
 */
export function validateList(measures: readonly MeasureBase[]): void {
  if (!Array.isArray(measures) || measures.length === 0) refuse('no-measures', 'The request holds no measures.', 'Send at least one measure.')
  if (measures.length > LARGEST_MEASURES) {
    refuse('too-many-measures', `The request holds ${measures.length} measures; at most ${LARGEST_MEASURES} are fitted at once.`, 'Combine measures into nightly or seasonal means.')
  }
  const ids = new Set<string>()
  measures.forEach((measure, index) => checkBase(measure, index, ids))
}

function checkPolar(measure: RelativeMeasure): void {
  const { position } = measure
  if (position.form !== 'polar') return
  if (position.thetaRad === undefined && position.rhoArcsec === undefined) {
    refuse('value-out-of-range', `Neither position angle nor separation stands ${where(measure)}.`, 'Give at least one of the two.')
  }
  checkOptional(measure, position.thetaRad, THETA)
  checkOptional(measure, position.rhoArcsec, RHO)
  checkOptional(measure, position.sigmaThetaRad, SIGMA_THETA)
  checkOptional(measure, position.sigmaRhoArcsec, SIGMA_ARCSEC)
  checkOptional(measure, position.correlation, CORRELATION)
  if (position.quadrant !== undefined && position.quadrant !== 'stated' && position.quadrant !== 'ambiguous') {
    refuse('value-out-of-range', `The quadrant ${where(measure)} is neither stated nor ambiguous.`, 'Give one of the two, or leave it out.')
  }
}

/**
 * Checks the values of relative measures.
 * @param measures with checked base.
 * @throws RefusedRequest 'value-out-of-range'.
 */
export function validateRelative(measures: readonly RelativeMeasure[]): void {
  for (const measure of measures) {
    checkNumber(measure, measure.epochYr, EPOCH)
    checkOptional(measure, measure.nights, NIGHTS)
    const { position } = measure
    if (position?.form === 'polar') checkPolar(measure)
    else if (position?.form === 'rectangular') {
      checkNumber(measure, position.eastArcsec, OFFSET)
      checkNumber(measure, position.northArcsec, OFFSET)
      checkOptional(measure, position.sigmaEastArcsec, SIGMA_ARCSEC)
      checkOptional(measure, position.sigmaNorthArcsec, SIGMA_ARCSEC)
      checkOptional(measure, position.correlation, CORRELATION)
    } else if (position?.form === 'limit') checkNumber(measure, position.rhoLimitArcsec, RHO)
    else refuse('value-out-of-range', `The position ${where(measure)} is of no known form.`, 'Give θ and ρ, or east and north, or a limit of ρ.')
  }
}

/**
 * Checks the values of plane measures.
 * @param measures with checked base.
 * @throws RefusedRequest 'value-out-of-range'.
 */
export function validatePlane(measures: readonly PlaneMeasure[]): void {
  for (const measure of measures) {
    checkNumber(measure, measure.phiRad, { ...THETA, name: 'direction' })
    checkOptional(measure, measure.epochYr, PLANE_EPOCH)
    if ((measure.r === undefined) === (measure.diameterArcmin === undefined)) {
      refuse('value-out-of-range', `Not exactly one of distance and apparent diameter stands ${where(measure)}.`, 'Give one of the two.')
    }
    checkOptional(measure, measure.r, RADIUS)
    checkOptional(measure, measure.sigmaR, SIGMA_RADIUS)
    checkOptional(measure, measure.diameterArcmin, DIAMETER)
    checkOptional(measure, measure.sigmaDiameterArcmin, { ...DIAMETER, name: 'standard error of the diameter' })
  }
}
