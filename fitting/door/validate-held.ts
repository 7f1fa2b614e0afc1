/** Held elements and the class of the conic, checked and brought to one list of held elements. */
import { PLANE_HOLDABLE } from '../models/held-plane'
import { HOLDABLE, type Held } from '../models/held-orbit'
import type { FitSettings } from '../types'
import { refuse } from './refusal'

/** Lowest and highest value, in published units. */
const RANGES: Record<string, readonly [number, number]> = {
  period: [1e-6, 1e9], periastronTime: [-1e6, 1e6], eccentricity: [0, 0.9999], semiMajorAxis: [1e-9, 1e6],
  inclination: [0, 180], node: [0, 360], argumentOfPeriastron: [0, 360],
}
const PLANE_RANGES: Record<string, readonly [number, number]> = { semiLatusRectum: [1e-12, 1e12], eccentricity: [0, 1000], periapsisDirection: [0, 360] }

function checkHeld(hold: Record<string, number>, names: readonly string[], ranges: Record<string, readonly [number, number]>): void {
  if (typeof hold !== 'object' || hold === null) refuse('setting-out-of-range', 'The held elements are not a set of named numbers.', 'Give, for example, { "eccentricity": 0 }.')
  for (const [name, value] of Object.entries(hold)) {
    if (!names.includes(name)) refuse('setting-out-of-range', `The element ${name.slice(0, 40)} cannot be held.`, `These can: ${names.join(', ')}.`)
    const [low, high] = ranges[name]!
    if (!(typeof value === 'number' && value >= low && value <= high)) refuse('setting-out-of-range', `The held ${name} is not a number from ${low} to ${high}.`, 'Give a number inside that range, in the unit in which the element is published.')
  }
}

/** e as the class of the conic fixes it. */
function withClass(hold: Record<string, number>, eccentricity: number | null, conicClass: string): Record<string, number> {
  if (eccentricity === null) return hold
  if (hold.eccentricity !== undefined && hold.eccentricity !== eccentricity) {
    refuse('setting-out-of-range', `The conic is to be a ${conicClass}, but the eccentricity is held at ${hold.eccentricity}.`, 'Leave one of the two out.')
  }
  return { ...hold, eccentricity }
}

/**
 * Elements to hold in a relative fit.
 * @param settings hold and conicClass; a circle holds e at 0.
 * @returns held elements by name.
 * @throws RefusedRequest where an element is unknown, out of range or without meaning, or nothing is left to fit.
 */
export function heldOfRelative(settings: FitSettings): Held {
  const { hold = {}, conicClass = 'any', model = 'kepler' } = settings
  checkHeld(hold, HOLDABLE, RANGES)
  if (conicClass === 'parabola') refuse('setting-not-available', 'The orbit of a double star is bound by construction: a parabola cannot be asked for.', 'Leave conicClass out, or fit a straight line to a short arc.')
  const held: Held = withClass(hold, conicClass === 'circle' ? 0 : null, conicClass)
  if (Object.keys(held).length > 0 && model !== 'kepler') refuse('setting-not-available', `A ${model} model has no elements of an orbit to hold.`, 'Hold elements of the model kepler only.')
  if (held.eccentricity === 0 && (held.argumentOfPeriastron !== undefined || held.periastronTime !== undefined)) {
    refuse('setting-out-of-range', 'A circle has no periastron: its argument and time cannot be held.', 'Hold the eccentricity at 0 alone, or leave it free.')
  }
  if (Object.keys(held).length === HOLDABLE.length) refuse('setting-out-of-range', 'All seven elements are held: nothing is left to fit.', 'Leave at least one element free.')
  return held
}

/**
 * Elements to hold in a plane fit.
 * @param settings hold and conicClass; a circle holds e at 0, a parabola at 1.
 * @returns held elements by name.
 * @throws RefusedRequest where an element is unknown, out of range or without meaning, or nothing is left to fit.
 */
export function heldOfPlane(settings: FitSettings): Record<string, number> {
  const { hold = {}, conicClass = 'any' } = settings
  checkHeld(hold, PLANE_HOLDABLE, PLANE_RANGES)
  const held = withClass(hold, conicClass === 'circle' ? 0 : conicClass === 'parabola' ? 1 : null, conicClass)
  if (held.eccentricity === 0 && held.periapsisDirection !== undefined) refuse('setting-out-of-range', 'A circle has no periapsis: its direction cannot be held.', 'Hold the eccentricity at 0 alone, or leave it free.')
  if (Object.keys(held).length === PLANE_HOLDABLE.length) refuse('setting-out-of-range', 'All elements are held: nothing is left to fit.', 'Leave at least one element free.')
  return held
}
