/** Kepler's equation, and the same bytes twice. */
import { fitOrbit } from '../../../fitting'
import { solveKeplerInto } from '../../../fitting/conic/kepler'
import { randomStream } from '../../../fitting/random'
import { simulatedPair } from './simulated-pairs'
import { median, timed, type Section } from './table'

const KEPLER_SOLVES = 200_000

/** One solve of Kepler's equation with portable sine and cosine. */
export const kepler: Section = ({ seed }) => {
  const random = randomStream(seed)
  const means = Float64Array.from({ length: KEPLER_SOLVES }, () => 6.28 * random.uniform())
  const eccentricities = Float64Array.from({ length: KEPLER_SOLVES }, () => 0.9999 * random.uniform())
  const out = new Float64Array(3)
  let largest = 0
  const run = () => {
    for (let i = 0; i < KEPLER_SOLVES; i++) solveKeplerInto(means[i]!, eccentricities[i]!, out)
  }
  run()
  const passes = Array.from({ length: 7 }, () => timed(run).ms * 1e6 / KEPLER_SOLVES)
  for (let i = 0; i < KEPLER_SOLVES; i++) {
    solveKeplerInto(means[i]!, eccentricities[i]!, out)
    const turned = means[i]! - 2 * Math.PI * Math.round((means[i]! - out[0]!) / (2 * Math.PI))
    largest = Math.max(largest, Math.abs(out[0]! - eccentricities[i]! * out[1]! - turned))
  }
  const ns = median(passes)
  return [{ what: 'Kepler solve with portable sine and cosine, e 0–0.9999', reach: 'under 150 ns at 1e-15', measured: `${ns.toFixed(0)} ns, largest residual ${largest.toExponential(1)} rad`, met: ns < 150 && largest < 2e-15 }]
}

/** The same request twice; workers and browsers are compared by the tests in tests/e2e. */
export const bytes: Section = ({ seed }) => {
  const requests = Array.from({ length: 10 }, (_, i) => simulatedPair({ seed: seed + i, count: 30, coverage: [0.3, 3], form: 'polar' }))
  const [once, twice] = [0, 1].map(() => requests.map(({ measures, spanYr }) => JSON.stringify(fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: spanYr / 6 } }))).join())
  return [{ what: 'same request twice', reach: 'identical bytes, also in a worker and in Chromium (tests/e2e/engine-bytes.test.ts)', measured: once === twice ? 'identical here' : 'different', met: once === twice }]
}
