/**
 * Seeded random numbers: xoroshiro128+ (Blackman & Vigna 2018) through pure-rand, uniform doubles of 53 bits, normal deviates by
 * the polar method. The same seed gives the same numbers in every engine.
 */
import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64'
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus'
import { log } from './elementary'

/** A stream of random numbers; drawing changes it. */
export interface RandomStream {
  /** Uniform in [0, 1), a multiple of 2⁻⁵³. */
  uniform: () => number
  /** Whole number, uniform in 0 … bound − 1; bound a whole number, 1 to 2⁵³. */
  below: (bound: number) => number
  /** Standard normal deviate, mean 0 and variance 1. */
  normal: () => number
}

/**
 * Opens a stream of random numbers.
 * @param seed whole number; its low 32 bits choose the stream.
 * @returns a stream at its beginning.
 * Source: Blackman & Vigna 2018, Scrambled linear pseudorandom number generators; Marsaglia & Bray 1964, A convenient method for
 * generating normal variables.
 */
export function randomStream(seed: number): RandomStream {
  const generator = xoroshiro128plus(seed)
  let spare = NaN
  const uniform = () => uniformFloat64(generator)
  const normal = () => {
    if (spare === spare) {
      const value = spare
      spare = NaN
      return value
    }
    for (;;) {
      const u = 2 * uniform() - 1
      const v = 2 * uniform() - 1
      const s = u * u + v * v
      if (s >= 1 || s === 0) continue
      const factor = Math.sqrt(-2 * log(s) / s)
      spare = v * factor
      return u * factor
    }
  }
  return { uniform, below: bound => Math.floor(uniform() * bound), normal }
}
