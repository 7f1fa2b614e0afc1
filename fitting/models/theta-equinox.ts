/**
 * Position angles brought to one equinox, by the IAU 2006 precession at the place of the pair:
 *   θ(to) = θ(from) + turn(from) − turn(to),  turn the angle from the north of date to that of J2000.0
 * East and north turn alike, with their covariance. Only where the request names an equinox is anything turned.
 * Source: Capitaine, Wallace & Chapront 2003, A&A 412, 567; fitting/time/equinox.ts.
 */
import { cos, sin } from '../elementary'
import { turnToJ2000Rad } from '../time'
import type { FitSettings, RectangularPosition, RelativeMeasure } from '../types'

const J2000 = 2000
/** Equinoxes closer than this are one, years: θ changes by 0.0003° there at most, outside a degree of the pole. */
const SAME_EQUINOX_YR = 0.01

export interface AtOneEquinox {
  measures: RelativeMeasure[]
  /** Measures that would have to be turned, though no place of the pair is known. */
  unplaced: number
  /** What to say. */
  sentences: string[]
}

function turnedPlace(position: RectangularPosition, turnRad: number): RectangularPosition {
  const [c, s] = [cos(turnRad), sin(turnRad)]
  const { northArcsec, eastArcsec, sigmaNorthArcsec: sn, sigmaEastArcsec: se, correlation = 0 } = position
  const place = { ...position, northArcsec: northArcsec * c - eastArcsec * s, eastArcsec: northArcsec * s + eastArcsec * c }
  if (sn === undefined || se === undefined) return place
  const covariance = correlation * sn * se
  const north = Math.sqrt(c * c * sn * sn + s * s * se * se - 2 * c * s * covariance)
  const east = Math.sqrt(s * s * sn * sn + c * c * se * se + 2 * c * s * covariance)
  return { ...place, sigmaNorthArcsec: north, sigmaEastArcsec: east, correlation: (c * s * (sn * sn - se * se) + (c * c - s * s) * covariance) / (north * east) }
}

function turnedMeasure(measure: RelativeMeasure, turnRad: number): RelativeMeasure {
  const { position } = measure
  if (position.form === 'rectangular') return { ...measure, position: turnedPlace(position, turnRad) }
  if (position.form !== 'polar' || position.thetaRad === undefined) return measure
  return { ...measure, position: { ...position, thetaRad: position.thetaRad + turnRad } }
}

/** Without a named equinox: nothing is turned, and a mixture is said. */
function asGiven(measures: RelativeMeasure[], stated: readonly number[]): AtOneEquinox {
  const [low, high] = [Math.min(...stated), Math.max(...stated)]
  const isMixed = stated.length > 1 && high - low > SAME_EQUINOX_YR
  const sentence = `Position angles are of equinoxes from ${low.toFixed(1)} to ${high.toFixed(1)} and were taken as they stand: name an equinox (thetaEquinox) to bring them to one.`
  return { measures, unplaced: 0, sentences: isMixed ? [sentence] : [] }
}

/**
 * Brings position angles to the equinox of the settings.
 * @param measures validated.
 * @param settings thetaEquinox, Julian year, and targetPosition at J2000.0; without the first nothing is turned.
 * @returns measures at that equinox; those that name none are taken to be of it, which a sentence says where others name one.
 * Source: Capitaine, Wallace & Chapront 2003, A&A 412, 567.
 */
export function atOneEquinox(measures: RelativeMeasure[], { thetaEquinox, targetPosition }: FitSettings): AtOneEquinox {
  const stated = measures.flatMap(({ thetaEquinoxYr }) => (thetaEquinoxYr === undefined ? [] : [thetaEquinoxYr]))
  if (thetaEquinox === undefined) return asGiven(measures, stated)
  const isOff = ({ thetaEquinoxYr = thetaEquinox }: RelativeMeasure) => Math.abs(thetaEquinoxYr - thetaEquinox) > SAME_EQUINOX_YR
  const off = measures.filter(isOff).length
  if (targetPosition === undefined && off > 0) return { measures, unplaced: off, sentences: [] }
  const sentences: string[] = []
  const silent = measures.length - stated.length
  if (silent > 0 && (stated.length > 0 || thetaEquinox !== J2000)) {
    sentences.push(`${silent === 1 ? 'One measure does' : `${silent} measures do`} not say of which equinox the position angle is; it was taken to be of ${thetaEquinox.toFixed(1)}.`)
  }
  if (off === 0 || targetPosition === undefined) return { measures, unplaced: 0, sentences }
  sentences.push(`${off === 1 ? 'One position angle was' : `${off} position angles were`} turned to the equinox ${thetaEquinox.toFixed(1)} by the IAU 2006 precession.`)
  const to = turnToJ2000Rad(targetPosition, thetaEquinox)
  const turned = measures.map((measure) => (isOff(measure) ? turnedMeasure(measure, turnToJ2000Rad(targetPosition, measure.thetaEquinoxYr!) - to) : measure))
  return { measures: turned, unplaced: 0, sentences }
}
