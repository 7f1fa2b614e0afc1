import { mendRow } from '../../../server/services/batches/mend-row'
import { sendBatch } from '../../../server/services/batches/send-batch'
import { followTarget } from '../../../server/services/targets/follow-target'
import type { FitView } from '../../../shared/schemas/fits'
import type { TargetView } from '../../../shared/schemas/targets'
import type { FakeClock } from '../fake-clock'
import { pairFile } from '../measure-files'
import { simulatePair, unevenEpochs } from '../simulated-measures'
import type { SimulatedMeasure, TruePair } from '../simulated-measures'
import { addTarget, latestFit, publish, rule, runJobs, setAside, upload, uploadAndSend } from '../work'
import type { DemoCast } from './cast'

export const TRUE_LINDEN_12: TruePair = {
  periodYr: 62.4, periastronTimeYr: 2009.3, eccentricity: 0.482, semiMajorAxisArcsec: 0.861, inclinationDeg: 48.3, nodeDeg: 118.9, argumentOfPeriastronDeg: 73.4,
}
const NOTEBOOKS = { sigmaThetaDeg: 1.6, sigmaRhoArcsec: 0.03, seed: 121 }
const MICROMETER = { sigmaThetaDeg: 0.8, sigmaRhoArcsec: 0.014, seed: 122 }
const CAMERA = { sigmaThetaDeg: 0.5, sigmaRhoArcsec: 0.008, seed: 123 }
const RECENT = { sigmaThetaDeg: 0.4, sigmaRhoArcsec: 0.006, seed: 124 }
/** Which of the camera's measures has a wrong tens digit in θ. */
const MISTYPED = 4
const MISTYPED_BY_DEG = 20

/** A whole story: old notebooks, a mistyped angle set aside, edition 1, a new season, edition 2. */
export async function tellLinden12({ people, pairs }: DemoCast, clock: FakeClock): Promise<TargetView> {
  clock.set('2026-01-05T19:40:00.000Z')
  const target = await addTarget(people.mirelle.ctx, {
    programmeId: pairs.id, kind: 'relative', name: 'Linden 12 AB', aliases: ['LND 12'], componentA: 'A', componentB: 'B',
    remarks: 'Both components yellowish; the companion passed periastron in 2009.',
  })
  await followTarget(people.wenna.ctx, target.id)
  await sendNotebooks({ people }, clock, target)
  await sendCamera({ people }, clock, target)
  await publishFirst({ people }, clock, target)
  await publishSecond({ people }, clock, target)
  return target
}

type People = Pick<DemoCast, 'people'>

async function sendNotebooks({ people }: People, clock: FakeClock, target: TargetView): Promise<void> {
  clock.set('2026-01-10T20:12:00.000Z')
  const old = simulatePair(TRUE_LINDEN_12, unevenEpochs({ from: 1972.2, count: 11, stepYr: 2, seed: 11 }), NOTEBOOKS)
  await uploadAndSend(people.ossian.ctx, { text: pairFile(old, { ...NOTEBOOKS, observer: 'R. Quellmann', method: 'filar micrometer', nights: 2 }), fileName: 'quellmann-notebooks.csv', target })
  const own = simulatePair(TRUE_LINDEN_12, unevenEpochs({ from: 1994.6, count: 14, stepYr: 2.1, seed: 12 }), MICROMETER)
  clock.advance(9 * 60_000)
  await uploadAndSend(people.ossian.ctx, { text: pairFile(own, { ...MICROMETER, method: 'filar micrometer', nights: 3 }), fileName: 'brandvik-1994-2023.csv', target })
  await runJobs(people.ossian.ctx)
}

/** One angle is impossible and is mended before sending; another is mistyped and only shows in the fit. */
async function sendCamera({ people }: People, clock: FakeClock, target: TargetView): Promise<void> {
  clock.set('2026-01-17T21:03:00.000Z')
  const measures = simulatePair(TRUE_LINDEN_12, unevenEpochs({ from: 2005.1, count: 12, stepYr: 1.7, seed: 13 }), CAMERA)
  const typed = measures.map((measure, k) => k === MISTYPED ? { ...measure, thetaDeg: (measure.thetaDeg + MISTYPED_BY_DEG) % 360 } : measure)
  const text = pairFile(withImpossibleAngle(typed), { ...CAMERA, method: 'camera', nights: 1 })
  const batch = await upload(people.orrowin.ctx, { text, fileName: 'orrowin-camera.csv', target })
  const bad = batch.items.find(row => row.state === 'bad')
  if (!bad) throw new Error('The story needs a row that cannot be read, and all of them can.')
  await mendRow(people.orrowin.ctx, { batchId: batch.id, rowId: bad.id, cells: { theta_deg: typed[0]!.thetaDeg.toFixed(2) } })
  clock.advance(4 * 60_000)
  await sendBatch(people.orrowin.ctx, batch.id)
  await runJobs(people.orrowin.ctx)
}

function withImpossibleAngle(measures: readonly SimulatedMeasure[]): SimulatedMeasure[] {
  return measures.map((measure, k) => k === 0 ? { ...measure, thetaDeg: measure.thetaDeg + 360 } : measure)
}

async function publishFirst({ people }: People, clock: FakeClock, target: TargetView): Promise<void> {
  clock.set('2026-01-24T18:20:00.000Z')
  const fit = await latestFit(people.mirelle.ctx, target.id)
  const refit = await setAside(people.mirelle.ctx, fit, [{
    measureId: worstOf(fit, 'T. Orrowin'),
    reason: `θ sits ${MISTYPED_BY_DEG}° from all others of that year; a tens digit was mistyped, the sheet of that night is lost`,
  }])
  clock.advance(25 * 60_000)
  const accepted = await rule(people.mirelle.ctx, refit, 'accept', 'With that one measure set aside the residuals of all three observers scatter about zero.')
  clock.set('2026-02-01T10:05:00.000Z')
  await publish(people.mirelle.ctx, accepted, 'First orbit, from thirty-six measures of 1972 to 2025.')
}

/** The measure of this observer that lies farthest off, in σ. */
function worstOf(fit: FitView, observer: string): string {
  const theirs = new Set(fit.measures.filter(measure => measure.observer === observer).map(measure => measure.id))
  const residuals = (fit.result?.residuals ?? []).filter(residual => theirs.has(residual.id))
  const worst = residuals.reduce((far, residual) => (residual.normalised ?? 0) > (far.normalised ?? 0) ? residual : far)
  return worst.id
}

async function publishSecond({ people }: People, clock: FakeClock, target: TargetView): Promise<void> {
  clock.set('2026-03-07T22:31:00.000Z')
  const measures = simulatePair(TRUE_LINDEN_12, unevenEpochs({ from: 2024.7, count: 9, stepYr: 0.15, seed: 14 }), RECENT)
  await uploadAndSend(people.ilka.ctx, { text: pairFile(measures, { ...RECENT, method: 'speckle', nights: 1 }), fileName: 'soundraven-speckle.csv', target })
  await runJobs(people.ilka.ctx)
  clock.set('2026-03-12T17:45:00.000Z')
  const fit = await latestFit(people.sefa.ctx, target.id)
  const accepted = await rule(people.sefa.ctx, fit, 'accept', 'Nine speckle measures agree with the orbit and halve the error of the period.')
  clock.set('2026-03-14T09:30:00.000Z')
  await publish(people.sefa.ctx, accepted, 'Nine speckle measures of 2024 to 2026 joined; the elements moved within their errors.')
}
