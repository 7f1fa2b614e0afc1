import { randomStream } from '../../../fitting/random'
import { requestFit } from '../../../server/services/fits/request-fit'
import { readFit } from '../../../server/services/fits/read-fit'
import type { TargetView } from '../../../shared/schemas/targets'
import type { FakeClock } from '../fake-clock'
import { pairFile } from '../measure-files'
import { unevenEpochs, withinTurn } from '../simulated-measures'
import type { SimulatedMeasure } from '../simulated-measures'
import { addTarget, latestFit, publish, rule, runJobs, uploadAndSend } from '../work'
import type { DemoCast } from './cast'

/** A field star that the pair drifts past: place in 2000 and motion, arcsec and arcsec a year. */
export const TRUE_HAZEL_3_AC = { eastArcsec: 8.23, northArcsec: -5.12, eastArcsecPerYr: 0.0214, northArcsecPerYr: 0.0093 }
const NOISE = { sigmaThetaDeg: 0.25, sigmaRhoArcsec: 0.035 }

/** Forty years of a wide pair whose motion is straight: no orbit is warranted, and the line is published. */
export async function tellHazel3Ac({ people, pairs }: DemoCast, clock: FakeClock): Promise<TargetView> {
  clock.set('2026-02-20T19:30:00.000Z')
  const target = await addTarget(people.mirelle.ctx, {
    programmeId: pairs.id, kind: 'relative', name: 'Hazel 3 AC', componentA: 'A', componentB: 'C',
    remarks: 'Wide; C is probably a field star that the pair passes.',
  })
  clock.set('2026-02-21T20:15:00.000Z')
  await uploadAndSend(people.ossian.ctx, { text: pairFile(drift(1985.2, 12, 61), { ...NOISE, observer: 'R. Quellmann', nights: 2 }), fileName: 'hazel-3-ac-notebooks.csv', target })
  await uploadAndSend(people.ossian.ctx, { text: pairFile(drift(2006.4, 11, 62), { ...NOISE, nights: 2 }), fileName: 'hazel-3-ac-brandvik.csv', target })
  await runJobs(people.ossian.ctx)
  clock.set('2026-02-23T18:00:00.000Z')
  const orbit = await latestFit(people.mirelle.ctx, target.id)
  const asked = await requestFit(people.mirelle.ctx, target.id, { baseFitId: orbit.id, setAside: [], model: 'line' })
  await runJobs(people.mirelle.ctx)
  const line = await readFit(people.mirelle.ctx, asked.fit.id)
  clock.advance(20 * 60_000)
  const accepted = await rule(people.mirelle.ctx, line, 'accept', 'The motion shows no curvature toward A in forty years; a straight line says all there is.')
  clock.set('2026-02-24T08:45:00.000Z')
  await publish(people.mirelle.ctx, accepted, 'No orbit: the motion is straight so far.')
  return target
}

function drift(from: number, count: number, seed: number): SimulatedMeasure[] {
  const random = randomStream(seed)
  const { eastArcsec, northArcsec, eastArcsecPerYr, northArcsecPerYr } = TRUE_HAZEL_3_AC
  return unevenEpochs({ from, count, stepYr: 1.75, seed }).map((epochYr) => {
    const east = eastArcsec + eastArcsecPerYr * (epochYr - 2000)
    const north = northArcsec + northArcsecPerYr * (epochYr - 2000)
    return {
      epochYr,
      thetaDeg: withinTurn(Math.atan2(east, north) * 180 / Math.PI + NOISE.sigmaThetaDeg * random.normal()),
      rhoArcsec: Math.hypot(east, north) + NOISE.sigmaRhoArcsec * random.normal(),
    }
  })
}
