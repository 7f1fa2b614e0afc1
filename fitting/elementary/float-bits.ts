/**
 * The bits of a double, and exact scaling by powers of two. Everything here is fixed by ECMAScript
 * (IEEE 754 layout, integer operators), so it is the same in every engine.
 */

const cell = new Float64Array(1)
const words = new Uint32Array(cell.buffer)

/** Index of the word that holds sign and exponent: 1 on little-endian hosts. */
const HIGH = (() => {
  cell[0] = 1
  return words[1] === 0x3FF00000 ? 1 : 0
})()

const SMALLEST_EXPONENT = -1074
const LARGEST_EXPONENT = 1023

const powersOfTwo = (() => {
  const table = new Float64Array(LARGEST_EXPONENT - SMALLEST_EXPONENT + 1)
  for (let exponent = 0, power = 1; exponent <= LARGEST_EXPONENT; exponent++, power *= 2) table[exponent - SMALLEST_EXPONENT] = power
  for (let exponent = -1, power = 0.5; exponent >= SMALLEST_EXPONENT; exponent--, power *= 0.5) table[exponent - SMALLEST_EXPONENT] = power
  return table
})()

/**
 * High 32 bits of a double: sign, 11 bits of biased exponent, 20 bits of significand.
 * @param x any double.
 * @returns signed 32-bit integer.
 */
export function highWord(x: number): number {
  cell[0] = x
  return words[HIGH]! | 0
}

/**
 * The double x with its high 32 bits replaced.
 * @param x any double.
 * @param high new high word, signed 32-bit integer.
 * @returns the double of those bits.
 */
export function withHighWord(x: number, high: number): number {
  cell[0] = x
  words[HIGH] = high
  return cell[0]!
}

/**
 * The double x with its low 32 bits cleared: at most 21 significant bits, so that products of two are exact.
 * @param x any double.
 * @returns x cut towards zero.
 */
export function withoutLowWord(x: number): number {
  cell[0] = x
  words[1 - HIGH] = 0
  return cell[0]!
}

/**
 * A power of two, exactly.
 * @param exponent whole number, −1074 to 1023.
 * @returns 2^exponent.
 */
export function powerOfTwo(exponent: number): number {
  return powersOfTwo[exponent - SMALLEST_EXPONENT]!
}

/**
 * x·2^exponent, rounded once.
 * @param x a finite double of magnitude 1/4 to 4.
 * @param exponent whole number, −1100 to 1025.
 * @returns the scaled double; 0 or ±Infinity where it does not fit.
 */
export function scaleByPowerOfTwo(x: number, exponent: number): number {
  if (exponent > LARGEST_EXPONENT) return x * powersOfTwo[LARGEST_EXPONENT - SMALLEST_EXPONENT]! * powersOfTwo[exponent - LARGEST_EXPONENT - SMALLEST_EXPONENT]!
  if (exponent < -1021) return x * powersOfTwo[exponent + 100 - SMALLEST_EXPONENT]! * powersOfTwo[-100 - SMALLEST_EXPONENT]!
  return x * powersOfTwo[exponent - SMALLEST_EXPONENT]!
}
