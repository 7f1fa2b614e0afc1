/**
 * Harmonic series of a vector: Σ tᵏ·a·cos(b + c·t) for each component, and its derivative.
 *
 * The components share their frequencies, so each frequency takes one sine and one cosine for all three:
 * a·cos(b + c·t) = (a·cos b)·cos(c·t) − (a·sin b)·sin(c·t), the brackets made once.
 *
 * Source: definition; the addition theorem.
 */
import { sinCosInto } from '../elementary'

/** Amplitude, phase (rad) and frequency (rad a unit of time), three numbers a term, by power of the time and then x, y, z. */
export type HarmonicTerms = readonly (readonly (readonly number[])[])[]

/** The terms by frequency: for each power seven numbers a frequency, c and then the factors of cosine and sine of x, y, z. */
export type HarmonicSeries = readonly Float64Array[]

const PER_FREQUENCY = 7
const wave = new Float64Array(2)

/**
 * Terms gathered by frequency.
 * @param terms amplitude, phase and frequency by power of the time and component.
 * @returns the series for evaluateSeriesInto, the powers in their order, the frequencies in the order of their first term.
 * Source: the addition theorem.
 */
export function gatherSeries(terms: HarmonicTerms): HarmonicSeries {
  return terms.map((components) => {
    const byFrequency = new Map<number, Float64Array>()
    components.forEach((numbers, component) => {
      for (let k = 0; k < numbers.length; k += 3) addTerm(byFrequency, component, numbers.slice(k, k + 3))
    })
    const gathered = new Float64Array(byFrequency.size * PER_FREQUENCY)
    let place = 0
    for (const factors of byFrequency.values()) {
      gathered.set(factors, place)
      place += PER_FREQUENCY
    }
    return gathered
  })
}

function addTerm(byFrequency: Map<number, Float64Array>, component: number, term: readonly number[]): void {
  const [amplitude = NaN, phaseRad = NaN, frequency = NaN] = term
  const factors = byFrequency.get(frequency) ?? new Float64Array(PER_FREQUENCY)
  byFrequency.set(frequency, factors)
  factors[0] = frequency
  sinCosInto(phaseRad, wave)
  factors[1 + 2 * component]! += amplitude * wave[1]!
  factors[2 + 2 * component]! -= amplitude * wave[0]!
}

/**
 * Value and derivative of a series.
 * @param series as gatherSeries made it.
 * @param t time in the unit of the frequencies.
 * @param out receives the vector at [0] to [2] and its derivative by t at [3] to [5]; NaN where t is no finite number.
 * Source: definition.
 */
export function evaluateSeriesInto(series: HarmonicSeries, t: number, out: Float64Array): void {
  out.fill(0, 0, 6)
  let power = 1
  let powerRate = 0
  for (const [k, gathered] of series.entries()) {
    addPower(gathered, { t, power, powerRate }, out)
    powerRate = (k + 1) * power
    power *= t
  }
}

/** Adds one power of the time, the smallest terms first. */
function addPower(gathered: Float64Array, at: { t: number, power: number, powerRate: number }, out: Float64Array): void {
  let x = 0
  let y = 0
  let z = 0
  let dx = 0
  let dy = 0
  let dz = 0
  for (let k = gathered.length - PER_FREQUENCY; k >= 0; k -= PER_FREQUENCY) {
    const frequency = gathered[k]!
    sinCosInto(frequency * at.t, wave)
    const s = wave[0]!
    const c = wave[1]!
    x += gathered[k + 1]! * c + gathered[k + 2]! * s
    y += gathered[k + 3]! * c + gathered[k + 4]! * s
    z += gathered[k + 5]! * c + gathered[k + 6]! * s
    dx += frequency * (gathered[k + 2]! * c - gathered[k + 1]! * s)
    dy += frequency * (gathered[k + 4]! * c - gathered[k + 3]! * s)
    dz += frequency * (gathered[k + 6]! * c - gathered[k + 5]! * s)
  }
  out[0]! += at.power * x
  out[1]! += at.power * y
  out[2]! += at.power * z
  out[3]! += at.power * dx + at.powerRate * x
  out[4]! += at.power * dy + at.powerRate * y
  out[5]! += at.power * dz + at.powerRate * z
}
