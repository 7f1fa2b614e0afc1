import type { Element, FitResult, Kind, Residual } from '../../fitting/types'

/** A number with one error in all three places. */
export function element(value: number, sigma: number | null, unit: string): Element {
  return { value, sigma, sigmaFormal: sigma, sigmaScaled: sigma, unit }
}

/** A finished fit of a pair, with values of our own choosing where the test does not say. */
export function pairResult(values: Partial<Record<string, Element>> = {}, rest: Partial<FitResult> = {}): FitResult {
  const elements = withoutUndefined({
    period: element(62.41, 0.38, 'yr'),
    periastronTime: element(2009.32, 0.09, 'yr'),
    eccentricity: element(0.482, 0.004, ''),
    semiMajorAxis: element(0.861, 0.006, 'arcsec'),
    inclination: element(48.3, 0.7, 'deg'),
    node: element(118.9, 0.9, 'deg'),
    argumentOfPeriastron: element(73.4, 1.1, 'deg'),
    ...values,
  })
  return { ...bareResult('relative'), model: 'kepler', elements, nodeStatus: 'ambiguous', nodeEquinox: 2000, ...rest }
}

/** A finished fit in the plane of the orbit. */
export function planeResult(values: Partial<Record<string, Element>> = {}, rest: Partial<FitResult> = {}): FitResult {
  const elements = withoutUndefined({
    semiLatusRectum: element(0.9997, 0.0008, 'au'),
    eccentricity: element(0.0165, 0.0009, ''),
    periapsisDirection: element(103.4, 3.1, 'deg'),
    ...values,
  })
  return { ...bareResult('plane'), elements, ...rest }
}

/** A finished fit of a comet about the Sun. */
export function solarResult(values: Partial<Record<string, Element>> = {}, rest: Partial<FitResult> = {}): FitResult {
  const elements = withoutUndefined({
    perihelionDistance: element(0.88412, 0.00062, 'au'),
    eccentricity: element(0.9987, 0.0021, ''),
    inclination: element(64.21, 0.03, 'deg'),
    node: element(211.4, 0.05, 'deg'),
    argumentOfPerihelion: element(118.2, 0.11, 'deg'),
    perihelionTime: element(2461158.314, 0.021, 'JD TT'),
    ...values,
  })
  const honestArc = { days: 41.2, honestUntilDays: 60, standing: 'honest' as const, statement: 'The arc of 41 days lies within the 60 days.' }
  return { ...bareResult('equatorial'), elements, honestArc, epochOfElements: 2461120.5, frame: 'ecliptic and equinox of J2000', ...rest }
}

/** A residual of a measure that was used and sits where the fit puts it, unless said otherwise. */
export function residual(id: string, computed: Record<string, number>, rest: Partial<Residual> = {}): Residual {
  return {
    id, computed, status: 'used', observedMinusComputed: {}, normalised: 0, rows: [], weight: 1,
    leverage: null, cook: null, inOrbitPlane: null, ...rest,
  }
}

function bareResult(kind: Kind): FitResult {
  return {
    format: 1,
    kind,
    model: 'kepler',
    engine: { version: '0.0.0-test', seed: 1 },
    stop: { reason: 'chi-square-settled', sentence: 'χ² settled', iterations: 5 },
    conic: null,
    elements: {},
    covariance: null,
    constants: null,
    statistics: {
      measures: 0, used: 0, rows: 0, parameters: 7, degreesOfFreedom: 0, chiSquare: 0, reducedChiSquare: null, rms: {},
      conditionNumber: null, errorBasis: 'formal', byObserver: [],
      arc: { firstEpochYr: null, lastEpochYr: null, turns: null, trueAnomalyCoveredDeg: null, positionAngleCoveredDeg: null },
    },
    residuals: [],
    alternatives: [],
    proposals: [],
    warnings: [],
    state: { model: kind === 'plane' ? 'plane' : 'kepler', names: [], values: [], covariance: null, referenceEpochYr: 0 },
  }
}

function withoutUndefined(values: Partial<Record<string, Element>>): Record<string, Element> {
  return Object.fromEntries(Object.entries(values).filter((entry): entry is [string, Element] => entry[1] !== undefined))
}
