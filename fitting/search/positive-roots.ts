/**
 * The positive roots of Gauss's equation of the eighth degree, r⁸ + a r⁶ + b r³ + c = 0.
 * Its derivative is r²(8r⁵ + 6a r³ + 3b), and the derivative of that bracket 40r⁴ + 18a r²; so the turning points are bracketed
 * exactly, and between them every root is found by halving: none is missed.
 * Source: Gauss 1809, Theoria motus corporum coelestium, arts. 141–146 (the equation); the bracketing is elementary.
 */

/** Root of a function that changes sign between two places. */
function between(f: (r: number) => number, from: number, to: number): number {
  let [low, high] = [from, to]
  const isRising = f(from) < 0
  for (let i = 0; i < 200 && high - low > 1e-15 * high; i++) {
    const middle = 0.5 * (low + high)
    if (f(middle) < 0 === isRising) low = middle
    else high = middle
  }
  return 0.5 * (low + high)
}

/** Roots of f between 0 and `limit`, given where it turns. */
function rootsBetween(f: (r: number) => number, turns: readonly number[], limit: number): number[] {
  const marks = [0, ...turns, limit]
  const roots: number[] = []
  for (let i = 1; i < marks.length; i++) {
    const [from, to] = [marks[i - 1]!, marks[i]!]
    if (to > from && f(from) < 0 !== f(to) < 0) roots.push(between(f, from, to))
  }
  return roots
}

/**
 * All positive roots.
 * @param a coefficient of r⁶.
 * @param b coefficient of r³.
 * @param c constant.
 * @returns at most three roots, growing.
 * Source: Gauss 1809, Theoria motus, art. 141.
 */
export function positiveRoots(a: number, b: number, c: number): number[] {
  if (!(a - a === 0 && b - b === 0 && c - c === 0)) return []
  const f = (r: number) => ((r * r + a) * r * r * r + b) * r * r * r + c
  const slope = (r: number) => (8 * r * r + 6 * a) * r * r * r + 3 * b
  const largest = Math.max(Math.abs(a), Math.abs(b), Math.abs(c))
  const limit = 1 + largest
  const turnOfSlope = a < 0 ? [Math.sqrt((-18 * a) / 40)] : []
  return rootsBetween(f, rootsBetween(slope, turnOfSlope, limit), limit)
}
