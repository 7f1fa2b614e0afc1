import { describe, expect, it } from 'vitest'
import * as own from '../../../../fitting/elementary'
import { randomStream } from '../../../../fitting/random'
import { ulpsApart } from './ulps'

const DRAWS = 1_000_000
/** A million draws take a quarter of a second alone on a core, more on a shared one. */
const PATIENCE = { timeout: 60_000 }

/** Spread evenly in the logarithm of the magnitude, both signs. */
const logSpread = (u: number, smallest: number, largest: number, sign: number) =>
  (sign < 0.5 ? -1 : 1) * Math.exp(Math.log(smallest) + u * (Math.log(largest) - Math.log(smallest)))

function worst(own: (x: number) => number, standard: (x: number) => number, draw: (u: number, v: number) => number, seed: number) {
  const random = randomStream(seed)
  let ulps = 0
  let at = NaN
  for (let n = 0; n < DRAWS; n++) {
    const x = draw(random.uniform(), random.uniform())
    const distance = ulpsApart(own(x), standard(x))
    if (distance > ulps) {
      ulps = distance
      at = x
    }
  }
  return { ulps, at }
}

const turn = (u: number) => (u - 0.5) * 4 * Math.PI
const wide = (u: number) => (u - 0.5) * 4e6
const nearQuarterTurns = (u: number, v: number) => Math.floor(u * 640_000) * (Math.PI / 2) + (v - 0.5) * 1e-6
const anySize = (u: number, v: number) => logSpread(u, 1e-300, 1e300, v)

const cases: [string, (x: number) => number, (x: number) => number, (u: number, v: number) => number][] = [
  ['sin within a turn', own.sin, Math.sin, turn],
  ['sin up to two million', own.sin, Math.sin, wide],
  ['sin near multiples of a quarter turn', own.sin, Math.sin, nearQuarterTurns],
  ['sin of any size', own.sin, Math.sin, anySize],
  ['cos within a turn', own.cos, Math.cos, turn],
  ['cos up to two million', own.cos, Math.cos, wide],
  ['cos near multiples of a quarter turn', own.cos, Math.cos, nearQuarterTurns],
  ['cos of any size', own.cos, Math.cos, anySize],
  ['atan of any size', own.atan, Math.atan, anySize],
  ['atan between −4 and 4', own.atan, Math.atan, u => 8 * u - 4],
  ['asin', own.asin, Math.asin, u => 2 * u - 1],
  ['asin of small numbers', own.asin, Math.asin, (u, v) => logSpread(u, 1e-300, 1, v)],
  ['acos', own.acos, Math.acos, u => 2 * u - 1],
  ['exp over its range', own.exp, Math.exp, u => -745 + 1454 * u],
  ['exp of small numbers', own.exp, Math.exp, (u, v) => logSpread(u, 1e-300, 1, v)],
  ['expm1 over its range', own.expm1, Math.expm1, u => -40 + 749 * u],
  ['expm1 near 0', own.expm1, Math.expm1, (u, v) => logSpread(u, 1e-300, 40, v)],
  ['log of any size', own.log, Math.log, u => logSpread(u, 5e-324, 1e308, 1)],
  ['log near 1', own.log, Math.log, u => 0.5 + 1.5 * u],
  ['log1p', own.log1p, Math.log1p, (u, v) => v < 0.5 ? u - 1 : logSpread(u, 1e-300, 1e300, 1)],
  ['log1p of small numbers', own.log1p, Math.log1p, (u, v) => logSpread(u, 1e-300, 0.5, v)],
  ['sinh', own.sinh, Math.sinh, u => 1421 * u - 710.5],
  ['sinh of small numbers', own.sinh, Math.sinh, (u, v) => logSpread(u, 1e-300, 25, v)],
  ['cosh', own.cosh, Math.cosh, u => 1421 * u - 710.5],
  ['cosh of small numbers', own.cosh, Math.cosh, (u, v) => logSpread(u, 1e-300, 25, v)],
  ['tanh', own.tanh, Math.tanh, (u, v) => logSpread(u, 1e-300, 30, v)],
  ['tanh between −2 and 2', own.tanh, Math.tanh, u => 4 * u - 2],
  ['atanh', own.atanh, Math.atanh, u => 2 * u - 1],
  ['atanh of small numbers', own.atanh, Math.atanh, (u, v) => logSpread(u, 1e-300, 1, v)],
  ['asinh', own.asinh, Math.asinh, anySize],
  ['cbrt of any size', own.cbrt, Math.cbrt, anySize],
]

describe('elementary functions', PATIENCE, () => {
  it.each(cases)('%s stays within one unit in the last place of the standard one', (_, mine, standard, draw) => {
    const { ulps, at } = worst(mine, standard, draw, 20261201)
    expect(ulps, `at ${at}`).toBeLessThanOrEqual(1)
  })

  it('atan2 stays within one unit in the last place of the standard one in all four quadrants', () => {
    const random = randomStream(7)
    for (const span of [1, 1e-9, 1e300]) {
      for (let n = 0; n < DRAWS / 2; n++) {
        const y = (random.uniform() - 0.5) * span
        const x = random.uniform() - 0.5
        if (ulpsApart(own.atan2(y, x), Math.atan2(y, x)) > 1) expect.fail(`atan2(${y}, ${x}) is ${own.atan2(y, x)}, not ${Math.atan2(y, x)}`)
      }
    }
  })
})
