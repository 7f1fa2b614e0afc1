/** Held elements in a result: the value asked for, no error, and the node and periastron of the pair that was asked for. */
import { PI, RAD } from '../elementary'
import { withinTurn } from '../conic/thiele-innes'
import { HOLDABLE, type Held } from '../models/held-orbit'
import type { Element } from '../types'
import { ELEMENT_NAMES, type RelativeElements } from './relative-elements'

const HALF_TURN_DEG = 180

/** Without velocities Ω and ω turn together by 180°: takes the pair in which the held one has its value. */
function withAskedNode(elements: RelativeElements, held: Held): RelativeElements {
  const asked = held.argumentOfPeriastron ?? held.node
  if (asked === undefined || elements.isCircle) return elements
  const own = (held.argumentOfPeriastron === undefined ? elements.nodeRad : elements.argumentRad) * RAD
  const away = Math.abs(((own - asked) % 360 + 540) % 360 - HALF_TURN_DEG)
  if (away < HALF_TURN_DEG / 2) return elements
  const nodeRad = withinTurn(elements.nodeRad + PI)
  const argumentRad = withinTurn(elements.argumentRad + PI)
  const { node, argumentOfPeriastron } = elements.quantities
  const quantities = { ...elements.quantities, node: { ...node, value: nodeRad * RAD }, argumentOfPeriastron: { ...argumentOfPeriastron, value: argumentRad * RAD } }
  return { ...elements, nodeRad, argumentRad, quantities }
}

/**
 * Puts held values in the place of computed ones, with vanishing gradients.
 * @param elements of a solution.
 * @param held by name, in published units.
 * @returns the elements themselves where none is held. The node of a circle stays between 0 and 180°.
 */
export function withHeldQuantities(elements: RelativeElements, held: Held): RelativeElements {
  const names = HOLDABLE.filter((name) => held[name] !== undefined)
  if (names.length === 0) return elements
  const asked = withAskedNode(elements, held)
  const quantities = { ...asked.quantities }
  for (const name of names) {
    const keepsOwn = name === 'node' && asked.isCircle
    quantities[name] = { ...quantities[name], value: keepsOwn ? quantities[name].value : held[name]!, gradient: new Float64Array(ELEMENT_NAMES.length) }
  }
  return { ...asked, quantities }
}

/**
 * Marks held elements.
 * @param published elements by name, changed in place.
 * @param held by name.
 */
export function markHeld(published: Record<string, Element>, held: object): void {
  for (const name of Object.keys(held)) published[name] = { ...published[name]!, sigma: 0, sigmaFormal: 0, sigmaScaled: 0, status: 'held' }
}

/**
 * What to say about held elements.
 * @param held by name, in published units.
 * @returns a sentence, or none.
 */
export function aboutHeld(held: object): string[] {
  const names = Object.entries(held)
  if (names.length === 0) return []
  return [`Held, not fitted: ${names.map(([name, value]) => `${name} = ${value as number}`).join(', ')}. The errors of all else hold only as far as that is true.`]
}
