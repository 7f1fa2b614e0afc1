import type { Element } from '../../fitting/types'

/** How an element of a fit is called and in which order elements are read. */
export interface ElementLabel {
  /** Key in FitResult.elements. */
  name: string
  /** Set in italic. */
  symbol: string
  word: string
}

const RELATIVE: ElementLabel[] = [
  { name: 'period', symbol: 'P', word: 'period' },
  { name: 'periastronTime', symbol: 'T', word: 'periastron' },
  { name: 'eccentricity', symbol: 'e', word: 'eccentricity' },
  { name: 'semiMajorAxis', symbol: 'a', word: 'semi-major axis' },
  { name: 'inclination', symbol: 'i', word: 'inclination' },
  { name: 'node', symbol: 'Ω', word: 'node' },
  { name: 'argumentOfPeriastron', symbol: 'ω', word: 'argument of periastron' },
  { name: 'longitudeOfPeriastron', symbol: 'ω + Ω', word: 'direction of periastron' },
  { name: 'nextPeriastronTime', symbol: 'T′', word: 'next periastron' },
]

const PLANE: ElementLabel[] = [
  { name: 'semiLatusRectum', symbol: 'p', word: 'semi-latus rectum' },
  { name: 'eccentricity', symbol: 'e', word: 'eccentricity' },
  { name: 'periapsisDirection', symbol: 'φ₀', word: 'direction of periapsis' },
  { name: 'period', symbol: 'P', word: 'period' },
  { name: 'periapsisTime', symbol: 'T', word: 'periapsis' },
]

const EQUATORIAL: ElementLabel[] = [
  { name: 'perihelionDistance', symbol: 'q', word: 'perihelion distance' },
  { name: 'eccentricity', symbol: 'e', word: 'eccentricity' },
  { name: 'inclination', symbol: 'i', word: 'inclination' },
  { name: 'node', symbol: 'Ω', word: 'node' },
  { name: 'argumentOfPerihelion', symbol: 'ω', word: 'argument of perihelion' },
  { name: 'perihelionTime', symbol: 'T', word: 'perihelion' },
  { name: 'semiMajorAxis', symbol: 'a', word: 'semi-major axis' },
  { name: 'meanAnomaly', symbol: 'M', word: 'mean anomaly' },
  { name: 'meanMotion', symbol: 'n', word: 'mean motion' },
  { name: 'absoluteMagnitude', symbol: 'H', word: 'absolute magnitude' },
  { name: 'totalMagnitude', symbol: 'M₁', word: 'total magnitude at 1 au' },
]

const LINE: ElementLabel[] = [
  { name: 'closestApproach', symbol: 'ρ₀', word: 'closest approach' },
  { name: 'closestApproachTime', symbol: 't₀', word: 'time of closest approach' },
  { name: 'closestApproachPositionAngle', symbol: 'θ₀', word: 'position angle there' },
  { name: 'motion', symbol: 'μ', word: 'motion' },
  { name: 'motionDirection', symbol: 'ψ', word: 'direction of motion' },
]

/** The labels of each kind of result, in reading order. */
export const ELEMENT_LABELS = { relative: RELATIVE, equatorial: EQUATORIAL, plane: PLANE, line: LINE } as const
export type ElementFamily = keyof typeof ELEMENT_LABELS

/**
 * Which family of labels a result takes.
 * @param result its kind and model
 * @returns "line" for straight motion, else the kind
 */
export function elementFamily(result: { kind: 'relative' | 'equatorial' | 'plane', model: string }): ElementFamily {
  return result.model === 'line' ? 'line' : result.kind
}

/**
 * The elements of a result with their labels, in reading order; an element without a label of its own comes last, under its name in words.
 * @param elements by name, as the engine gives them
 * @param family which labels to take
 * @returns label and element, one for each element there is
 */
export function labelledElements(elements: Readonly<Record<string, Element>>, family: ElementFamily): { label: ElementLabel, element: Element }[] {
  const labels = ELEMENT_LABELS[family]
  const known = labels.flatMap(label => (Object.hasOwn(elements, label.name) ? [{ label, element: elements[label.name]! }] : []))
  const others = Object.entries(elements).filter(([name]) => !labels.some(label => label.name === name))
  return [...known, ...others.map(([name, element]) => ({ label: { name, symbol: '', word: inWords(name) }, element }))]
}

function inWords(name: string): string {
  return name.replace(/([A-Z])/g, ' $1').toLowerCase()
}
