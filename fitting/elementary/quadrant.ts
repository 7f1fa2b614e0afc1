/**
 * Reduction of an angle to a quadrant: x = n·π/2 + y, |y| ≤ π/4 (a hair more), y in two doubles.
 *
 * Up to 2²⁰·π/2: three-part Cody–Waite reduction, each part of π/2 carrying 33 bits so that n times it is exact.
 * Beyond: whole-number arithmetic on 1280 bits of 2/π, which is exact for every finite double and about 1 µs.
 *
 * Sources: Cody & Waite 1980, Software Manual for the Elementary Functions, ch. 8; Payne & Hanek 1983, Radian reduction
 * for trigonometric functions, SIGNUM Newsletter 18; split of π/2 as in fdlibm 5.3 (Sun Microsystems 1993), e_rem_pio2.c.
 */

const TWO_OVER_PI = 0.6366197723675814
const HALF_PI_1 = 1.57079632673412561417
const HALF_PI_2 = 6.07710050630396597660e-11
const HALF_PI_2_TAIL = 2.02226624879595063154e-21
const HALF_PI_3 = 2.02226624871116645580e-21
const HALF_PI_3_TAIL = 8.47842766036889956997e-32

/** Largest |x| of the quick reduction: 2²⁰·π/2. */
const QUICK_LIMIT = 1647099
/** Below this |y| the second part of π/2 leaves too few bits. */
const CANCELLED = 1e-9

/**
 * Reduces an angle to its quadrant.
 * @param x angle, rad, finite.
 * @param out receives y and its rounding error, rad, at [0] and [1].
 * @returns the quadrant n mod 4, 0 to 3.
 * Source: Cody & Waite 1980, Software Manual for the Elementary Functions.
 */
export function reduceToQuadrant(x: number, out: Float64Array): number {
  if (x > QUICK_LIMIT || x < -QUICK_LIMIT) return reduceLarge(x, out)
  const n = Math.floor(x * TWO_OVER_PI + 0.5)
  const first = x - n * HALF_PI_1
  let w = n * HALF_PI_2
  let rest = first - w
  w = n * HALF_PI_2_TAIL - ((first - rest) - w)
  let y = rest - w
  if (y < CANCELLED && y > -CANCELLED) {
    const second = rest
    w = n * HALF_PI_3
    rest = second - w
    w = n * HALF_PI_3_TAIL - ((second - rest) - w)
    y = rest - w
  }
  out[0] = y
  out[1] = (rest - y) - w
  return n & 3
}

/** 2/π times 2^1280, cut: computed by Machin's formula in whole numbers. */
const TWO_OVER_PI_BITS = 1280n
const TWO_OVER_PI_INTEGER = BigInt('0x'
  + 'a2f9836e4e441529fc2757d1f534ddc0db6295993c439041fe5163abdebbc561'
  + 'b7246e3a424dd2e006492eea09d1921cfe1deb1cb129a73ee88235f52ebb4484'
  + 'e99c7026b45f7e413991d639835339f49c845f8bbdf9283b1ff897ffde05980f'
  + 'ef2f118b5a0a6d1f6d367ecf27cb09b74f463f669e5fea2d7527bac7ebe5f17b'
  + '3d0739f78a5292ea6bfb5fb11f8d5d0856033046fc7b6babf0cfbc209af4361d')
const SCALE_BITS = TWO_OVER_PI_BITS + 32n
const KEPT_BITS = 200n
/** 2⁻²⁰⁰ */
const KEPT_UNIT = 6.223015277861142e-61
const HALF_PI_HIGH = 1.5707963267948966
const HALF_PI_LOW = 6.123233995736766e-17

/** Doubles above 2²⁰ are whole multiples of 2⁻³²; n and the fraction of x·2/π then come from one whole-number product. */
function reduceLarge(x: number, out: Float64Array): number {
  const scaled = Math.abs(x) < 9007199254740992 ? BigInt(x * 4294967296) : BigInt(x) << 32n
  const product = scaled * TWO_OVER_PI_INTEGER
  const n = (product + (1n << (SCALE_BITS - 1n))) >> SCALE_BITS
  const fraction = (product - (n << SCALE_BITS)) >> (SCALE_BITS - KEPT_BITS)
  const high = Number(fraction)
  const low = Number(fraction - BigInt(high))
  multiplyByHalfPi(high * KEPT_UNIT, low * KEPT_UNIT, out)
  return Number(n & 3n)
}

/** (high + low)·π/2 in two doubles, with Dekker's exact product of the leading parts. */
function multiplyByHalfPi(high: number, low: number, out: Float64Array): void {
  const product = high * HALF_PI_HIGH
  const splitA = 134217729 * high
  const a1 = splitA - (splitA - high)
  const a2 = high - a1
  const splitB = 134217729 * HALF_PI_HIGH
  const b1 = splitB - (splitB - HALF_PI_HIGH)
  const b2 = HALF_PI_HIGH - b1
  const error = ((a1 * b1 - product) + a1 * b2 + a2 * b1) + a2 * b2
  const tail = error + (high * HALF_PI_LOW + low * HALF_PI_HIGH)
  const sum = product + tail
  out[0] = sum
  out[1] = (product - sum) + tail
}
